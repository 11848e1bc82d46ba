import { ChangeDetectionStrategy, Component, computed, type ElementRef, input, output, viewChild } from '@angular/core';
import { RouterLink } from '@angular/router';
import { METHOD_SENTENCES, type MethodChoice as MethodKey, methodSectionId } from '../../networks/method-words';

/**
 * One choice of method: closed, what is used and why one would; open, every option with its sentence and the way to its
 * equations. Choosing is a press on a button, never a step of the arrow keys, since each choice solves the network anew.
 */
@Component({
  selector: 'app-method-choice',
  imports: [RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '(keydown.escape)': 'close($event)' },
  templateUrl: './method-choice.html',
  styleUrl: './method-choice.scss',
})
export class MethodChoice {
  readonly key = input.required<MethodKey>();
  readonly label = input.required<string>();
  /** What screens call each option, in the order in which they are offered. */
  readonly words = input.required<Readonly<Record<string, string>>>();
  readonly value = input.required<string>();
  readonly disabled = input(false);
  readonly refusal = input('');
  /** Options that cannot be computed here, each with the reason. */
  readonly blocked = input<Readonly<Record<string, string>>>({});
  readonly accepted = output<string>();

  private readonly details = viewChild.required<ElementRef<HTMLDetailsElement>>('details');
  private readonly summary = viewChild.required<ElementRef<HTMLElement>>('summary');

  protected readonly options = computed(() => {
    const sentences: Readonly<Record<string, string>> = METHOD_SENTENCES[this.key()];
    return Object.entries(this.words()).map(([value, words]) => ({
      value,
      words: words.charAt(0).toUpperCase() + words.slice(1),
      sentence: sentences[value] ?? '',
      used: value === this.value(),
      blocked: this.blocked()[value] ?? '',
      reasonId: `${this.key()}-${value}-blocked`,
      section: methodSectionId(this.key(), value),
    }));
  });
  protected readonly used = computed(() => this.options().find(({ used }) => used));

  protected choose(value: string): void {
    // it can be reached, so that its reason can be read, and does nothing
    if (value !== this.value() && (this.blocked()[value] ?? '') !== '') return;
    this.details().nativeElement.open = false;
    this.summary().nativeElement.focus();
    if (value !== this.value()) this.accepted.emit(value);
  }

  /** Closes the list before anything else takes the key. */
  protected close(event: Event): void {
    const details = this.details().nativeElement;
    if (!details.open) return;
    event.stopPropagation();
    details.open = false;
    this.summary().nativeElement.focus();
  }
}

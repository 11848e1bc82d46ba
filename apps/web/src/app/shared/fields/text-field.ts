import {
  ChangeDetectionStrategy,
  Component,
  effect,
  type ElementRef,
  input,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';

let fieldCount = 0;

/** A line or a paragraph of text: Enter or leaving accepts, Escape restores. Empty is `undefined`. */
@Component({
  selector: 'app-text-field',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './text-field.html',
  styleUrl: './fields.scss',
})
export class TextField {
  readonly label = input.required<string>();
  readonly value = input<string>();
  readonly long = input(false);
  readonly disabled = input(false);
  readonly hint = input('');
  readonly refusal = input('');
  readonly accepted = output<string | undefined>();

  private readonly box = viewChild.required<ElementRef<HTMLInputElement | HTMLTextAreaElement>>('box');
  protected readonly id = `text-${String(++fieldCount)}`;
  protected readonly text = signal('');

  constructor() {
    effect(() => {
      const value = this.value() ?? '';
      untracked(() => {
        this.text.set(value);
      });
    });
  }

  focus(): void {
    this.box().nativeElement.focus();
  }

  commit(): boolean {
    const text = this.box().nativeElement.value.trim();
    if (text !== (this.value() ?? '')) this.accepted.emit(text === '' ? undefined : text);
    return true;
  }

  /** What is filled in is typed over, as in a quantity field. */
  protected selectAll(): void {
    this.box().nativeElement.select();
  }

  protected restore(event: Event): void {
    const box = this.box().nativeElement;
    if (box.value === (this.value() ?? '')) return;
    event.stopPropagation();
    box.value = this.value() ?? '';
    this.text.set(box.value);
  }
}

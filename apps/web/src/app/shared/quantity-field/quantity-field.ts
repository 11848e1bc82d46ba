import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  type ElementRef,
  input,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import {
  displayUnit,
  type DisplayUnits,
  formatForEditing,
  formatQuantity,
  parseQuantity,
  type QuantityKind,
  unitsAccepted,
} from '@riseback/units';

let fieldCount = 0;

/**
 * A field for one quantity: takes typed units ("12 ft", "15 psig"), shows the person's own, and hands on SI.
 * Enter or leaving the field accepts, Escape restores; a text that is not understood stays there with the reason.
 */
@Component({
  selector: 'app-quantity-field',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './quantity-field.html',
  styleUrl: './quantity-field.scss',
})
export class QuantityField {
  readonly label = input.required<string>();
  readonly kind = input.required<QuantityKind>();
  readonly units = input.required<DisplayUnits>();
  /** The value in SI; undefined when there is none. */
  readonly value = input<number>();
  /** May be left empty: then `undefined` is accepted. */
  readonly optional = input(false);
  readonly disabled = input(false);
  /** What an empty optional field stands for, such as "default 0". */
  readonly placeholder = input('');
  readonly hint = input('');
  /** Why the accepted value was refused further on. */
  readonly refusal = input('');
  readonly accepted = output<number | undefined>();

  private readonly box = viewChild.required<ElementRef<HTMLInputElement>>('box');

  protected readonly id = `quantity-${String(++fieldCount)}`;
  protected readonly text = signal('');
  private readonly editing = signal(false);

  protected readonly unit = computed(() => displayUnit(this.kind(), this.units().system));
  private readonly parsed = computed(() => {
    const text = this.text().trim();
    return text === '' ? null : parseQuantity(text, this.kind(), this.units());
  });
  /** What the text stands for, shown while a typed unit differs from the shown one. */
  protected readonly echo = computed(() => {
    const parsed = this.parsed();
    return this.editing() && parsed?.ok === true ? parsed.echo : '';
  });
  protected readonly complaint = computed(() => {
    const parsed = this.parsed();
    if (parsed?.ok === false)
      return parsed.reason + (parsed.suggestion === undefined ? '' : ` Did you mean ${parsed.suggestion}?`);
    if (parsed === null && !this.optional() && this.touched())
      return `Give a value in ${unitsAccepted(this.kind()).slice(0, 4).join(', ')}.`;
    return '';
  });
  private readonly touched = signal(false);
  /** The text is not a quantity that can be accepted. */
  readonly invalid = computed(() => this.parsed()?.ok === false || (this.parsed() === null && !this.optional()));

  constructor() {
    effect(() => {
      this.value();
      this.units();
      this.kind();
      untracked(() => {
        if (!this.editing()) this.text.set(this.shownText());
      });
    });
  }

  focus(): void {
    this.box().nativeElement.focus();
  }

  /** Accepts what stands in the field, if it can be; false when it cannot. */
  commit(): boolean {
    this.touched.set(true);
    this.editing.set(false);
    if (this.invalid()) return false;
    const parsed = this.parsed();
    const si = parsed?.ok === true ? parsed.si : undefined;
    if (si === this.value() || this.text().trim() === this.shownText() || this.text().trim() === this.editedText())
      return true;
    this.accepted.emit(si);
    return true;
  }

  protected startEditing(): void {
    if (this.editing() || this.disabled()) return;
    this.editing.set(true);
    if (!this.invalid()) this.text.set(this.editedText());
    this.box().nativeElement.value = this.text();
    this.box().nativeElement.select();
  }

  protected type(text: string): void {
    this.editing.set(true);
    this.text.set(text);
  }

  protected leave(): void {
    if (this.commit()) this.text.set(this.value() === undefined ? this.text() : this.shownText());
  }

  protected restore(event: Event): void {
    if (this.text() === this.editedText()) return;
    event.stopPropagation();
    event.preventDefault();
    this.text.set(this.editedText());
  }

  private shownText(): string {
    const value = this.value();
    return value === undefined ? '' : formatQuantity(value, this.kind(), this.units(), { withUnit: false });
  }

  private editedText(): string {
    const value = this.value();
    return value === undefined ? '' : formatForEditing(value, this.kind(), this.units());
  }
}

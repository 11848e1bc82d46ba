import { ChangeDetectionStrategy, Component, type ElementRef, input, output, viewChild } from '@angular/core';

export interface Choice {
  readonly value: string;
  readonly words: string;
}

let fieldCount = 0;

/** A choice of a few words; choosing accepts at once. With `none` given, the first line means that there is no value. */
@Component({
  selector: 'app-choice-field',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <label [attr.for]="id">{{ label() }}</label>
    <select #box [id]="id" [disabled]="disabled()" [attr.aria-describedby]="id + '-note'" (change)="choose(box.value)">
      @if (none() !== undefined || value() === undefined) {
        <option value="" [selected]="value() === undefined">{{ none() ?? 'Choose' }}</option>
      }
      @for (choice of choices(); track choice.value) {
        <option [value]="choice.value" [selected]="choice.value === value()">{{ choice.words }}</option>
      }
    </select>
    <span class="note" [id]="id + '-note'">
      @if (refusal(); as wrong) {
        <span class="complaint" role="alert">{{ wrong }}</span>
      } @else {
        {{ hint() }}
      }
    </span>
  `,
  styleUrl: './fields.scss',
})
export class ChoiceField {
  readonly label = input.required<string>();
  readonly choices = input.required<readonly Choice[]>();
  readonly value = input<string>();
  readonly none = input<string>();
  readonly disabled = input(false);
  readonly hint = input('');
  readonly refusal = input('');
  readonly accepted = output<string | undefined>();

  private readonly box = viewChild.required<ElementRef<HTMLSelectElement>>('box');
  protected readonly id = `choice-${String(++fieldCount)}`;

  focus(): void {
    this.box().nativeElement.focus();
  }

  protected choose(value: string): void {
    this.accepted.emit(value === '' ? undefined : value);
  }
}

import { ChangeDetectionStrategy, Component, input, output, viewChildren } from '@angular/core';
import type { DisplayUnits } from '@riseback/units';
import { QuantityField } from '../../shared/quantity-field/quantity-field';
import type { Field, FieldValue, FieldValues } from './field';

let rowCount = 0;

/** Fields side by side. Quantities are handed on in SI; what is not understood stays in its field with the reason. */
@Component({
  selector: 'app-field-row',
  imports: [QuantityField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    @for (field of fields(); track field.key) {
      @if (field.when?.(values()) ?? true) {
        @switch (field.by) {
          @case ('quantity') {
            <app-quantity-field
              [label]="title(field)"
              [kind]="field.quantity"
              [units]="units()"
              [optional]="field.optional ?? false"
              [value]="numberAt(field.key)"
              (accepted)="changed.emit({ key: field.key, value: $event })"
            />
          }
          @case ('text') {
            <label>
              <span>{{ title(field) }}</span>
              <input
                #box
                type="text"
                autocomplete="off"
                [required]="!field.optional"
                [attr.maxlength]="field.maxLength"
                [attr.list]="field.suggestions ? id + field.key : null"
                [value]="values()[field.key] ?? ''"
                (input)="changed.emit({ key: field.key, value: box.value })"
              />
              @if (field.suggestions; as suggestions) {
                <datalist [id]="id + field.key">
                  @for (text of suggestions; track text) {
                    <option [value]="text"></option>
                  }
                </datalist>
              }
            </label>
          }
          @case ('choice') {
            <label>
              <span>{{ title(field) }}</span>
              <select #choice (change)="changed.emit({ key: field.key, value: choice.value })">
                @for (option of field.choices; track option.value) {
                  <option [value]="option.value" [selected]="option.value === values()[field.key]">
                    {{ option.word }}
                  </option>
                }
              </select>
            </label>
          }
        }
      }
    }
  `,
  styleUrl: './fields.scss',
})
export class FieldRow {
  readonly fields = input.required<readonly Field[]>();
  readonly values = input.required<FieldValues>();
  readonly units = input.required<DisplayUnits>();
  /** "2" for the second row of several, so that its fields have names of their own. */
  readonly ordinal = input('');
  readonly changed = output<{ key: string; value: FieldValue }>();

  private readonly quantities = viewChildren(QuantityField);

  protected readonly id = `field-row-${String(++rowCount)}-`;

  /** Takes over what is still being typed; false when some of it cannot be understood. */
  commit(): boolean {
    return this.quantities()
      .map((field) => field.commit())
      .every(Boolean);
  }

  protected title({ title }: Field): string {
    return this.ordinal() === '' ? title : `${title} ${this.ordinal()}`;
  }

  protected numberAt(key: string): number | undefined {
    const value = this.values()[key];
    return typeof value === 'number' ? value : undefined;
  }
}

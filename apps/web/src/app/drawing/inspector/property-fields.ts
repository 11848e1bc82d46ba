import { ChangeDetectionStrategy, Component, input, output, viewChildren } from '@angular/core';
import type { DisplayUnits } from '@riseback/units';
import { QuantityField } from '../../shared/quantity-field/quantity-field';
import { ChoiceField } from '../../shared/fields/choice-field';
import type { FieldSpec } from './element-fields';
import { TextField } from '../../shared/fields/text-field';

export interface FieldChange {
  readonly key: string;
  /** The field's label in small letters, as it stands in the name of the edit. */
  readonly what: string;
  readonly to: unknown;
}

/** Fields for some properties of an element, by their specs. Each accepted value goes out at once. */
@Component({
  selector: 'app-property-fields',
  imports: [ChoiceField, QuantityField, TextField],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './property-fields.html',
  styleUrl: './property-fields.scss',
})
export class PropertyFields {
  readonly specs = input.required<readonly FieldSpec[]>();
  readonly values = input.required<Readonly<Record<string, unknown>>>();
  readonly units = input.required<DisplayUnits>();
  readonly disabled = input(false);
  /** Where filled-in values come from, by key. */
  readonly hints = input<Readonly<Record<string, string>>>({});
  /** Why the last value was refused, and at which field. */
  readonly refusal = input<{ readonly key: string; readonly reason: string } | null>(null);
  readonly changed = output<FieldChange>();

  private readonly quantities = viewChildren(QuantityField);
  private readonly texts = viewChildren(TextField);
  private readonly choices = viewChildren(ChoiceField);

  /** Puts the keyboard on the first field. */
  focusFirst(): void {
    const [first] = this.specs();
    if (first === undefined) return;
    const fields = { quantity: this.quantities(), text: this.texts(), choice: this.choices(), flag: [] } as const;
    fields[first.type][0]?.focus();
  }

  /** Accepts what stands in every field; goes to the first that cannot be accepted and answers false. */
  commit(): boolean {
    for (const text of this.texts()) text.commit();
    const wrong = this.quantities().filter((field) => !field.commit());
    wrong[0]?.focus();
    return wrong.length === 0;
  }

  protected numberOf(key: string): number | undefined {
    const value = this.values()[key];
    return typeof value === 'number' ? value : undefined;
  }

  protected textOf(key: string): string | undefined {
    const value = this.values()[key];
    return typeof value === 'string' ? value : undefined;
  }

  protected refusalAt(key: string): string {
    const refusal = this.refusal();
    return refusal?.key === key ? refusal.reason : '';
  }

  protected hintOf(spec: FieldSpec): string {
    return this.hints()[spec.key] ?? spec.hint ?? '';
  }

  protected change(spec: FieldSpec, to: unknown): void {
    this.changed.emit({ key: spec.key, what: spec.label.toLowerCase(), to });
  }
}

import type { QuantityKind } from '@riseback/units';
import type { Choice } from '../columns/column';

export type FieldValue = string | number | undefined;
export type FieldValues = Readonly<Record<string, FieldValue>>;

/** One field of a dialog. Numbers are SI; a choice's value is never empty. */
export type Field = { readonly key: string; readonly title: string } & (
  | { readonly by: 'quantity'; readonly quantity: QuantityKind; readonly optional?: true }
  | {
      readonly by: 'text';
      readonly maxLength: number;
      readonly optional?: true;
      readonly suggestions?: readonly string[];
    }
  | { readonly by: 'choice'; readonly choices: readonly Choice[] }
) & { readonly when?: (values: FieldValues) => boolean };

/** The number or text of a field that the dialog has made sure of. */
export function numberOf(values: FieldValues, key: string): number {
  const value = values[key];
  if (typeof value !== 'number') throw new RangeError(`The dialog gave no number for ${key}`);
  return value;
}

export function textOf(values: FieldValues, key: string): string {
  const value = values[key];
  if (typeof value !== 'string') throw new RangeError(`The dialog gave no text for ${key}`);
  return value;
}

/** A text that may be left out: absent when empty. */
export function optionalText(values: FieldValues, key: string): Record<string, string> {
  const value = values[key];
  return typeof value === 'string' && value.trim() !== '' ? { [key]: value.trim() } : {};
}

import type { FindingText } from '@riseback/contracts';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

/** A finding's sentence with its numbers in the person's units. */
export function findingWords(text: readonly FindingText[number][], units: DisplayUnits): string {
  return text
    .map((part) =>
      typeof part === 'string' ? part : formatQuantity(part.si, part.quantity, units, { withUnit: true }),
    )
    .join('');
}

export { CHECK_NAMES, checkName } from '@riseback/contracts';

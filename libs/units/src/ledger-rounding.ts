import type { Decimal } from 'decimal.js';
import { exactDecimal, printDecimal } from './printed-number';

/**
 * Rounds a column so that its printed entries add up exactly to its printed total (`roundedSum`): each entry is the difference of
 * two rounded running totals. An entry may differ from its own rounding by one in the last place; entries that are exactly zero
 * print as zero, and an entry never prints with the wrong sign.
 * @param values the column's entries, in display units
 * @param decimals decimals to print
 * @throws RangeError for NaN or infinity
 */
export function roundCumulatively(values: readonly number[], decimals: number): string[] {
  let runningTotal = exactDecimal(0);
  let printedTotal = exactDecimal(0);
  return values.map((value) => {
    runningTotal = runningTotal.plus(finiteDecimal(value));
    const roundedTotal = runningTotal.toDecimalPlaces(decimals);
    const entry = roundedTotal.minus(printedTotal);
    printedTotal = roundedTotal;
    return printDecimal(entry, decimals);
  });
}

/** The closing line of a column: its exact sum, rounded once. */
export function roundedSum(values: readonly number[], decimals: number): string {
  const sum = values.reduce<Decimal>((total, value) => total.plus(finiteDecimal(value)), exactDecimal(0));
  return printDecimal(sum.toDecimalPlaces(decimals), decimals);
}

function finiteDecimal(value: number): Decimal {
  if (!Number.isFinite(value)) throw new RangeError(`A ledger column cannot hold ${String(value)}`);
  return exactDecimal(value);
}

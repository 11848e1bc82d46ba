import { Decimal } from 'decimal.js';

/** Own copy of the constructor, so that nobody's global settings change what is printed; 40 digits hold any sum of doubles printed here. */
const PrintDecimal = Decimal.clone({ precision: 40, rounding: Decimal.ROUND_HALF_UP });

/** U+2212, as wide as a plus sign; the hyphen is not. */
export const MINUS = '\u2212';

export interface PrintForm {
  readonly significantDigits: number;
  readonly minDecimals: number;
  readonly maxDecimals: number;
}

/** A number as the decimal digits it shortest prints as, so that 1.005 rounds to 1.01 as a reader expects. */
export function exactDecimal(value: number): Decimal {
  return new PrintDecimal(value);
}

/**
 * Prints a number to so many significant digits, within limits on its decimals, half away from zero. Zeros beyond the fewest
 * decimals are dropped.
 */
export function printNumber(value: number, form: PrintForm): string {
  const exact = exactDecimal(value);
  const exponent = exact.isZero() ? 0 : exact.toSignificantDigits(form.significantDigits).e;
  const wanted = form.significantDigits - 1 - exponent;
  const decimals = Math.min(form.maxDecimals, Math.max(form.minDecimals, wanted));
  return groupThousands(dropZeros(exact.toFixed(decimals), form.minDecimals));
}

/** Prints a decimal with exactly so many decimals, thousands grouped, U+2212 for minus and never a negative zero. */
export function printDecimal(value: Decimal, decimals: number): string {
  return groupThousands(value.toFixed(decimals));
}

function dropZeros(text: string, minDecimals: number): string {
  const point = text.indexOf('.');
  if (point < 0) return text;
  let end = text.length;
  while (end > point + 1 + minDecimals && text[end - 1] === '0') end -= 1;
  return text.slice(0, end === point + 1 ? point : end);
}

function groupThousands(text: string): string {
  const [whole = '', decimals] = text.replace(/^-/, '').split('.');
  const grouped = whole.replace(/\B(?=(?:\d{3})+$)/g, ',');
  const sign = text.startsWith('-') && /[1-9]/.test(text) ? MINUS : '';
  return `${sign}${grouped}${decimals === undefined ? '' : `.${decimals}`}`;
}

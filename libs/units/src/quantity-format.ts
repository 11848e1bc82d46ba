import { fromDisplay, toDisplay, type DisplayUnits } from './display-conversion';
import { exactDecimal, printDecimal, printNumber } from './printed-number';
import { displayUnit, KINDS, type QuantityKind } from './quantity-kinds';

export interface FormatOptions {
  /** Follow the number with its unit. Default false: units stand once, in the title of a column. */
  readonly withUnit?: boolean;
  /** Exactly so many decimals, instead of the kind's own choice. */
  readonly decimals?: number;
}

/** How close text for editing comes to the stored value. Conversion itself costs a few parts in 1e16. */
const EDITING_RELATIVE_ERROR = 1e-12;

/** Digits that always bring a double back. */
const DIGITS_OF_A_DOUBLE = 17;

/**
 * Writes a stored SI value for reading: thousands separated by commas, U+2212 for minus, never "−0", digits that suit the kind.
 * @param si stored value, in the kind's SI unit
 * @throws RangeError for NaN or infinity: an absent value is for the caller to show
 */
export function formatQuantity(
  si: number,
  kind: QuantityKind,
  units: DisplayUnits,
  options: FormatOptions = {},
): string {
  assertFinite('formatQuantity', si, kind);
  const value = toDisplay(si, kind, units);
  const number =
    options.decimals === undefined
      ? printNumber(value, KINDS[kind].display[units.system])
      : printDecimal(exactDecimal(value), options.decimals);
  const symbol = displayUnit(kind, units.system);
  return options.withUnit === true && symbol !== '' ? `${number} ${symbol}` : number;
}

/**
 * The shortest text, without unit, that reads back as the stored value to 1e-12: what a field holds while it is being edited.
 * Plain digits and a hyphen for minus, since that is what keyboards type.
 * @throws RangeError for NaN or infinity
 */
export function formatForEditing(si: number, kind: QuantityKind, units: DisplayUnits): string {
  assertFinite('formatForEditing', si, kind);
  const value = toDisplay(si, kind, units);
  for (let digits = 1; digits < DIGITS_OF_A_DOUBLE; digits += 1) {
    const shorter = Number(value.toPrecision(digits));
    if (Math.abs(fromDisplay(shorter, kind, units) - si) <= EDITING_RELATIVE_ERROR * Math.abs(si))
      return plain(shorter);
  }
  return plain(value);
}

/** Without an exponent, and "0" for a negative zero. */
function plain(value: number): string {
  return value === 0 ? '0' : exactDecimal(value).toFixed();
}

function assertFinite(where: string, si: number, kind: QuantityKind): void {
  if (!Number.isFinite(si))
    throw new RangeError(`${where}: ${String(si)} is no ${kind}; show an absent value as absent`);
}

import { toSi, type DisplayUnits } from './display-conversion';
import { formatQuantity } from './quantity-format';
import { MINUS } from './printed-number';
import { acceptsUnit, displayUnit, KINDS, type QuantityKind } from './quantity-kinds';
import { foldTypography, NO_NUMBER, readTypedNumber, type TypedNumber } from './typed-number';
import { DIMENSION_NOUNS, findUnit, unitBySymbol, type UnitDefinition } from './unit-catalogue';

export interface ParsedQuantity {
  readonly ok: true;
  /** The value to store. */
  readonly si: number;
  /** How the text was understood, to show beside the field: "40 kg/h is 88.2 lb/h". */
  readonly echo: string;
  /** Symbol of the unit it was read in; '' for plain numbers. */
  readonly unit: string;
}

export interface RefusedQuantity {
  readonly ok: false;
  /** One or two sentences that say what is wrong and what would be right. */
  readonly reason: string;
  /** Text that would be accepted and was probably meant: "75 psig". */
  readonly suggestion?: string;
}

/** A number with the unit it was typed in, before the field's kind has judged it. */
interface TypedQuantity {
  readonly value: number;
  readonly text: string;
  /** Undefined for a bare number. */
  readonly unit: UnitDefinition | undefined;
}

const FEET_THEN_INCHES = /^(?:ft|feet|foot|')\.?\s*-?\s*(?=[\d.])(.+)$/i;
const INCHES_OR_NOTHING = /^(?:in|inch|inches|")?\.?$/i;

/**
 * Reads what a person typed into a quantity field. A bare number is in the field's display unit; a pressure unit that does not say
 * gauge or absolute is taken the way the field shows its values, and the echo says so.
 * @param text what was typed, such as "12 ft 6 in", "30 kPa", "15 psia", "1,040"
 * @param kind what the field holds
 * @param units the person's system and the site's atmosphere
 */
export function parseQuantity(text: string, kind: QuantityKind, units: DisplayUnits): ParsedQuantity | RefusedQuantity {
  const folded = foldTypography(text);
  if (folded === '') return { ok: false, reason: `Type ${KINDS[kind].noun}${hintList(kind)}.` };
  const typed = readTypedQuantity(folded, kind, units);
  if ('ok' in typed) return typed;
  if (typed.unit !== undefined && !acceptsUnit(kind, typed.unit)) return refuseUnit(typed, typed.unit, kind, units);
  const unit = typed.unit ?? displayUnitOf(kind, units);
  const si = unit === undefined ? typed.value : toSi(typed.value, unit, kind, units);
  const impossible = refuseImpossible(si, typed, unit, kind, units);
  return impossible ?? { ok: true, si, echo: echoOf(si, typed, kind, units), unit: unit?.symbol ?? '' };
}

function readTypedQuantity(folded: string, kind: QuantityKind, units: DisplayUnits): TypedQuantity | RefusedQuantity {
  const number = readTypedNumber(folded);
  if ('reason' in number) {
    if (number.reason === NO_NUMBER) return { ok: false, reason: `${NO_NUMBER} ${takes(kind)}` };
    if (number.meant === undefined) return { ok: false, reason: number.reason };
    const meant = `${number.meant.text} ${number.meant.rest}`.trim();
    const accepted = parseQuantity(meant, kind, units).ok;
    return { ok: false, reason: number.reason, ...(accepted ? { suggestion: meant } : {}) };
  }
  if (number.rest === '') return { value: number.value, text: number.text, unit: undefined };
  const unit = findUnit(number.rest);
  if (typeof unit === 'object') return { value: number.value, text: `${number.text} ${unit.symbol}`, unit };
  const feetAndInches = readFeetAndInches(number);
  if (feetAndInches !== undefined) return feetAndInches;
  if (unit !== undefined) return { ok: false, reason: unit };
  const reason = `“${number.rest}” is not a unit this field knows. ${takes(kind)}`;
  return { ok: false, reason, ...suggestDisplayUnit(number.value, number.text, kind, units) };
}

/** "12 ft 6 in", 12' 6", 12'-6 1/2": the sign counts for both parts. */
function readFeetAndInches(feet: TypedNumber): TypedQuantity | RefusedQuantity | undefined {
  const typedInches = FEET_THEN_INCHES.exec(feet.rest)?.[1];
  if (typedInches === undefined) return undefined;
  const inches = readTypedNumber(typedInches);
  if ('reason' in inches) return { ok: false, reason: inches.reason };
  if (!INCHES_OR_NOTHING.test(inches.rest)) return undefined;
  const sign = feet.text.startsWith('-') ? -1 : 1;
  const totalInches = sign * (Math.abs(feet.value) * 12 + inches.value);
  return { value: totalInches, text: `${feet.text} ft ${inches.text} in`, unit: unitBySymbol('in') };
}

function refuseUnit(
  typed: TypedQuantity,
  unit: UnitDefinition,
  kind: QuantityKind,
  units: DisplayUnits,
): RefusedQuantity {
  if (KINDS[kind].dimensions.includes(unit.dimension) && unit.plainSymbol !== undefined) {
    const from = unit.reference === 'absolute' ? 'counts from vacuum' : 'counts from the atmosphere';
    // only a difference can be meant by the same number without its reference; an atmosphere of "0 psig" cannot
    const meantPlain = KINDS[kind].pressureMeaning === 'difference';
    return {
      ok: false,
      reason: `${unit.symbol} ${from}. ${takes(kind)}`,
      ...(meantPlain ? { suggestion: typed.text.replace(unit.symbol, unit.plainSymbol) } : {}),
    };
  }
  const numberText = typed.text.slice(0, typed.text.length - unit.symbol.length).trim();
  const isSingleNumber = !numberText.includes(' ft ');
  return {
    ok: false,
    reason: `${unit.symbol} is ${DIMENSION_NOUNS[unit.dimension]}. ${takes(kind)}`,
    ...(isSingleNumber ? suggestDisplayUnit(typed.value, numberText, kind, units) : {}),
  };
}

function refuseImpossible(
  si: number,
  typed: TypedQuantity,
  unit: UnitDefinition | undefined,
  kind: QuantityKind,
  units: DisplayUnits,
): RefusedQuantity | undefined {
  const shown = withMinus(typed.unit === undefined && unit !== undefined ? `${typed.text} ${unit.symbol}` : typed.text);
  if (!Number.isFinite(si)) return { ok: false, reason: `${shown} is too large.` };
  if (kind === 'temperature' && si < 0) return { ok: false, reason: `${shown} is below absolute zero.` };
  if (kind === 'count' && !(Number.isInteger(si) && si >= 0)) {
    return { ok: false, reason: `${shown} is not a whole number from 0 up.` };
  }
  const meaning = KINDS[kind].pressureMeaning;
  if (meaning === undefined || meaning === 'difference') return undefined;
  const absolutePa = meaning === 'gauge' ? si + units.atmosphericPressurePa : si;
  return absolutePa < 0
    ? { ok: false, reason: `${shown} is below vacuum: its absolute pressure would be negative.` }
    : undefined;
}

function echoOf(si: number, typed: TypedQuantity, kind: QuantityKind, units: DisplayUnits): string {
  const symbol = displayUnit(kind, units.system);
  const text = withMinus(typed.text);
  if (typed.unit === undefined) return `${text} ${symbol}`.trim();
  if (typed.unit.symbol === symbol) return text;
  const shown = formatQuantity(si, kind, units, { withUnit: true });
  const assumed = assumedReference(typed.unit, kind);
  return assumed === undefined ? `${text} is ${shown}` : `${text}, taken as ${assumed}, is ${shown}`;
}

/** For reading; suggestions keep the hyphen, since they go back into the field. */
function withMinus(text: string): string {
  return text.replace(/^-(?=.*[1-9])/, MINUS).replace(/^-/, '');
}

/** The reference a field lends to a pressure unit that names none. */
function assumedReference(unit: UnitDefinition, kind: QuantityKind): 'gauge' | 'absolute' | undefined {
  if (unit.dimension !== 'pressure' || unit.reference !== undefined) return undefined;
  const { pressureMeaning } = KINDS[kind];
  switch (pressureMeaning) {
    case 'storedAbsoluteShownGauge':
    case 'gauge':
      return 'gauge';
    case 'absolute':
      return 'absolute';
    case 'difference':
    case undefined:
      return undefined;
  }
}

function suggestDisplayUnit(
  value: number,
  numberText: string,
  kind: QuantityKind,
  units: DisplayUnits,
): { suggestion?: string } {
  const unit = displayUnitOf(kind, units);
  const si = unit === undefined ? value : toSi(value, unit, kind, units);
  const [low, high] = KINDS[kind].plausible;
  if (!(si >= low && si <= high)) return {};
  const suggestion = `${numberText} ${unit?.symbol ?? ''}`.trim();
  return { suggestion };
}

function displayUnitOf(kind: QuantityKind, units: DisplayUnits): UnitDefinition | undefined {
  const symbol = displayUnit(kind, units.system);
  return symbol === '' ? undefined : unitBySymbol(symbol);
}

function takes(kind: QuantityKind): string {
  return `This field takes ${KINDS[kind].noun}${hintList(kind)}.`;
}

function hintList(kind: QuantityKind): string {
  const { hints } = KINDS[kind];
  return hints.length === 0 ? '' : `: ${hints.join(', ')}`;
}

import { displayUnit, type DisplayUnits, parseQuantity } from '@riseback/units';

/** A dial may be marked in another unit than the person's own. */
export const DIAL_UNITS = ['psig', 'kPa g', 'bar g'] as const;
export type DialUnit = (typeof DIAL_UNITS)[number];

/** What one of the unit is in Pa, and how many decimals a dial of it is read to. */
const UNIT_FORMS: Readonly<Record<DialUnit, { readonly onePa: number; readonly decimals: number }>> = {
  psig: { onePa: 6894.757293168, decimals: 1 },
  'kPa g': { onePa: 1e3, decimals: 1 },
  'bar g': { onePa: 1e5, decimals: 2 },
};

/** Longer than any dial can be read. */
const MOST_CHARACTERS = 8;
const MINUS = '−';

export type KeypadKey = '0' | '1' | '2' | '3' | '4' | '5' | '6' | '7' | '8' | '9' | '.' | 'minus' | 'delete';

export function dialUnitOf(units: DisplayUnits): DialUnit {
  const own = displayUnit('gaugePressure', units.system);
  return DIAL_UNITS.find((unit) => unit === own) ?? 'psig';
}

/** What stands in the field after a key. A key that makes no number of it changes nothing. */
export function pressed(text: string, key: KeypadKey): string {
  if (key === 'delete') return text.slice(0, -1);
  if (key === 'minus') return text.startsWith(MINUS) ? text.slice(1) : `${MINUS}${text}`;
  if (text.replace(MINUS, '').length >= MOST_CHARACTERS) return text;
  if (key === '.') return text.includes('.') ? text : `${text === '' || text === MINUS ? `${text}0` : text}.`;
  return text === '0' || text === `${MINUS}0` ? text.replace('0', key) : text + key;
}

/** The keys of a real keyboard that stand for ours. */
export function keyFor(typed: string): KeypadKey | undefined {
  if (/^[0-9.]$/.test(typed)) return typed as KeypadKey;
  if (typed === ',') return '.';
  if (typed === '-') return 'minus';
  return typed === 'Backspace' ? 'delete' : undefined;
}

/** Gauge pressure; undefined while it is no number yet. */
export function readingPa(text: string, unit: DialUnit, units: DisplayUnits): number | undefined {
  if (!/\d$/.test(text)) return undefined;
  const parsed = parseQuantity(`${text} ${unit}`, 'gaugePressure', units);
  return parsed.ok ? parsed.si : undefined;
}

/** A gauge pressure as it is said in a dial's unit, without the unit. */
export function dialText(pa: number, unit: DialUnit): string {
  const { onePa, decimals } = UNIT_FORMS[unit];
  const text = (pa / onePa).toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', MINUS);
}

export function inDialUnit(pa: number, unit: DialUnit): number {
  return pa / UNIT_FORMS[unit].onePa;
}

/** Why a number that is complete cannot be taken. */
export function readingRefusal(text: string, unit: DialUnit, units: DisplayUnits): string {
  if (!/\d$/.test(text)) return '';
  const parsed = parseQuantity(`${text} ${unit}`, 'gaugePressure', units);
  return parsed.ok ? '' : parsed.reason;
}

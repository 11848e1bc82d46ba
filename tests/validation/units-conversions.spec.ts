// NIST Special Publication 811 (2008), Appendix B, in tests/fixtures/units/conversions.csv: the factor as it follows from the
// definitions, and the seven digits as printed (from memory except the rows whose note says confirmed).
import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';
import { describe, expect, it } from 'vitest';
import { relativeError } from '@riseback/numerics';
import { parseQuantity, type DisplayUnits, type QuantityKind } from '@riseback/units';

interface Row {
  readonly from_unit: string;
  readonly factor: string;
  readonly sp811_printed: string;
}

const SI: DisplayUnits = { system: 'si', atmosphericPressurePa: 101_325 };

/** How each row's unit is typed, the kind that takes it, and SI units of the row in one SI unit of the kind. */
const TYPED: Readonly<Record<string, { text: string; kind: QuantityKind; scale?: number }>> = {
  psi: { text: '1 psi', kind: 'pressureDifference' },
  bar: { text: '1 bar', kind: 'pressureDifference' },
  'kgf/cm2': { text: '1 kgf/cm2', kind: 'pressureDifference' },
  'inHg conventional': { text: '1 inHg', kind: 'pressureDifference' },
  'inH2O conventional': { text: '1 inH2O', kind: 'pressureDifference' },
  'ftH2O conventional': { text: '1 ftH2O', kind: 'pressureDifference' },
  torr: { text: '1 torr', kind: 'pressureDifference' },
  lb: { text: '1 lb/s', kind: 'massFlow' },
  in: { text: '1 in', kind: 'length' },
  'lb/ft3': { text: '1 lb/ft3', kind: 'density' },
  'Btu_IT/lb': { text: '1 Btu/lb', kind: 'specificEnthalpy' },
  // 1 Btu/(h·ft) in W/m is Btu/J over 3600 s and 0.3048 m
  Btu_IT: { text: '1 Btu/h·ft', kind: 'heatLossPerLength', scale: 3600 * 0.3048 },
  'ft/min': { text: '1 ft/min', kind: 'velocity' },
  'US ton (short)': { text: '2 klb/h', kind: 'massFlow', scale: 3600 },
};

/** Rows for quantities no field of Riseback holds. */
const NOT_TYPED = ['ft3', 'UK gal', 'Btu_IT/(lb F)', 'hp (550 ft lbf/s)', 'cP', 'lbf', 'ft3/lb', 'ft lbf'];

const path = new URL('../fixtures/units/conversions.csv', import.meta.url);
const rows = parse<Row>(readFileSync(path, 'utf8'), { columns: true, comment: '#', comment_no_infix: true });

describe('conversion factors of NIST SP 811', () => {
  it.each(rows.filter((row) => !NOT_TYPED.includes(row.from_unit)))('$from_unit', (row) => {
    const typed = TYPED[row.from_unit];
    if (typed === undefined) throw new Error(`The spec does not say how ${row.from_unit} is typed`);
    const parsed = parseQuantity(typed.text, typed.kind, SI);
    if (!parsed.ok) throw new Error(parsed.reason);
    const factor = parsed.si * (typed.scale ?? 1);
    // values are stored to fifteen digits: half a unit in the last of them
    expect(relativeError(factor, Number(row.factor))).toBeLessThan(5.1e-15);
    // seven printed digits: half a unit in the last of them
    expect(factor.toExponential(6)).toBe(Number(row.sp811_printed.replace(' ', '')).toExponential(6));
  });

  it('leaves no row of the table aside unnoticed', () => {
    expect(rows.map((row) => row.from_unit).sort()).toEqual([...Object.keys(TYPED), ...NOT_TYPED].sort());
  });

  // SP 811, B.8, temperature: T/K = (t/°F + 459.67)/1.8 and T/K = t/°C + 273.15
  it.each([
    ['32 °F', 273.15],
    ['212 °F', 373.15],
    ['-40 °F', 233.15],
    ['-40 °C', 233.15],
    ['-459.67 °F', 0],
    ['671.67 °R', 373.15],
  ])('%s is %d K', (text, kelvin) => {
    expect(parseQuantity(text, 'temperature', SI)).toMatchObject({ ok: true, si: kelvin });
  });
});

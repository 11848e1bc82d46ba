import { describe, expect, it } from 'vitest';
import { findUnit, unitBySymbol, unitKeys, UNITS } from './unit-catalogue';
import { KINDS, unitsAccepted, type QuantityKind } from './quantity-kinds';

describe('the catalogue of units', () => {
  it('gives no spelling to two units', () => {
    const keys = UNITS.flatMap(unitKeys);
    const repeated = keys.filter((key, index) => keys.indexOf(key) !== index);
    expect(repeated).toEqual([]);
  });

  it('finds every unit by its own symbol', () => {
    expect(UNITS.filter((unit) => findUnit(unit.symbol) !== unit).map((unit) => unit.symbol)).toEqual([]);
  });

  it.each([
    ['lb/hr', 'lb/h'],
    ['LBS / H', 'lb/h'],
    ['lb per h', 'lb/h'],
    ['bar(g)', 'bar g'],
    ['barg', 'bar g'],
    ['bar a', 'bar a'],
    ['bar abs.', 'bar a'],
    ['KPA abs', 'kPa abs'],
    ['kPa (gauge)', 'kPa g'],
    ['in w.g.', 'inH2O'],
    ['in. H₂O', 'inH2O'],
    ['in. Hg', 'inHg'],
    ['psi / 100 ft', 'psi/100 ft'],
    ['Btu/(h·ft)', 'Btu/h·ft'],
    ['BTU/hr ft', 'Btu/h·ft'],
    ['lb/ft^3', 'lb/ft³'],
    ['deg F', '°F'],
    ['º C', '°C'],
    ['fpm', 'ft/min'],
    ['MPA', 'MPa'],
  ])('reads "%s" as %s', (spelling, symbol) => {
    expect(findUnit(spelling)).toBe(unitBySymbol(symbol));
  });

  it.each(['mPa', 'Mbar', 'ton/h', 'Tons/hr'])('asks back about "%s" instead of guessing', (spelling) => {
    expect(findUnit(spelling)).toEqual(expect.stringMatching(/Write /));
  });

  it('knows no unit that is not there', () => {
    expect(findUnit('furlong')).toBeUndefined();
    expect(() => unitBySymbol('furlong')).toThrow(RangeError);
  });
});

describe('the kinds', () => {
  const kinds = Object.keys(KINDS) as QuantityKind[];

  it.each(kinds)('%s accepts every unit it hints at and shows itself in', (kind) => {
    const { hints, display } = KINDS[kind];
    const accepted = unitsAccepted(kind);
    expect(accepted.slice(0, hints.length)).toEqual(hints);
    const shown = [display.us.unit, display.si.unit].filter((symbol) => symbol !== '');
    expect(accepted).toEqual(expect.arrayContaining(shown));
  });

  it('a difference accepts no unit with a reference, an absolute pressure none from the atmosphere', () => {
    expect(unitsAccepted('pressureDifference')).not.toEqual(expect.arrayContaining(['psig']));
    expect(unitsAccepted('pressureDifference')).not.toEqual(expect.arrayContaining(['psia']));
    expect(unitsAccepted('absolutePressure')).not.toEqual(expect.arrayContaining(['psig']));
    expect(unitsAccepted('pressure')).toEqual(expect.arrayContaining(['psig', 'psia', 'psi', 'bar g', 'bar a', 'bar']));
  });
});

import { describe, expect, it } from 'vitest';
import {
  displayUnit,
  formatForEditing,
  formatQuantity,
  toDisplay,
  type DisplayUnits,
  type QuantityKind,
} from './index';

const US: DisplayUnits = { system: 'us', atmosphericPressurePa: 101_325 };
const SI: DisplayUnits = { system: 'si', atmosphericPressurePa: 101_325 };

describe('quantities for reading', () => {
  // converted by hand with the factors of NIST SP 811 (2008), App. B
  it.each<[si: number, kind: QuantityKind, us: string, inSi: string]>([
    [139_408, 'pressure', '5.5 psig', '38.1 kPa g'],
    [101_325, 'pressure', '0.0 psig', '0.0 kPa g'],
    [101_324.9, 'pressure', '0.0 psig', '0.0 kPa g'],
    [66_850, 'pressure', '−5.0 psig', '−34.5 kPa g'],
    [101_325, 'absolutePressure', '14.70 psia', '101.33 kPa abs'],
    [34_474, 'pressureDifference', '5.0 psi', '34.5 kPa'],
    [3_583, 'pressureDifference', '0.52 psi', '3.6 kPa'],
    [27, 'pressureDifference', '0.0 psi', '0.03 kPa'],
    [-3_583, 'pressureDifference', '−0.52 psi', '−3.6 kPa'],
    [-0.001, 'pressureDifference', '0.0 psi', '0.0 kPa'],
    [3.048, 'length', '10 ft', '3.048 m'],
    [1_000, 'length', '3,280.84 ft', '1,000 m'],
    [0.0266446, 'diameter', '1.049 in', '26.64 mm'],
    [4.572e-5, 'roughness', '0.0018 in', '0.0457 mm'],
    [0.05, 'massFlow', '397 lb/h', '180 kg/h'],
    [1 / 90, 'massFlow', '88.2 lb/h', '40 kg/h'],
    [2, 'massFlow', '15,873 lb/h', '7,200 kg/h'],
    [458.7, 'temperature', '366 °F', '185.6 °C'],
    [233.15, 'temperature', '−40 °F', '−40.0 °C'],
    [5, 'temperatureDifference', '9 °F', '5 K'],
    [3.048, 'velocity', '600 ft/min', '3.05 m/s'],
    [226.2, 'pressureGradient', '1 psi/100 ft', '226 Pa/m'],
    [11_310.297, 'pressurePerRise', '0.5 psi/ft', '11.3 kPa/m'],
    [1_000, 'momentumFlux', '672 lb/ft·s²', '1,000 Pa'],
    [0.1003, 'quality', '10 %', '10 %'],
    [0.00347, 'fraction', '0.35 %', '0.35 %'],
    [1.25, 'factor', '1.25', '1.25'],
    [3, 'count', '3', '3'],
    [96.15, 'heatLossPerLength', '100 Btu/h·ft', '96.2 W/m'],
    [2_326_000, 'specificEnthalpy', '1,000.0 Btu/lb', '2,326.0 kJ/kg'],
    [958.35, 'density', '59.8 lb/ft³', '958 kg/m³'],
  ])('%d of %s', (si, kind, us, inSi) => {
    expect(formatQuantity(si, kind, US, { withUnit: true })).toBe(us);
    expect(formatQuantity(si, kind, SI, { withUnit: true })).toBe(inSi);
  });

  it('leaves the unit to the column title and takes a column’s own decimals', () => {
    expect(formatQuantity(34_474, 'pressureDifference', US)).toBe('5.0');
    expect(formatQuantity(34_474, 'pressureDifference', US, { decimals: 3 })).toBe('5.000');
    expect(formatQuantity(-1, 'pressureDifference', US, { decimals: 2 })).toBe('0.00');
  });

  it('rounds half away from zero on the digits a reader sees', () => {
    expect(formatQuantity(1.005, 'factor', SI, { decimals: 2 })).toBe('1.01');
    expect(formatQuantity(-1.005, 'factor', SI, { decimals: 2 })).toBe('−1.01');
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY])('does not print %d', (absent) => {
    expect(() => formatQuantity(absent, 'length', US)).toThrow(RangeError);
    expect(() => formatForEditing(absent, 'length', US)).toThrow(RangeError);
  });

  it('shows gauge pressures and pressure differences in one unit, so that a ledger adds up', () => {
    expect([displayUnit('pressure', 'us'), displayUnit('pressureDifference', 'us')]).toEqual(['psig', 'psi']);
    expect([displayUnit('pressure', 'si'), displayUnit('pressureDifference', 'si')]).toEqual(['kPa g', 'kPa']);
    expect(toDisplay(139_408, 'pressure', SI)).toBe(38.083);
  });
});

describe('quantities for editing', () => {
  it.each<[si: number, kind: QuantityKind, units: DisplayUnits, text: string]>([
    [3.048, 'length', US, '10'],
    [3.048, 'length', SI, '3.048'],
    [-1.3716, 'length', US, '-4.5'],
    [101_325, 'pressure', US, '0'],
    [204_746.359_397_525_4, 'pressure', US, '15'],
    [131_325, 'pressure', SI, '30'],
    [0.0381, 'diameter', US, '1.5'],
    [0.0381, 'diameter', SI, '38.1'],
    [0.05, 'massFlow', SI, '180'],
    [273.15, 'temperature', US, '32'],
    [0.07, 'fraction', US, '7'],
    [1e-7, 'factor', SI, '0.0000001'],
    [1e21, 'factor', SI, '1000000000000000000000'],
    [-0, 'length', US, '0'],
  ])('%d of %s', (si, kind, units, text) => {
    expect(formatForEditing(si, kind, units)).toBe(text);
  });

  it('keeps what a stored value needs, and no more', () => {
    // 0.05 · 3600 / 0.45359237 = 396.83207193…
    expect(formatForEditing(0.05, 'massFlow', US)).toMatch(/^396\.83207193\d{1,6}$/);
  });
});

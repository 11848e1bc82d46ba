import { describe, expect, it } from 'vitest';
import { relativeError } from '@riseback/numerics';
import { parseQuantity, type DisplayUnits, type QuantityKind, type RefusedQuantity } from './index';

const US: DisplayUnits = { system: 'us', atmosphericPressurePa: 101_325 };
const SI: DisplayUnits = { system: 'si', atmosphericPressurePa: 101_325 };

// Expected values by hand from the exact definitions of NIST SP 811 (2008), App. B: 1 ft = 0.3048 m, 1 lb = 0.45359237 kg,
// 1 psi = 6894.757293168… Pa; and values are stored to fifteen digits: half a unit in the
// last of them.
const STORED = 5.1e-15;

function refusal(text: string, kind: QuantityKind, units = US): RefusedQuantity {
  const parsed = parseQuantity(text, kind, units);
  if (parsed.ok) throw new Error(`"${text}" was read as ${parsed.echo}`);
  return parsed;
}

describe('what a quantity field understands', () => {
  it.each<[text: string, kind: QuantityKind, si: number, echo: string]>([
    ['12 ft', 'length', 3.6576, '12 ft'],
    ['12', 'length', 3.6576, '12 ft'],
    ["12'", 'length', 3.6576, '12 ft'],
    ['12ft', 'length', 3.6576, '12 ft'],
    ['12 ft 6 in', 'length', 3.81, '12 ft 6 in is 12.5 ft'],
    ["12' 6", 'length', 3.81, '12 ft 6 in is 12.5 ft'],
    ['12\'-6"', 'length', 3.81, '12 ft 6 in is 12.5 ft'],
    ['12′ 6″', 'length', 3.81, '12 ft 6 in is 12.5 ft'],
    ["12'6''", 'length', 3.81, '12 ft 6 in is 12.5 ft'],
    ['-4 ft 6 in', 'length', -1.3716, '−4 ft 6 in is −4.5 ft'],
    ['-0 ft 6 in', 'length', -0.1524, '−0 ft 6 in is −0.5 ft'],
    ['12 ft 6-1/2 in', 'length', 3.8227, '12 ft 6-1/2 in is 12.54 ft'],
    ['3.048 m', 'length', 3.048, '3.048 m is 10 ft'],
    ['1/2 in', 'diameter', 0.0127, '1/2 in'],
    ['1-1/2 in', 'diameter', 0.0381, '1-1/2 in'],
    ['1 1/2"', 'diameter', 0.0381, '1-1/2 in'],
    ['1½″', 'diameter', 0.0381, '1-1/2 in'],
    ['0.5"', 'diameter', 0.0127, '0.5 in'],
    ['.5 in', 'diameter', 0.0127, '.5 in'],
    ['25.4 mm', 'diameter', 0.0254, '25.4 mm is 1 in'],
    ['4.5e-5 m', 'roughness', 4.5e-5, '4.5e-5 m is 0.00177 in'],
    ['2 psig', 'pressure', 115_114.514_586_336_72, '2 psig'],
    ['0', 'pressure', 101_325, '0 psig'],
    ['15 psia', 'pressure', 103_421.359_397_525_4, '15 psia is 0.3 psig'],
    ['15 psi', 'pressure', 204_746.359_397_525_4, '15 psi, taken as gauge, is 15.0 psig'],
    ['30 kPa', 'pressure', 131_325, '30 kPa, taken as gauge, is 4.4 psig'],
    ['200 kPa abs', 'pressure', 200_000, '200 kPa abs is 14.3 psig'],
    ['1 barg', 'pressure', 201_325, '1 bar g is 14.5 psig'],
    ['2 bar a', 'pressure', 200_000, '2 bar a is 14.3 psig'],
    ['−5 psig', 'pressure', 66_851.213_534_158_2, '−5 psig'],
    ['29.92 inHg', 'absolutePressure', 101_320.758_88, '29.92 inHg, taken as absolute, is 14.70 psia'],
    ['1013.25 mbar', 'absolutePressure', 101_325, '1013.25 mbar, taken as absolute, is 14.70 psia'],
    ['100 psig', 'gaugePressure', 689_475.729_316_836_1, '100 psig'],
    ['114.7 psia', 'gaugePressure', 689_503.661_526_410_9, '114.7 psia is 100.0 psig'],
    ['5 psi', 'pressureDifference', 34_473.786_465_841_8, '5 psi'],
    ['10 in w.g.', 'pressureDifference', 2_490.889, '10 inH2O is 0.36 psi'],
    ['40 kg/h', 'massFlow', 1 / 90, '40 kg/h is 88.2 lb/h'],
    ['1,040', 'massFlow', (1040 * 0.45359237) / 3600, '1,040 lb/h'],
    ['1 040 lb/hr', 'massFlow', (1040 * 0.45359237) / 3600, '1 040 lb/h'],
    ['1.5 t/h', 'massFlow', 1500 / 3600, '1.5 t/h is 3,307 lb/h'],
    ['2 kg/s', 'massFlow', 2, '2 kg/s is 15,873 lb/h'],
    ['366 F', 'temperature', ((366 + 459.67) * 5) / 9, '366 °F'],
    ['185 C', 'temperature', 458.15, '185 °C is 365 °F'],
    ['300 K', 'temperature', 300, '300 K is 80.3 °F'],
    ['9 °F', 'temperatureDifference', 5, '9 °F'],
    ['5 K', 'temperatureDifference', 5, '5 K is 9 °F'],
    ['600 fpm', 'velocity', 3.048, '600 ft/min'],
    ['2 m/s', 'velocity', 2, '2 m/s is 394 ft/min'],
    ['1.5 psi/100 ft', 'pressureGradient', 339.308_921_907_891_8, '1.5 psi/100 ft'],
    ['100 Pa/m', 'pressureGradient', 100, '100 Pa/m is 0.442 psi/100 ft'],
    ['0.5', 'pressurePerRise', 11_310.297_396_929_7, '0.5 psi/ft'],
    ['25', 'fraction', 0.25, '25 %'],
    ['25%', 'quality', 0.25, '25 %'],
    ['3', 'factor', 3, '3'],
    ['90 %', 'factor', 0.9, '90 % is 0.9'],
    ['4', 'count', 4, '4'],
    ['-0', 'length', 0, '0 ft'],
  ])('"%s" for a %s', (text, kind, si, echo) => {
    const parsed = parseQuantity(text, kind, US);
    expect(parsed).toMatchObject({ ok: true, echo });
    expect(parsed.ok && relativeError(parsed.si, si)).toBeLessThan(STORED);
  });

  it('takes a bare number in the unit that is shown', () => {
    expect(parseQuantity('30', 'pressure', SI)).toEqual({ ok: true, si: 131_325, echo: '30 kPa g', unit: 'kPa g' });
    expect(parseQuantity('30', 'diameter', SI)).toMatchObject({ si: 0.03, echo: '30 mm' });
    expect(parseQuantity('36', 'massFlow', SI)).toMatchObject({ si: 0.01, echo: '36 kg/h' });
  });

  it('counts gauge from the site atmosphere', () => {
    const high: DisplayUnits = { system: 'si', atmosphericPressurePa: 84_000 };
    expect(parseQuantity('100', 'pressure', high)).toMatchObject({ si: 184_000 });
    expect(parseQuantity('100 kPa abs', 'pressure', high)).toMatchObject({
      si: 100_000,
      echo: '100 kPa abs is 16.0 kPa g',
    });
  });

  it('stores round numbers for round entries, also where the factor is no binary fraction', () => {
    expect(parseQuantity('1-1/2 in', 'diameter', US)).toMatchObject({ si: 0.0381 });
    expect(parseQuantity('32 °F', 'temperature', US)).toMatchObject({ si: 273.15 });
    expect(parseQuantity('7 %', 'fraction', US)).toMatchObject({ si: 0.07 });
  });
});

describe('what a quantity field refuses, in words', () => {
  it('names the dimension typed, what belongs here, and what was probably meant', () => {
    expect(refusal('75 ft', 'pressure')).toEqual({
      ok: false,
      reason: 'ft is a length. This field takes a pressure: psig, psia, kPa, bar.',
      suggestion: '75 psig',
    });
    expect(refusal('12 psi', 'length').suggestion).toBe('12 ft');
    expect(refusal('3 ft', 'count')).toEqual({
      ok: false,
      reason: 'ft is a length. This field takes a whole number.',
      suggestion: '3',
    });
  });

  it('suggests nothing implausible', () => {
    expect(refusal('9000 ft', 'pressure').suggestion).toBeUndefined();
    expect(refusal('80 °F', 'diameter', US).suggestion).toBe('80 in');
    expect(refusal('5000 lb/h', 'diameter').suggestion).toBeUndefined();
    expect(refusal('5 ft 3 in', 'pressure').suggestion).toBeUndefined();
  });

  it.each<[text: string, kind: QuantityKind, reason: RegExp, suggestion: string | undefined]>([
    ['15 psia', 'pressureDifference', /^psia counts from vacuum\. This field takes a pressure difference/, '15 psi'],
    ['2 psig', 'pressureDifference', /^psig counts from the atmosphere\. This field takes a pressure diff/, '2 psi'],
    ['2 bar g', 'pressureDifference', /^bar g counts from the atmosphere/, '2 bar'],
    [
      '0 psig',
      'absolutePressure',
      /^psig counts from the atmosphere\. This field takes an absolute pressure/,
      undefined,
    ],
  ])('%s for a %s: gauge and absolute are never mixed', (text, kind, reason, suggestion) => {
    const refused = refusal(text, kind);
    expect(refused.reason).toMatch(reason);
    expect(refused.suggestion).toBe(suggestion);
  });

  it.each([
    ['1.040,5 lb/h', /comma after its points/, '1040.5 lb/h'],
    ['12,5', /^The comma in 12,5 does not separate thousands/, '12.5'],
    ['0,500 kg/h', /does not separate thousands/, '0.500 kg/h'],
    [',5', /does not separate thousands/, '0.5'],
    ['1,04,000', /^The commas in 1,04,000 do not separate thousands/, undefined],
    ['1.2.3', /more than one decimal point/, undefined],
    ['lb/h', /^There is no number at the start\. This field takes a mass flow: lb\/h, kg\/h/, undefined],
    ['.', /^There is no number at the start/, undefined],
    ['1/0', /divides by zero/, undefined],
    ['1e400', /too large/, undefined],
    ['', /^Type a mass flow: lb\/h/, undefined],
    ['   ', /^Type a mass flow/, undefined],
    ['2 ton/h', /^A ton can be/, undefined],
    ['2 stone', /^“stone” is not a unit this field knows\. This field takes a mass flow/, '2 lb/h'],
    ['2 lb/h 3', /not a unit this field knows/, '2 lb/h'],
  ])('"%s" for a mass flow', (text, reason, suggestion) => {
    const refused = refusal(text, 'massFlow');
    expect(refused.reason).toMatch(reason);
    expect(refused.suggestion).toBe(suggestion);
  });

  it.each<[text: string, kind: QuantityKind, reason: string]>([
    ['-460 F', 'temperature', '−460 °F is below absolute zero.'],
    ['-1 K', 'temperature', '−1 K is below absolute zero.'],
    ['-15', 'pressure', '−15 psig is below vacuum: its absolute pressure would be negative.'],
    ['-1 psia', 'pressure', '−1 psia is below vacuum: its absolute pressure would be negative.'],
    ['-1.1 bar', 'gaugePressure', '−1.1 bar is below vacuum: its absolute pressure would be negative.'],
    ['-1 psia', 'absolutePressure', '−1 psia is below vacuum: its absolute pressure would be negative.'],
    ['2.5', 'count', '2.5 is not a whole number from 0 up.'],
    ['-2', 'count', '−2 is not a whole number from 0 up.'],
  ])('"%s" for a %s', (text, kind, reason) => {
    expect(refusal(text, kind).reason).toBe(reason);
  });

  it('never suggests what it would refuse', () => {
    expect(refusal('12,5 ft', 'pressure').suggestion).toBeUndefined();
    expect(refusal('1,5', 'count').suggestion).toBeUndefined();
  });
});

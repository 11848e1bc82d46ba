import { describe, expect, it } from 'vitest';
import {
  region1,
  region2,
  saturationPressurePa,
  saturationTemperatureK,
  SteamRangeError,
  surfaceTensionNM,
  viscosityPaS,
} from './index';

describe('every equation refuses what lies outside its printed range', () => {
  it.each([
    { name: 'region1 pressure', call: () => region1(101e6, 300), quantity: 'pressure', value: 101e6 },
    { name: 'region1 temperature', call: () => region1(1e6, 624), quantity: 'temperature', value: 624 },
    { name: 'region1 NaN', call: () => region1(1e6, NaN), quantity: 'temperature', value: NaN },
    { name: 'region2 pressure', call: () => region2(0, 500), quantity: 'pressure', value: 0 },
    { name: 'region2 temperature', call: () => region2(1e5, 1074), quantity: 'temperature', value: 1074 },
    { name: 'region2 NaN', call: () => region2(NaN, 500), quantity: 'pressure', value: NaN },
    { name: 'saturation pressure', call: () => saturationPressurePa(273), quantity: 'temperature', value: 273 },
    { name: 'saturation temperature', call: () => saturationTemperatureK(23e6), quantity: 'pressure', value: 23e6 },
    { name: 'surface tension', call: () => surfaceTensionNM(650), quantity: 'temperature', value: 650 },
    { name: 'viscosity temperature', call: () => viscosityPaS(200, 1000), quantity: 'temperature', value: 200 },
    { name: 'viscosity density', call: () => viscosityPaS(300, -1), quantity: 'density', value: -1 },
  ])('$name', ({ call, quantity, value }) => {
    expect(call).toThrow(SteamRangeError);
    expect(call).toThrow(expect.objectContaining({ quantity, value }));
  });

  it('says what, how much and between which limits', () => {
    expect(() => saturationPressurePa(700)).toThrow(
      'The temperature of boiling water is 700 K; it must lie between 273.15 and 647.096 K.',
    );
  });
});

import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import {
  liquidAtEnthalpy,
  liquidAtTemperature,
  region1,
  region2,
  saturationState,
  saturationTemperatureK,
  SATURATION_RANGE_PA,
  SteamRangeError,
  vapourAtEnthalpy,
} from './index';

const [LOW, HIGH] = SATURATION_RANGE_PA;
/** Pressures over the range and shares of 0 to 1, spread evenly without a pattern. */
const states = Array.from({ length: 5000 }, (_, i) => ({
  p: Math.max(LOW, LOW * (HIGH / LOW) ** ((i * 0.6180339887498949) % 1)),
  share: (i * 0.7548776662466927) % 1,
}));

describe('liquid', () => {
  it('is found again from its enthalpy, from freezing to boiling', () => {
    for (const { p, share } of states) {
      const T = 273.15 + share * (saturationTemperatureK(p) - 273.15);
      const expected = region1(p, T);
      const found = liquidAtEnthalpy(p, expected.enthalpyJKg);
      expect(Math.abs(found.temperatureK - T)).toBeLessThan(2e-6);
      expect(relativeError(found.densityKgM3, expected.densityKgM3)).toBeLessThan(1e-8);
      expect(liquidAtTemperature(p, T).densityKgM3).toBe(expected.densityKgM3);
    }
  });

  it('takes the boiling enthalpy and temperature of the table, whichever way they were rounded', () => {
    for (const { p } of states) {
      const { liquidEnthalpyJKg, liquidDensityKgM3, liquidViscosityPaS, temperatureK } = saturationState(p);
      for (const liquid of [liquidAtEnthalpy(p, liquidEnthalpyJKg), liquidAtTemperature(p, temperatureK)]) {
        // no step where subcooled flow begins to flash
        expect(relativeError(liquid.densityKgM3, liquidDensityKgM3)).toBeLessThan(1e-6);
        expect(relativeError(liquid.viscosityPaS, liquidViscosityPaS)).toBeLessThan(1e-6);
      }
    }
  });

  it.each([NaN, Infinity, -Infinity, -1e9, -5000, 419_500, 1e6, 1e9])(
    'refuses an enthalpy of %s J/kg at one atmosphere',
    (h) => {
      // 418,991 J/kg is boiling water there
      expect(() => liquidAtEnthalpy(101_325, h)).toThrow(SteamRangeError);
      expect(() => liquidAtEnthalpy(101_325, h)).toThrow(
        /^The enthalpy of liquid water at 101325 Pa is .* and 41899\d J\/kg\.$/,
      );
    },
  );

  it.each([NaN, 273.1, 373.2, 1000])('refuses %s K at one atmosphere', (T) => {
    expect(() => liquidAtTemperature(101_325, T)).toThrow(
      /^The temperature of liquid water at 101325 Pa is .* and 373\.124 K\.$/,
    );
  });
});

describe('steam', () => {
  it('is found again from its enthalpy, from saturation to 800 °C', () => {
    for (const { p, share } of states) {
      const boiling = saturationTemperatureK(p);
      const T = boiling + share * (1073.15 - boiling);
      const expected = region2(p, T);
      const found = vapourAtEnthalpy(p, expected.enthalpyJKg);
      expect(Math.abs(found.temperatureK - T)).toBeLessThan(2e-6);
      expect(relativeError(found.densityKgM3, expected.densityKgM3)).toBeLessThan(1e-8);
    }
  });

  it('takes the enthalpy of saturated vapour from the table', () => {
    for (const { p } of states) {
      const { vapourEnthalpyJKg, vapourDensityKgM3, vapourViscosityPaS } = saturationState(p);
      const steam = vapourAtEnthalpy(p, vapourEnthalpyJKg);
      expect(relativeError(steam.densityKgM3, vapourDensityKgM3)).toBeLessThan(1e-6);
      expect(relativeError(steam.viscosityPaS, vapourViscosityPaS)).toBeLessThan(1e-6);
    }
  });

  it.each([NaN, Infinity, -1e9, 2.6e6, 4.2e6, 1e9])('refuses an enthalpy of %s J/kg at one atmosphere', (h) => {
    // 2,675,530 J/kg is saturated vapour there
    expect(() => vapourAtEnthalpy(101_325, h)).toThrow(SteamRangeError);
    expect(() => vapourAtEnthalpy(101_325, h)).toThrow(
      /^The enthalpy of steam at 101325 Pa is .* between 267553\d and /,
    );
  });
});

describe('both', () => {
  it.each([NaN, 0, 649, 1.1e7])('refuse a pressure of %s Pa', (p) => {
    const calls = [() => liquidAtEnthalpy(p, 1e5), () => liquidAtTemperature(p, 300), () => vapourAtEnthalpy(p, 2.8e6)];
    for (const call of calls) {
      expect(call).toThrow(
        expect.objectContaining({ name: 'SteamRangeError', quantity: 'pressure', low: LOW, high: HIGH }),
      );
    }
  });
});

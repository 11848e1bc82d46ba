import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import {
  saturationPressurePa,
  saturationSlopes,
  saturationState,
  saturationStateDirect,
  SATURATION_RANGE_PA,
  SteamRangeError,
  type SaturationState,
} from './index';

const [LOW, HIGH] = SATURATION_RANGE_PA;
const PROPERTIES = [
  'temperatureK',
  'liquidDensityKgM3',
  'vapourDensityKgM3',
  'liquidEnthalpyJKg',
  'vapourEnthalpyJKg',
  'liquidViscosityPaS',
  'vapourViscosityPaS',
  'surfaceTensionNM',
] as const satisfies readonly (keyof SaturationState)[];

/** Pressure at a share of the range in ln p. */
const pressureAt = (share: number): number => Math.min(HIGH, Math.max(LOW, LOW * (HIGH / LOW) ** share));

/** 20,000 shares spread evenly without a pattern: multiples of the golden ratio, modulo 1. */
const scattered = Array.from({ length: 20_000 }, (_, i) => (i * 0.6180339887498949) % 1);

/** Ends, quarters and middles of the table's cells: shares of the range in p^¼, turned into shares in ln p. */
const regular = Array.from({ length: 2049 }, (_, i) => {
  const root = LOW ** 0.25 + (i / 2048) * (HIGH ** 0.25 - LOW ** 0.25);
  return Math.log(root ** 4 / LOW) / Math.log(HIGH / LOW);
});

describe('saturationState', () => {
  it('interpolates every property within 1e-7 of the equations everywhere', () => {
    const worst = new Map<keyof SaturationState, number>();
    for (const share of [...scattered, ...regular]) {
      const p = pressureAt(share);
      const direct = saturationStateDirect(p);
      const fast = saturationState(p);
      for (const property of PROPERTIES) {
        worst.set(property, Math.max(worst.get(property) ?? 0, relativeError(fast[property], direct[property])));
      }
    }
    for (const property of PROPERTIES) expect(worst.get(property), property).toBeLessThan(1e-7);
  });

  it('answers at both ends of its range', () => {
    for (const p of [LOW, HIGH]) {
      for (const property of PROPERTIES) {
        expect(relativeError(saturationState(p)[property], saturationStateDirect(p)[property])).toBeLessThan(1e-12);
      }
    }
  });

  it.each([
    { property: 'temperatureK', rises: true },
    { property: 'liquidDensityKgM3', rises: false },
    { property: 'vapourDensityKgM3', rises: true },
    { property: 'liquidEnthalpyJKg', rises: true },
    { property: 'liquidViscosityPaS', rises: false },
    { property: 'vapourViscosityPaS', rises: true },
    { property: 'surfaceTensionNM', rises: false },
  ] as const)('keeps $property monotone', ({ property, rises }) => {
    // density of water has its maximum at 4 °C, 813 Pa: look above it
    let before = saturationState(850)[property];
    for (let p = 850 * 1.0002; p < HIGH; p *= 1.0002) {
      const value = saturationState(p)[property];
      expect(rises ? value > before : value < before, `${property} at ${p} Pa`).toBe(true);
      before = value;
    }
  });

  it('has no kink: one-sided slopes agree at all nodes and inside the cells', () => {
    const share = 1e-6;
    for (const here of regular.slice(1, -1)) {
      for (const property of PROPERTIES) {
        const at = (offset: number): number => saturationState(pressureAt(here + offset))[property];
        const left = at(0) - at(-share);
        const right = at(share) - at(0);
        // Differences over 1e-5 of ln p carry rounding of some 1e-10 of the value; a kink of the value's slope would show as more.
        expect(Math.abs(right - left)).toBeLessThan(2e-10 * Math.abs(at(0)));
      }
    }
  });

  it.each([NaN, -1, 0, 649.9, 10_000_001, Infinity])('refuses %s Pa, as the equations do', (pressurePa) => {
    for (const state of [saturationState, saturationStateDirect, saturationSlopes]) {
      expect(() => state(pressurePa)).toThrow(SteamRangeError);
      expect(() => state(pressurePa)).toThrow(
        `The pressure of boiling water is ${pressurePa} Pa; it must lie between 650 and 10000000 Pa.`,
      );
    }
  });
});

describe('saturationSlopes', () => {
  it('are the slopes of the equations', () => {
    for (const share of scattered.slice(0, 2000)) {
      const p = Math.min(HIGH * 0.999, Math.max(LOW * 1.001, pressureAt(share)));
      const step = p * 1e-4;
      const above = saturationStateDirect(p + step);
      const below = saturationStateDirect(p - step);
      const slopes = saturationSlopes(p);
      const expectSlope = (actual: number, property: keyof SaturationState, reference: number): void => {
        const expected = (above[property] - below[property]) / (2 * step);
        expect(Math.abs(actual - expected) * p, `${property} at ${p} Pa`).toBeLessThan(1e-4 * reference);
      };
      // measured per unit of ln p against the size of the property's change over the range
      expectSlope(slopes.temperatureKPerPa, 'temperatureK', 30);
      expectSlope(slopes.liquidDensityKgM3PerPa, 'liquidDensityKgM3', 30);
      expectSlope(slopes.vapourDensityKgM3PerPa, 'vapourDensityKgM3', above.vapourDensityKgM3);
      expectSlope(slopes.liquidEnthalpyJKgPerPa, 'liquidEnthalpyJKg', 1e5);
      expectSlope(slopes.vapourEnthalpyJKgPerPa, 'vapourEnthalpyJKg', 1e5);
    }
  });

  it('obey the law of Clausius and Clapeyron, dT/dp = T (v_g − v_l)/h_lg', () => {
    for (const share of scattered.slice(0, 2000)) {
      const p = pressureAt(share);
      const { temperatureK, liquidDensityKgM3, vapourDensityKgM3, liquidEnthalpyJKg, vapourEnthalpyJKg } =
        saturationState(p);
      const volumeJump = 1 / vapourDensityKgM3 - 1 / liquidDensityKgM3;
      const law = (temperatureK * volumeJump) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
      // IF97 fits its regions and its boiling line one by one, so the law holds to their consistency, not to rounding
      expect(relativeError(saturationSlopes(p).temperatureKPerPa, law)).toBeLessThan(1e-4);
    }
  });
});

describe('the boiling line', () => {
  it('inverts itself', () => {
    for (const share of scattered.slice(0, 2000)) {
      const p = pressureAt(share);
      expect(relativeError(saturationPressurePa(saturationStateDirect(p).temperatureK), p)).toBeLessThan(1e-11);
    }
  });
});

import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { saturationState, saturationStateDirect, SteamRangeError, vapourAtEnthalpy } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  accelerationFactor,
  criticalPressurePa,
  isenthalpicVolumeSlope,
  vapourAccelerationFactor,
} from './acceleration';

/** Condensate of a trap at 8 bar. */
const TRAP_ENTHALPY = saturationState(8e5).liquidEnthalpyJKg;

/** v at constant enthalpy from the equations themselves, not from the table whose slopes are under test. */
function mixtureVolume(pressurePa: number, enthalpyJKg: number): number {
  const state = saturationStateDirect(pressurePa);
  const x = (enthalpyJKg - state.liquidEnthalpyJKg) / (state.vapourEnthalpyJKg - state.liquidEnthalpyJKg);
  return x / state.vapourDensityKgM3 + (1 - x) / state.liquidDensityKgM3;
}

function centralDifference(f: (pressurePa: number) => number, pressurePa: number): number {
  const step = 1e-4 * pressurePa;
  return (f(pressurePa + step) - f(pressurePa - step)) / (2 * step);
}

// Differences of IAPWS-IF97 itself; step and table leave about 1e-6.
describe('isenthalpicVolumeSlope', () => {
  it('is the difference quotient of the mixture’s volume', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 3000, max: 6e6, noNaN: true }),
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        (pressurePa, quality) => {
          const state = saturationState(pressurePa);
          const h = state.liquidEnthalpyJKg + quality * (state.vapourEnthalpyJKg - state.liquidEnthalpyJKg);
          const expected = centralDifference((p) => mixtureVolume(p, h), pressurePa);
          expect(relativeError(isenthalpicVolumeSlope(state, h), expected)).toBeLessThan(1e-5);
        },
      ),
    );
  });

  it('is 0 for liquid', () => {
    expect(isenthalpicVolumeSlope(saturationState(9e5), TRAP_ENTHALPY)).toBe(0);
  });

  // Superheated steam is nearly an ideal gas, whose volume at constant enthalpy is that at constant temperature: −v/p. At 2 bar within 2 %.
  it.each([2.75e6, 3e6])('is that of superheated steam at %d J/kg', (enthalpyJKg) => {
    const slope = isenthalpicVolumeSlope(saturationState(2e5), enthalpyJKg);
    const expected = centralDifference((p) => 1 / vapourAtEnthalpy(p, enthalpyJKg).densityKgM3, 2e5);
    expect(relativeError(slope, expected)).toBeLessThan(1e-3);
    expect(relativeError(slope, -1 / vapourAtEnthalpy(2e5, enthalpyJKg).densityKgM3 / 2e5)).toBeLessThan(0.02);
  });

  it.each([2e5, 60e5])('answers for steam a hair above saturation at %d Pa', (pressurePa) => {
    const state = saturationState(pressurePa);
    expect(isenthalpicVolumeSlope(state, state.vapourEnthalpyJKg * (1 + 1e-9))).toBeLessThan(0);
  });
});

describe('acceleration factors', () => {
  const state = saturationState(101_325);

  it('leave slow and liquid flow alone', () => {
    expect(accelerationFactor(0, state, TRAP_ENTHALPY)).toBe(1);
    expect(accelerationFactor(1e4, saturationState(9e5), TRAP_ENTHALPY)).toBe(1);
    expect(vapourAccelerationFactor(1e4, state, -0.1)).toBe(1);
  });

  // Dry vapour: where the factor is 0 the velocity is √(−v²/(dv_g/dp)), a little below the 472 m/s of sound in steam at 100 °C
  // (IAPWS-IF97), since the boiling line's volume gives way more than the isentrope's.
  it('the vapour’s reaches 0 a little below the velocity of sound', () => {
    const fluxes = Array.from({ length: 4000 }, (_, i) => i * 0.1);
    const choked = fluxes.find((flux) => vapourAccelerationFactor(flux, state, 1) <= 0) ?? NaN;
    const velocityMS = choked / state.vapourDensityKgM3;
    expect(velocityMS).toBeGreaterThan(0.85 * 472);
    expect(velocityMS).toBeLessThan(472);
  });

  it('the vapour’s own flux counts: half the quality at twice the flow is the same', () => {
    expect(vapourAccelerationFactor(200, state, 0.1)).toBe(vapourAccelerationFactor(100, state, 0.2));
  });

  it.each([1.01, NaN])('refuse quality %d where the vapour is saturated', (quality) => {
    expect(() => vapourAccelerationFactor(100, state, quality)).toThrow(NonPhysicalInputError);
  });
});

describe('criticalPressurePa', () => {
  const homogeneous =
    (massFlux: number, h = TRAP_ENTHALPY) =>
    (pressurePa: number): number =>
      accelerationFactor(massFlux, saturationState(pressurePa), h);

  it('finds none in a slow line', () => {
    expect(criticalPressurePa(homogeneous(200), 101_325)).toBeUndefined();
  });

  it('stands where the factor is 0, above the node', () => {
    const critical = criticalPressurePa(homogeneous(1000), 101_325) ?? NaN;
    expect(critical).toBeGreaterThan(101_325);
    expect(homogeneous(1000)(critical)).toBeGreaterThan(0);
    expect(homogeneous(1000)(critical)).toBeLessThan(1e-7);
  });

  // The factor must rise with pressure for that to be the only place: swept for flashing condensate of 2 to 15 bar.
  it.each([2e5, 8e5, 15e5])('is the only such place, for condensate of %d Pa', (trapPa) => {
    const h = saturationState(trapPa).liquidEnthalpyJKg;
    let last = -Infinity;
    for (let pressurePa = 20_000; pressurePa < trapPa * 0.999; pressurePa *= 1.01) {
      const factor = homogeneous(1000, h)(pressurePa);
      expect(factor).toBeGreaterThan(last);
      last = factor;
    }
  });

  it('rises with the flow, up to where flash begins', () => {
    const pressures = [1000, 2000, 5000, 20_000, 100_000].map(
      (massFlux) => criticalPressurePa(homogeneous(massFlux), 101_325) ?? NaN,
    );
    for (let i = 1; i < pressures.length; i++)
      expect(pressures[i]).toBeGreaterThan((pressures[i - 1] ?? NaN) * (1 - 1e-8));
    expect(relativeError(pressures.at(-1) ?? NaN, 8e5)).toBeLessThan(1e-6);
  });

  it('names a flow too great for any pressure of the steam properties', () => {
    const steam = saturationState(8e5).vapourEnthalpyJKg;
    expect(() => criticalPressurePa(homogeneous(1e6, steam), 101_325)).toThrow(SteamRangeError);
  });
});

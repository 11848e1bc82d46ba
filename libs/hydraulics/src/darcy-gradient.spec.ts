import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { darcyGradient, type SinglePhaseFlow } from './darcy-gradient';

/** Water at about 20 °C in 1 in schedule 40. */
const WATER: SinglePhaseFlow = {
  massFlowKgS: 0.3,
  densityKgM3: 998,
  viscosityPaS: 1e-3,
  insideDiameterM: 0.02664,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0,
};

describe('darcyGradient', () => {
  // Hagen-Poiseuille in its own form, −dp/ds = 128 μ Q/(π D⁴), which knows neither f nor Re.
  it('is Hagen-Poiseuille in laminar flow', () => {
    const flow = { ...WATER, massFlowKgS: 0.02 };
    const expected =
      (128 * flow.viscosityPaS * (flow.massFlowKgS / flow.densityKgM3)) / (Math.PI * flow.insideDiameterM ** 4);
    expect(relativeError(darcyGradient(flow), expected)).toBeLessThan(1e-12);
  });

  it('adds fittings as K velocity heads over the length', () => {
    const velocityMS = WATER.massFlowKgS / (WATER.densityKgM3 * Math.PI * (WATER.insideDiameterM / 2) ** 2);
    const added = darcyGradient({ ...WATER, lossCoefficientPerM: 0.5 }) - darcyGradient(WATER);
    expect(relativeError(added, 0.5 * 0.5 * WATER.densityKgM3 * velocityMS ** 2)).toBeLessThan(1e-9);
  });

  it('a still pipe has exactly no friction', () => {
    expect(darcyGradient({ ...WATER, massFlowKgS: 0, lossCoefficientPerM: 3 })).toBe(0);
  });

  it('stays a number for the least flow that a number can hold', () => {
    expect(darcyGradient({ ...WATER, massFlowKgS: 1e-300 })).toBeGreaterThanOrEqual(0);
  });

  it.each<Partial<SinglePhaseFlow>>([
    { massFlowKgS: -1 },
    { massFlowKgS: NaN },
    { densityKgM3: 0 },
    { viscosityPaS: 0 },
    { insideDiameterM: 0 },
    { insideDiameterM: NaN },
    { roughnessM: -1e-6 },
    { lossCoefficientPerM: -1 },
    { lossCoefficientPerM: NaN },
  ])('refuses %o', (change) => {
    expect(() => darcyGradient({ ...WATER, ...change })).toThrow(NonPhysicalInputError);
  });
});

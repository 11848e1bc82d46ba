import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import { describe, expect, it } from 'vitest';
import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import {
  twoPhaseDensityKgM3,
  voidFractionChisholm,
  voidFractionHomogeneous,
  voidFractionRouhaniAxelsson,
  voidFractionZivi,
  type VoidFraction,
} from './void-fraction';

const METHODS: readonly (readonly [string, VoidFraction])[] = [
  ['homogeneous', voidFractionHomogeneous],
  ['Zivi', voidFractionZivi],
  ['Chisholm', voidFractionChisholm],
  ['Rouhani and Axelsson', voidFractionRouhaniAxelsson],
];
const RISER: FlashingFlow = {
  massFlowKgS: 0.5,
  quality: 0.1,
  saturation: saturationState(101_325),
  insideDiameterM: 0.07792,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0,
  fallSlope: -1,
};

describe.each(METHODS)('void fraction, %s', (_name, voidFraction) => {
  it('is 0 for liquid and 1 for dry vapour', () => {
    expect(voidFraction({ ...RISER, quality: -0.1 })).toBe(0);
    expect(voidFraction({ ...RISER, quality: 0 })).toBe(0);
    expect(relativeError(voidFraction({ ...RISER, quality: 1 }), 1)).toBeLessThan(1e-14);
  });

  it('rises with quality, and is never above that without slip', () => {
    let last = 0;
    for (let i = 1; i <= 1000; i++) {
      const point = { ...RISER, quality: i / 1000 };
      const alpha = voidFraction(point);
      expect(alpha).toBeGreaterThan(last);
      expect(alpha).toBeLessThanOrEqual(voidFractionHomogeneous(point) + 1e-15);
      last = alpha;
    }
  });

  it.each([1.01, NaN])('refuses quality %d', (quality) => {
    expect(() => voidFraction({ ...RISER, quality })).toThrow(NonPhysicalInputError);
  });
});

describe('void fraction and the flow', () => {
  it('a still pipe holds liquid by drift flux, which slow flow approaches', () => {
    expect(voidFractionRouhaniAxelsson({ ...RISER, massFlowKgS: 0 })).toBe(0);
    expect(voidFractionRouhaniAxelsson({ ...RISER, massFlowKgS: 1e-9 })).toBeLessThan(1e-4);
  });
});

describe('density of what a rise carries', () => {
  it('is that of each phase at its end', () => {
    const { liquidDensityKgM3, vapourDensityKgM3 } = RISER.saturation;
    expect(twoPhaseDensityKgM3(RISER, 0)).toBe(liquidDensityKgM3);
    expect(twoPhaseDensityKgM3(RISER, 1)).toBe(vapourDensityKgM3);
  });

  // Full riser at 100 °C: 0.0940 bar/m (958.4 kg/m³). Without slip a tenth of flash leaves under a hundredth of it, which is why that
  // method is unsafe in rises.
  it('without slip takes a flashing riser for nearly weightless', () => {
    const slopeBarM = (voidFraction: VoidFraction): number =>
      (twoPhaseDensityKgM3(RISER, voidFraction(RISER)) * GRAVITY_M_S2) / 1e5;
    expect(
      relativeError(
        slopeBarM(() => 0),
        0.094,
      ),
    ).toBeLessThan(1e-3);
    expect(slopeBarM(voidFractionHomogeneous)).toBeLessThan(0.001);
    expect(slopeBarM(voidFractionRouhaniAxelsson)).toBeGreaterThan(0.01);
  });

  it('refuses a share outside 0 to 1', () => {
    expect(() => twoPhaseDensityKgM3(RISER, 1.1)).toThrow(NonPhysicalInputError);
    expect(() => twoPhaseDensityKgM3(RISER, NaN)).toThrow(NonPhysicalInputError);
  });
});

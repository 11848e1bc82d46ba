import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FlashingFlow } from './flash-vapour';
import { friedelGradient } from './friedel';
import { homogeneousGradient } from './homogeneous';
import { chisholmC, lockhartMartinelliGradient } from './lockhart-martinelli';
import { mullerSteinhagenHeckGradient } from './mueller-steinhagen-heck';
import { fittingsGradient, liquidOnlyGradient, vapourOnlyGradient } from './two-phase-point';

const METHODS: readonly (readonly [string, (flow: FlashingFlow) => number])[] = [
  ['homogeneous', homogeneousGradient],
  ['Lockhart-Martinelli', lockhartMartinelliGradient],
  ['Friedel', friedelGradient],
  ['Müller-Steinhagen and Heck', mullerSteinhagenHeckGradient],
];
/** 3 in schedule 40. */
const RETURN: FlashingFlow = {
  massFlowKgS: 0.5,
  quality: 0.1,
  saturation: saturationState(101_325),
  insideDiameterM: 0.07792,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0.2,
  fallSlope: 0,
};
const anyLine = fc.record<FlashingFlow>({
  massFlowKgS: fc.double({ min: 1e-4, max: 50, noNaN: true }),
  quality: fc.double({ min: 0, max: 1, noNaN: true }),
  saturation: fc.double({ min: 20_000, max: 2e6, noNaN: true }).map((pressurePa) => saturationState(pressurePa)),
  insideDiameterM: fc.double({ min: 0.0125, max: 0.4, noNaN: true }),
  roughnessM: fc.double({ min: 0, max: 5e-4, noNaN: true }),
  lossCoefficientPerM: fc.double({ min: 0, max: 5, noNaN: true }),
  fallSlope: fc.constant(0),
});

describe.each(METHODS)('%s', (_name, gradient) => {
  it.each([0, -0.05])('is the liquid to the bit at x = %d', (quality) => {
    expect(gradient({ ...RETURN, quality })).toBe(liquidOnlyGradient(RETURN));
  });

  it('is the vapour at x = 1, but for rounding', () => {
    expect(relativeError(gradient({ ...RETURN, quality: 1 }), vapourOnlyGradient(RETURN))).toBeLessThan(1e-14);
  });

  // The steepest approaches go with the power of the least exponent: x^0.5 (Lockhart-Martinelli) and (1 − x)^0.224 (Friedel).
  it('meets both ends without a step', () => {
    expect(relativeError(gradient({ ...RETURN, quality: 1e-15 }), liquidOnlyGradient(RETURN))).toBeLessThan(1e-4);
    expect(relativeError(gradient({ ...RETURN, quality: 1 - 1e-15 }), vapourOnlyGradient(RETURN))).toBeLessThan(1e-2);
  });

  it('costs exactly nothing in a still pipe', () => {
    expect(gradient({ ...RETURN, massFlowKgS: 0 })).toBe(0);
  });

  it('stays a number at the ends of floating point', () => {
    for (const quality of [5e-324, 1e-300, 1e-16, 0.5, 1 - 1e-16, 1]) {
      for (const massFlowKgS of [5e-324, 1e-200, 1e-155, 1e-100, 1e-9, 1e9]) {
        const value = gradient({ ...RETURN, quality, massFlowKgS });
        expect(value, `x ${quality}, m ${massFlowKgS}`).toBeGreaterThanOrEqual(0);
        expect(value, `x ${quality}, m ${massFlowKgS}`).toBeLessThan(Infinity);
      }
    }
  });

  it('adds the fittings on the mixture without slip', () => {
    const bare = gradient({ ...RETURN, lossCoefficientPerM: 0 });
    expect(relativeError(gradient(RETURN) - bare, fittingsGradient(RETURN))).toBeLessThan(1e-11);
  });

  // Two-phase flow of steam and water costs more than its liquid alone would, and more flow costs more.
  it('costs no less than the liquid alone and rises with the flow', () => {
    fc.assert(
      fc.property(anyLine, fc.double({ min: 1, max: 3, noNaN: true }), (line, factor) => {
        const less = gradient(line);
        expect(less).toBeGreaterThanOrEqual(
          liquidOnlyGradient({ ...line, massFlowKgS: (1 - line.quality) * line.massFlowKgS }) * (1 - 1e-12),
        );
        expect(gradient({ ...line, massFlowKgS: factor * line.massFlowKgS })).toBeGreaterThanOrEqual(
          less * (1 - 1e-12),
        );
      }),
    );
  });

  it.each([{ quality: 1.01 }, { quality: NaN }, { massFlowKgS: -1 }, { insideDiameterM: 0 }])(
    'refuses %o',
    (change) => {
      expect(() => gradient({ ...RETURN, ...change })).toThrow(NonPhysicalInputError);
    },
  );
});

describe('fittings in two-phase flow', () => {
  // K G²/(2 ρ) of each phase alone at the ends; between them linear in x.
  it('has each phase at its end and is linear between', () => {
    const { liquidDensityKgM3, vapourDensityKgM3 } = RETURN.saturation;
    const massFlux = 0.5 / (0.25 * Math.PI * 0.07792 ** 2);
    const at = (quality: number): number => fittingsGradient({ ...RETURN, quality });
    expect(relativeError(at(0), (0.2 * massFlux ** 2) / (2 * liquidDensityKgM3))).toBeLessThan(1e-14);
    expect(relativeError(at(1), (0.2 * massFlux ** 2) / (2 * vapourDensityKgM3))).toBeLessThan(1e-14);
    expect(relativeError(at(0.25), 0.75 * at(0) + 0.25 * at(1))).toBeLessThan(1e-14);
  });
});

describe('friedelGradient', () => {
  // Ghiaasiaan, Two-Phase Flow, Boiling, and Condensation, example of Friedel's correlation, by way of a library's documentation: 730 Pa/m
  // with Blasius' factor; 738.65 with Colebrook-White in a smooth pipe, computed independently.
  it('gives a printed example with this program’s friction factor', () => {
    const example: FlashingFlow = {
      ...RETURN,
      massFlowKgS: 0.6,
      saturation: {
        ...RETURN.saturation,
        liquidDensityKgM3: 915,
        vapourDensityKgM3: 2.67,
        liquidViscosityPaS: 180e-6,
        vapourViscosityPaS: 14e-6,
        surfaceTensionNM: 0.0487,
      },
      insideDiameterM: 0.05,
      roughnessM: 0,
      lossCoefficientPerM: 0,
    };
    expect(relativeError(friedelGradient(example), 738.65)).toBeLessThan(1e-5);
    expect(relativeError(friedelGradient(example), 730)).toBeLessThan(0.015);
  });
});

// Chisholm, Int. J. Heat Mass Transfer 10 (1967) 1767-1778: 20, 12, 10, 5.
describe('chisholmC', () => {
  it.each([
    { liquidRe: 1e5, vapourRe: 1e5, C: 20 },
    { liquidRe: 100, vapourRe: 1e5, C: 12 },
    { liquidRe: 1e5, vapourRe: 100, C: 10 },
    { liquidRe: 100, vapourRe: 100, C: 5 },
    { liquidRe: 2000, vapourRe: 4000, C: 12 },
    // half way the geometric mean: ln C is linear
    { liquidRe: 3000, vapourRe: 1e5, C: Math.sqrt(12 * 20) },
    { liquidRe: 3000, vapourRe: 3000, C: (5 * 10 * 12 * 20) ** 0.25 },
  ])('is $C at Re $liquidRe of the liquid, $vapourRe of the vapour', ({ liquidRe, vapourRe, C }) => {
    expect(relativeError(chisholmC(liquidRe, vapourRe), C)).toBeLessThan(1e-14);
  });
});

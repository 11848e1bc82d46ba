import { NonPhysicalInputError, relativeError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { byPatternGradient } from './by-pattern';
import type { FlashingFlow } from './flash-vapour';
import { mullerSteinhagenHeckGradient } from './mueller-steinhagen-heck';
import { stratifiedFlow } from './stratified-flow';
import type { LiquidSurface } from './stratified-forces';
import { liquidOnlyGradient, vapourOnlyGradient } from './two-phase-point';

/** 3 in schedule 40. */
const LINE: FlashingFlow = {
  massFlowKgS: 0.2,
  quality: 0.1,
  saturation: saturationState(101_325),
  insideDiameterM: 0.07792,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0.2,
  fallSlope: 0.01,
};
const SURFACES: readonly LiquidSurface[] = ['smooth', 'wavy'];

describe('byPatternGradient and the pattern', () => {
  it('is the stratified balance while the flow stays stratified', () => {
    const stratified = stratifiedFlow(LINE);
    expect(stratified?.leaveRatio).toBeLessThan(0.5);
    const { gradientPaM, fullBoreShare } = byPatternGradient(LINE);
    expect(fullBoreShare).toBe(0);
    expect(relativeError(gradientPaM, stratified?.gradientPaM ?? NaN)).toBeLessThan(1e-14);
  });

  it('is Müller-Steinhagen and Heck’s where it has left', () => {
    const torn = { ...LINE, massFlowKgS: 3 };
    expect(stratifiedFlow(torn)?.leaveRatio).toBeGreaterThan(2);
    expect(byPatternGradient(torn)).toEqual({ gradientPaM: mullerSteinhagenHeckGradient(torn), fullBoreShare: 1 });
  });

  // w = S(1/2) = 1/2 at r_A = 1: the geometric mean.
  it('stands half way at the onset', () => {
    let low = 0.2;
    let high = 3;
    const at = (massFlowKgS: number): FlashingFlow => ({ ...LINE, massFlowKgS });
    for (let i = 0; i < 60; i++) {
      const middle = (low + high) / 2;
      if ((stratifiedFlow(at(middle))?.leaveRatio ?? NaN) < 1) low = middle;
      else high = middle;
    }
    const { gradientPaM, fullBoreShare } = byPatternGradient(at(low));
    const mean = Math.sqrt((stratifiedFlow(at(low))?.gradientPaM ?? NaN) * mullerSteinhagenHeckGradient(at(low)));
    expect(Math.abs(fullBoreShare - 0.5)).toBeLessThan(1e-6);
    expect(relativeError(gradientPaM, mean)).toBeLessThan(1e-5);
  });

  it.each([
    { name: 'rises', change: { fallSlope: -1e-6 } },
    { name: 'falls too steep for the balance', change: { fallSlope: 0.5 } },
    { name: 'liquid', change: { quality: 0 } },
    { name: 'subcooled liquid', change: { quality: -0.1 } },
    { name: 'a still pipe', change: { massFlowKgS: 0 } },
  ])('leaves $name to Müller-Steinhagen and Heck', ({ change }) => {
    const flow = { ...LINE, ...change };
    expect(byPatternGradient(flow)).toEqual({ gradientPaM: mullerSteinhagenHeckGradient(flow), fullBoreShare: 1 });
  });

  it('is the vapour at x = 1 and meets both ends without a step', () => {
    const at = (quality: number): number => byPatternGradient({ ...LINE, quality }).gradientPaM;
    expect(at(1)).toBe(vapourOnlyGradient(LINE));
    expect(relativeError(at(1 - 1e-9), at(1))).toBeLessThan(1e-2);
    expect(relativeError(at(1e-9), liquidOnlyGradient(LINE))).toBeLessThan(1e-5);
  });

  it.each([{ quality: 1.01 }, { quality: NaN }, { massFlowKgS: -1 }])('refuses %o', (change) => {
    expect(() => byPatternGradient({ ...LINE, ...change })).toThrow(NonPhysicalInputError);
  });
});

describe('byPatternGradient over three decades of load', () => {
  const lines = [
    { insideDiameterM: 0.02664, pressurePa: 101_325 },
    { insideDiameterM: 0.07792, pressurePa: 3e5 },
    { insideDiameterM: 0.1023, pressurePa: 8e5 },
  ];
  const drains = [
    ...[0.02, 0.03, 0.06, 0.1, 0.2].map((quality) => ({ quality, fallSlope: 0 })),
    ...[0.1, 0.15, 0.3].flatMap((quality) => [1 / 240, 0.01, 0.05].map((fallSlope) => ({ quality, fallSlope }))),
  ];

  // Condensate returns: flash of 2 % and more in level runs, of 10 % and more in falling ones.
  it.each(SURFACES)('changes by less than 1 %% where load changes by a thousandth, %s surface', (surface) => {
    for (const { insideDiameterM, pressurePa } of lines) {
      for (const drain of drains) {
        const line = {
          ...LINE,
          ...drain,
          insideDiameterM,
          saturation: saturationState(pressurePa),
          lossCoefficientPerM: 0,
        };
        expect(greatestChange(line, surface), JSON.stringify({ insideDiameterM, pressurePa, ...drain })).toBeLessThan(
          0.01,
        );
      }
    }
  });

  // Nearly full falling lines go over faster, up to 3.3 % a thousandth: steep, but nowhere a jump. An interval of load in which the
  // gradient changes much is halved towards its greater change, until nothing is left of it.
  it('has no jump however wet the line, nor however steep its fall', () => {
    for (const { insideDiameterM, pressurePa } of lines) {
      for (const quality of [5e-4, 0.002, 0.004, 0.01, 0.05, 0.5]) {
        for (const fallSlope of [0, 0.002, 0.02, 0.17]) {
          const line = { ...LINE, quality, fallSlope, insideDiameterM, saturation: saturationState(pressurePa) };
          expect(greatestJump(line), JSON.stringify({ insideDiameterM, pressurePa, quality, fallSlope })).toBeLessThan(
            1e-5,
          );
        }
      }
    }
  });

  function loadsKgS(insideDiameterM: number, ratio: number): number[] {
    const smallest = 0.005 * (insideDiameterM / 0.05) ** 2.5;
    return Array.from({ length: Math.ceil(Math.log(1000) / Math.log(ratio)) + 1 }, (_, i) => smallest * ratio ** i);
  }

  function greatestChange(line: FlashingFlow, surface: LiquidSurface): number {
    let greatest = 0;
    let last = NaN;
    for (const massFlowKgS of loadsKgS(line.insideDiameterM, 1.001)) {
      const { gradientPaM } = byPatternGradient({ ...line, massFlowKgS }, surface);
      greatest = Math.max(greatest, Number.isNaN(last) ? 0 : Math.abs(gradientPaM / last - 1));
      last = gradientPaM;
    }
    return greatest;
  }

  function greatestJump(line: FlashingFlow): number {
    const lnGradient = (massFlowKgS: number): number =>
      Math.log(byPatternGradient({ ...line, massFlowKgS }).gradientPaM);
    let greatest = 0;
    let below: { load: number; ln: number } | undefined;
    for (const load of loadsKgS(line.insideDiameterM, 1.03)) {
      const here = { load, ln: lnGradient(load) };
      if (below && Math.abs(here.ln - below.ln) > 0.15)
        greatest = Math.max(greatest, jumpBetween(below, here, lnGradient));
      below = here;
    }
    return greatest;
  }

  function jumpBetween(
    low: { load: number; ln: number },
    high: { load: number; ln: number },
    lnGradient: (load: number) => number,
  ): number {
    let [a, b] = [low, high];
    for (let halving = 0; halving < 24; halving++) {
      const load = (a.load + b.load) / 2;
      const middle = { load, ln: lnGradient(load) };
      if (Math.abs(middle.ln - a.ln) > Math.abs(b.ln - middle.ln)) b = middle;
      else a = middle;
    }
    return Math.abs(b.ln - a.ln);
  }
});

describe('byPatternGradient anywhere', () => {
  const anyLine = fc.record<FlashingFlow>({
    massFlowKgS: fc.double({ min: -9, max: 3, noNaN: true }).map((decade) => 10 ** decade),
    quality: fc.oneof(
      fc.double({ min: -16, max: 0, noNaN: true }).map((decade) => 10 ** decade),
      fc.double({ min: -16, max: 0, noNaN: true }).map((decade) => 1 - 10 ** decade),
    ),
    saturation: fc.double({ min: 1000, max: 9.9e6, noNaN: true }).map((pressurePa) => saturationState(pressurePa)),
    insideDiameterM: fc.double({ min: 0.003, max: 1.2, noNaN: true }),
    roughnessM: fc.double({ min: 0, max: 1e-3, noNaN: true }),
    lossCoefficientPerM: fc.double({ min: 0, max: 5, noNaN: true }),
    fallSlope: fc.double({ min: -1, max: 1, noNaN: true }),
  });

  it('is a finite gradient between the stratified and the full-bore one', () => {
    fc.assert(
      fc.property(anyLine, fc.constantFrom(...SURFACES), (line, surface) => {
        const { gradientPaM, fullBoreShare } = byPatternGradient(line, surface);
        expect(gradientPaM).toBeGreaterThan(0);
        expect(gradientPaM).toBeLessThan(Infinity);
        expect(fullBoreShare).toBeGreaterThanOrEqual(0);
        expect(fullBoreShare).toBeLessThanOrEqual(1);
      }),
      { numRuns: 2000 },
    );
  });
});

import { saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { certainLevelPattern, FRICTION_BOUNDS } from './certain-level-pattern';
import type { FlashingFlow } from './flash-vapour';
import { darcyFrictionFactor } from './friction-factor';
import { patternAtLevel } from './level-flow-pattern';
import { STRATIFIED_SLOPE_LIMIT } from './stratified-flow';

const decades = (from: number, to: number): fc.Arbitrary<number> =>
  fc.double({ min: from, max: to, noNaN: true }).map((decade) => 10 ** decade);

const slopes = fc.oneof(fc.constant(0), fc.double({ min: -0.02, max: STRATIFIED_SLOPE_LIMIT, noNaN: true }));
/** Everything a level pipe can carry, down to what no pipe does. */
const anyFlow = fc.record<FlashingFlow>({
  massFlowKgS: fc.oneof(decades(-9, 4), decades(-300, -9)),
  quality: fc.oneof(
    decades(-300, 0).filter((quality) => quality < 1),
    decades(-15, -0.01).map((liquid) => 1 - liquid),
  ),
  saturation: decades(3, 6.9).map((pressurePa) => saturationState(pressurePa)),
  insideDiameterM: decades(-2.5, 0.3),
  roughnessM: fc.double({ min: 0, max: 1e-3, noNaN: true }),
  lossCoefficientPerM: fc.constant(0),
  fallSlope: slopes,
});
/** Condensate returns. */
const returns = fc.record<FlashingFlow>({
  massFlowKgS: decades(-3, 0.5),
  quality: decades(-2.5, -0.7),
  saturation: fc.double({ min: 0.8e5, max: 6e5, noNaN: true }).map((pressurePa) => saturationState(pressurePa)),
  insideDiameterM: fc.double({ min: 0.015, max: 0.2, noNaN: true }),
  roughnessM: fc.constant(4.57e-5),
  lossCoefficientPerM: fc.constant(0),
  fallSlope: fc.double({ min: 0, max: 0.1, noNaN: true }),
});

describe('certainLevelPattern', () => {
  it.each([
    { of: 'any flow', flows: anyFlow },
    { of: 'returns', flows: returns },
  ])('never tells what the level itself does not: $of', ({ flows }) => {
    fc.assert(
      fc.property(flows, (flow) => {
        const certain = certainLevelPattern(flow);
        if (certain !== undefined) expect(certain).toBe(patternAtLevel(flow));
      }),
      { numRuns: 5000 },
    );
  });

  it('tells most patterns of condensate returns', () => {
    const flows = fc.sample(returns, 2000);
    const told = flows.filter((flow) => certainLevelPattern(flow) !== undefined);
    expect(told.length / flows.length).toBeGreaterThan(0.7);
  });

  it('leaves rises to the level, where the forces may balance more than once', () => {
    for (const flow of fc.sample(returns, 100)) {
      if (flow.fallSlope > 0) expect(certainLevelPattern({ ...flow, fallSlope: -flow.fallSlope })).toBeUndefined();
    }
  });
});

// Against Colebrook-White itself, whose f falls with Re and rises with roughness.
describe('FRICTION_BOUNDS', () => {
  it('hold the Darcy factor over their whole range', () => {
    const { atMost, atLeast, Re: greatestRe, relativeRoughness } = FRICTION_BOUNDS;
    for (let i = 0; i <= 400; i++) {
      const Re = 10 * (greatestRe / 10) ** (i / 400);
      for (const share of [0, 0.01, 0.1, 0.5, 1]) {
        const f = darcyFrictionFactor(Re, share * relativeRoughness);
        expect(f).toBeGreaterThan(atLeast);
        expect(f).toBeLessThanOrEqual(Math.max(atMost, 64 / Re));
      }
    }
  });
});

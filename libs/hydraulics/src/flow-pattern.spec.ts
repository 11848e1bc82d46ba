import { NonPhysicalInputError } from '@riseback/numerics';
import { saturationState } from '@riseback/steam';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FlashingFlow } from './flash-vapour';
import { flowPattern } from './flow-pattern';
import { levelFlowPattern } from './level-flow-pattern';
import { pipeBore } from './pipe-catalogue';
import { riseFlow } from './rise-flow-pattern';

const LINE: FlashingFlow = {
  massFlowKgS: 0.1,
  quality: 0.1,
  saturation: saturationState(101_325),
  insideDiameterM: 0.0525,
  roughnessM: 4.57e-5,
  lossCoefficientPerM: 0,
  fallSlope: 0,
};

// Mishima & Ishii, Int. J. Heat Mass Transfer 27 (1984) 723-737: patterns, a and a_m at seven points, computed independently from the
// paper's criteria on schedule 40 pipe and IF97; three digits.
describe('riseFlow', () => {
  it.each([
    { bar: 1.01325, nps: '1', x: 0.1, m: 0.02, pattern: 'churn', a: 0.812, limit: 0.77 },
    { bar: 1.01325, nps: '1', x: 0.1, m: 0.05, pattern: 'annular', a: 0.824, limit: 0.765 },
    { bar: 1.01325, nps: '2', x: 0.01, m: 0.3, pattern: 'slug', a: 0.726, limit: 0.79 },
    { bar: 2.05, nps: '2', x: 0.06, m: 0.3, pattern: 'churn', a: 0.8, limit: 0.777 },
    { bar: 2.05, nps: '4', x: 0.06, m: 1.5, pattern: 'churn', a: 0.798, limit: 0.782 },
    { bar: 5, nps: '4', x: 0.05, m: 2, pattern: 'slug', a: 0.751, limit: 0.798 },
  ] as const)('$pattern: $m kg/s, x $x, $nps in, $bar bar', ({ bar, nps, x, m, pattern, a, limit }) => {
    const flow = riseFlow({ ...LINE, ...line(bar, nps), quality: x, massFlowKgS: m, fallSlope: -1 });
    expect(flow.pattern).toBe(pattern);
    expect(Math.abs(flow.voidFraction - a)).toBeLessThan(0.6e-3);
    expect(Math.abs(flow.slugLimit - limit)).toBeLessThan(0.6e-3);
  });

  it('bubbly: 2 kg/s, x 0.0005, 3 in, 2.05 bar', () => {
    const flow = { ...LINE, ...line(2.05, '3'), quality: 0.0005, massFlowKgS: 2, fallSlope: -1 };
    expect(riseFlow(flow).pattern).toBe('bubbly');
  });

  // By hand at 100 °C: N is 0.00075 and (σ g d/ρ_g²)^(1/4) N^-0.2 26.4 m/s, whatever the bore; in 0.6 m flow reversal would need about 60 m/s.
  // At x = 0.2, 85 kg/(m² s) has 28.4 m/s of vapour and 70 has 23.4.
  it('entrainment makes a wide rise annular where the film would still fall back', () => {
    const wide = { ...LINE, insideDiameterM: 0.6, quality: 0.2, fallSlope: -1 };
    expect(riseFlow({ ...wide, massFlowKgS: 85 * 0.2827 }).pattern).toBe('annular');
    expect(riseFlow({ ...wide, massFlowKgS: 70 * 0.2827 }).pattern).not.toBe('annular');
  });

  it.each([{ quality: 0 }, { quality: 1 }, { massFlowKgS: 0 }, { quality: NaN }])('refuses %o', (change) => {
    expect(() => riseFlow({ ...LINE, ...change })).toThrow(NonPhysicalInputError);
  });
});

// The twelve printed points of the stratified balance (stratified-flow.spec.ts) are all wavy; so says the source that printed them.
describe('levelFlowPattern', () => {
  it.each([
    { bar: 1.01325, nps: '1', x: 0.1, m: 0.02 },
    { bar: 1.01325, nps: '2', x: 0.1, m: 0.1 },
    { bar: 1.01325, nps: '3', x: 0.1, m: 0.5 },
    { bar: 2.05, nps: '1-1/2', x: 0.06, m: 0.1 },
    { bar: 2.05, nps: '3', x: 0.06, m: 0.6 },
    { bar: 3, nps: '3', x: 0.03, m: 0.6 },
  ] as const)('stratified wavy, level and falling: $m kg/s, x $x, $nps in, $bar bar', ({ bar, nps, x, m }) => {
    for (const fallSlope of [0, 0.01]) {
      const flow = { ...LINE, ...line(bar, nps), quality: x, massFlowKgS: m, fallSlope };
      expect(levelFlowPattern(flow)).toBe('stratifiedWavy');
    }
  });

  // Laws of the map: a trickle is smooth; much flash at high flow annular; much liquid intermittent, and torn to bubbles as it races.
  it.each([
    { quality: 0.1, massFlowKgS: 0.001, pattern: 'stratifiedSmooth' },
    { quality: 0.2, massFlowKgS: 0.5, pattern: 'annular' },
    { quality: 0.001, massFlowKgS: 1, pattern: 'intermittent' },
    { quality: 0.0005, massFlowKgS: 20, pattern: 'dispersedBubble' },
  ] as const)('$pattern at x $quality, $massFlowKgS kg/s', ({ quality, massFlowKgS, pattern }) => {
    expect(levelFlowPattern({ ...LINE, quality, massFlowKgS })).toBe(pattern);
  });

  it('a slight rise holds its liquid back and loses the stratified pattern that a slight fall keeps', () => {
    const wet = { ...LINE, quality: 0.02, massFlowKgS: 0.05 };
    expect(levelFlowPattern({ ...wet, fallSlope: 0.05 })).toMatch(/^stratified/);
    expect(levelFlowPattern({ ...wet, fallSlope: -0.05 })).toBe('intermittent');
  });
});

describe('flowPattern', () => {
  const sin = (degrees: number): number => Math.sin((degrees * Math.PI) / 180);

  it.each([
    { name: 'liquid', change: { quality: 0 }, pattern: 'liquid' },
    { name: 'subcooled liquid', change: { quality: -0.1 }, pattern: 'liquid' },
    { name: 'dry steam', change: { quality: 1 }, pattern: 'vapour' },
    { name: 'superheated steam', change: { quality: 1.1 }, pattern: 'vapour' },
    { name: 'a still pipe', change: { massFlowKgS: 0 }, pattern: undefined },
    { name: 'a drop', change: { fallSlope: 1 }, pattern: undefined },
    { name: 'a riser', change: { fallSlope: -1 }, pattern: riseFlow(LINE).pattern },
    { name: 'a rise of 11°', change: { fallSlope: -sin(11) }, pattern: riseFlow(LINE).pattern },
    {
      name: 'a rise of 9°',
      change: { fallSlope: -sin(9) },
      pattern: levelFlowPattern({ ...LINE, fallSlope: -sin(9) }),
    },
    { name: 'a fall of 9°', change: { fallSlope: sin(9) }, pattern: levelFlowPattern({ ...LINE, fallSlope: sin(9) }) },
  ])('$name', ({ change, pattern }) => {
    expect(flowPattern({ ...LINE, ...change })).toBe(pattern);
  });

  it('answers for every moving flow that is not a drop', () => {
    const decades = (from: number, to: number): fc.Arbitrary<number> =>
      fc.double({ min: from, max: to, noNaN: true }).map((decade) => 10 ** decade);
    const anyFlow = fc.record<FlashingFlow>({
      massFlowKgS: fc.oneof(decades(-9, 4), decades(-300, -9)),
      quality: fc.oneof(
        decades(-300, 0),
        decades(-16, 0).map((liquid) => 1 - liquid),
      ),
      saturation: decades(3, 6.9).map((pressurePa) => saturationState(pressurePa)),
      insideDiameterM: decades(-2.5, 0.3),
      roughnessM: fc.double({ min: 0, max: 1e-3, noNaN: true }),
      lossCoefficientPerM: fc.constant(0),
      fallSlope: fc.double({ min: -1, max: 0.17, noNaN: true }),
    });
    fc.assert(
      fc.property(anyFlow, (flow) => {
        expect(flowPattern(flow)).toBeTypeOf('string');
      }),
      { numRuns: 2000 },
    );
  });

  it.each([{ quality: NaN }, { fallSlope: NaN }])('refuses %o', (change) => {
    expect(() => flowPattern({ ...LINE, ...change })).toThrow(NonPhysicalInputError);
  });
});

function line(bar: number, nps: '1' | '1-1/2' | '2' | '3' | '4'): Pick<FlashingFlow, 'saturation' | 'insideDiameterM'> {
  return {
    saturation: saturationState(bar * 1e5),
    insideDiameterM: pipeBore({ nps, schedule: '40' })?.insideDiameterM ?? NaN,
  };
}

import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { probableFlowKgS, type PeakGroup } from './peak-quantile';

const alike = (count: number, peakKgS: number, probability: number): PeakGroup[] =>
  Array.from({ length: count }, () => ({ peakKgS, probability }));

/** By counting every combination of up to 16 groups. */
function byCounting(groups: readonly PeakGroup[]): number {
  const sums = Array.from({ length: 2 ** groups.length }, (_, mask) => {
    let [flow, share] = [0, 1];
    groups.forEach(({ peakKgS, probability }, i) => {
      const discharges = (mask >> i) & 1;
      flow += discharges * peakKgS;
      share *= discharges ? probability : 1 - probability;
    });
    return { flow, share };
  }).sort((a, b) => a.flow - b.flow);
  let below = 0;
  for (const { flow, share } of sums) {
    below += share;
    if (below >= 0.95 - 1e-12) return flow;
  }
  return NaN;
}

/** A reproducible stream of numbers in 0 to 1 (Numerical Recipes’ linear congruence). */
function numbers(seed: number): () => number {
  let state = seed;
  return () => (state = (1664525 * state + 1013904223) % 2 ** 32) / 2 ** 32;
}

describe('the flow not exceeded 95 % of the time', () => {
  // binomial distribution, any table: of 4 at 1/4 P(at most 2) = 0.949, at most 3 0.996; of 12 at 1/2 at most 8 0.927, at most 9 0.981
  it('is that of binomial tables for groups alike', () => {
    expect(relativeError(probableFlowKgS(alike(4, 1, 0.25)), 3)).toBeLessThan(1e-9);
    expect(relativeError(probableFlowKgS(alike(2, 1, 0.5)), 2)).toBeLessThan(1e-9);
    expect(relativeError(probableFlowKgS(alike(12, 0.3, 0.5)), 9 * 0.3)).toBeLessThan(1e-9);
    expect(probableFlowKgS([])).toBe(0);
    expect(probableFlowKgS([{ peakKgS: 5, probability: 0.04 }])).toBe(0);
    expect(relativeError(probableFlowKgS([{ peakKgS: 5, probability: 1 }]), 5)).toBeLessThan(1e-9);
  });

  it('is that of counting every combination, for random groups', () => {
    const next = numbers(1);
    for (let i = 0; i < 30; i++) {
      const groups = alike(1 + Math.floor(next() * 12), 0, 0)
        .map(() => ({ peakKgS: next(), probability: 0.05 + 0.9 * next() }))
        .sort((a, b) => b.peakKgS - a.peakKgS);
      expect(relativeError(probableFlowKgS(groups), byCounting(groups))).toBeLessThan(1e-9);
    }
  });

  it('is within 1 % of 400,000 throws for more groups than are counted out', () => {
    const next = numbers(2);
    for (const count of [17, 24, 60]) {
      const groups = alike(count, 0, 0)
        .map(() => ({ peakKgS: 0.2 + next(), probability: 0.2 + 0.4 * next() }))
        .sort((a, b) => b.peakKgS - a.peakKgS);
      const throws = Float64Array.from({ length: 400_000 }, () =>
        groups.reduce((sum, { peakKgS, probability }) => sum + (next() < probability ? peakKgS : 0), 0),
      ).sort();
      const thrown = throws[Math.ceil(0.95 * throws.length) - 1] ?? NaN;
      expect(Math.abs(probableFlowKgS(groups) / thrown - 1)).toBeLessThan(0.01);
    }
  });
});

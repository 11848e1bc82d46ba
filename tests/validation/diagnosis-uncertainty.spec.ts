import { expandedUncertainty, normalisedError, type UncertaintyPart } from '@riseback/diagnosis';
import { describe, expect, it } from 'vitest';

const limit = (limitPa: number): UncertaintyPart => ({ cause: 'accuracy', shape: 'rectangular', limitPa });
const printed = (value: number, decimals: number): number => Number(value.toFixed(decimals));

// EA-4/02 M:2013 (and 1999), Supplements: worked budgets in their own units, volts and micrometres; only the combination is tried here.
describe('worked examples of EA-4/02', () => {
  it('S9, a hand-held multimeter at 100 V: resolution ±0.05 V dominates, u = 0.030 V, U = 0.05 V', () => {
    const { standardPa, expandedPa } = expandedUncertainty([limit(0.05), limit(0.011), limit(0.0017)]);
    expect(printed(standardPa, 3)).toBe(0.03);
    expect(printed(expandedPa, 2)).toBe(0.05);
  });

  it('S10, a vernier caliper: resolution ±25 µm and mechanics ±50 µm, u = 33 µm, k = 1.83, U = 0.06 mm', () => {
    // the two that dominate alone give the edge parameter 0.33 and the printed factor
    const { coverageFactor } = expandedUncertainty([limit(50), limit(25)]);
    expect(printed(coverageFactor, 2)).toBe(1.83);
    // standards ±0.8 µm, and temperature, 2.0 µm
    const { standardPa, expandedPa } = expandedUncertainty([limit(50), limit(25), limit(0.8), limit(2 * Math.sqrt(3))]);
    expect(printed(standardPa, 0)).toBe(32);
    expect(printed(expandedPa / 1_000, 2)).toBe(0.06);
  });
});

// NIST Dataplot Reference Manual, "ISO 13528 EN SCORE": printed scores of the first ten gears of GEAR.DAT (NIST/SEMATECH e-Handbook,
// 1.3.5.4), reference 1, U_lab twice the batch's standard deviation, U_ref twice that of all hundred: total sum of squares 0.003903.
describe('E_n as NIST prints it', () => {
  const batch = [1.006, 0.996, 0.998, 1, 0.992, 0.993, 1.002, 0.999, 0.994, 1];
  const mean = batch.reduce((sum, x) => sum + x, 0) / 10;
  const laboratory = 2 * Math.sqrt(batch.reduce((sum, x) => sum + (x - mean) ** 2, 0) / 9);
  const reference = 2 * Math.sqrt(0.003903 / 99);

  it.each([
    { gear: 1.006, score: 0.393 },
    { gear: 0.996, score: -0.262 },
    { gear: 0.998, score: -0.131 },
    { gear: 1, score: 0 },
  ])('$gear: $score', ({ gear, score }) => {
    expect(printed(laboratory, 3)).toBe(0.009);
    expect(printed(normalisedError(gear, 1, laboratory, reference), 3)).toBe(score);
  });
});

import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { expandedUncertainty, type UncertaintyPart } from './expanded-uncertainty';

const rectangular = (limitPa: number): UncertaintyPart => ({ cause: 'accuracy', shape: 'rectangular', limitPa });
const normal = (standardPa: number): UncertaintyPart => ({ cause: 'loads', shape: 'normal', standardPa });

/** Seeded, so that a failure repeats (Numerical Recipes' quick generator). */
function randomNumbers(seed: number): () => number {
  let state = seed;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 2 ** 32;
  };
}

/** Half-width that holds 95 % of drawn sums. */
function drawnHalfWidth(parts: readonly UncertaintyPart[]): number {
  const random = randomNumbers(7);
  const sums = Array.from({ length: 200_000 }, () =>
    Math.abs(
      parts.reduce(
        (sum, part) =>
          sum +
          (part.shape === 'rectangular'
            ? part.limitPa * (2 * random() - 1)
            : part.standardPa * Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random())),
        0,
      ),
    ),
  ).sort((a, b) => a - b);
  return sums[Math.floor(0.95 * sums.length)] ?? NaN;
}

describe('expandedUncertainty', () => {
  it('takes 0.95 of the limit where one rectangular cause stands alone', () => {
    // GUM 4.3.7: u = a/√3; 95 % of a rectangle lie within 0.95 a, so k = 0.95 √3 = 1.645
    const { standardPa, coverageFactor, expandedPa } = expandedUncertainty([rectangular(1_000)]);
    expect(relativeError(standardPa, 1_000 / Math.sqrt(3))).toBeLessThan(1e-12);
    expect(relativeError(coverageFactor, 0.95 * Math.sqrt(3))).toBeLessThan(1e-12);
    expect(relativeError(expandedPa, 950)).toBeLessThan(1e-12);
  });

  it('takes 2 where all is normal', () => {
    expect(expandedUncertainty([normal(300), normal(400)])).toMatchObject({ standardPa: 500, expandedPa: 1_000 });
  });

  // Two equal rectangles make a triangle of half-width 2a: 95 % lie within 2a(1 − √0.05).
  it('is exact for a triangle', () => {
    const { expandedPa } = expandedUncertainty([rectangular(1), rectangular(1)]);
    expect(relativeError(expandedPa, 2 * (1 - Math.sqrt(0.05)))).toBeLessThan(1e-12);
  });

  it.each([
    [[rectangular(1), rectangular(0.02)]],
    [[rectangular(1), rectangular(0.3)]],
    [[rectangular(1), rectangular(0.8)]],
  ])('covers 95 %% of two hundred thousand drawn sums: %j', (parts) => {
    // drawing so many leaves about 0.2 % in the half-width
    expect(relativeError(expandedUncertainty(parts).expandedPa, drawnHalfWidth(parts))).toBeLessThan(0.01);
  });

  it.each([
    [[rectangular(1), rectangular(0.03), rectangular(0.02)]],
    [[rectangular(1), rectangular(1), rectangular(1)]],
    [[rectangular(1), normal(0.2)]],
    [[rectangular(1), normal(0.6)]],
    [[rectangular(1), normal(3)]],
  ])('errs to the safe side where more comes together, by less than a fifth: %j', (parts) => {
    const ratio = expandedUncertainty(parts).expandedPa / drawnHalfWidth(parts);
    expect(ratio).toBeGreaterThan(0.995);
    expect(ratio).toBeLessThan(1.2);
  });

  it('does not jump as one cause grows', () => {
    const at = (restPa: number): number => expandedUncertainty([rectangular(1), normal(restPa)]).expandedPa;
    for (let rest = 0; rest < 1; rest += 0.001) {
      expect(at(rest + 0.001)).toBeGreaterThanOrEqual(at(rest));
      expect(at(rest + 0.001) - at(rest)).toBeLessThan(0.005);
    }
  });
});

/**
 * How far a value lies from what it should be, as a fraction of what it should be: |actual − expected| / |expected|.
 * @returns 0 where both are 0, ∞ where only the expected value is 0; NaN if either is NaN, so that no
 *   `toBeLessThan` in a test lets it pass
 */
export function relativeError(actual: number, expected: number): number {
  const difference = Math.abs(actual - expected);
  return difference === 0 ? 0 : difference / Math.abs(expected);
}

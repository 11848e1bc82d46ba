import { describe, expect, it } from 'vitest';
import { relativeError } from './index';

describe('relativeError', () => {
  it.each([
    { actual: 101, expected: 100, error: 0.01 },
    { actual: -99, expected: -100, error: 0.01 },
    { actual: 0, expected: 0, error: 0 },
    { actual: 1e-300, expected: 0, error: Infinity },
    { actual: -1, expected: 1, error: 2 },
  ])('of $actual against $expected is $error', ({ actual, expected, error }) => {
    expect(relativeError(actual, expected)).toBe(error);
  });

  it('is NaN for NaN, so no upper bound lets it pass', () => {
    expect(relativeError(NaN, 1)).toBeNaN();
    expect(relativeError(1, NaN)).toBeNaN();
    expect(relativeError(NaN, NaN) < 1).toBe(false);
  });
});

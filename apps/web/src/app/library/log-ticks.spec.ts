import { describe, expect, it } from 'vitest';
import { logScale } from './log-ticks';

describe('logScale', () => {
  it.each([
    [1, 150, [1, 2, 5, 10, 20, 50, 100, 200]],
    [0.3, 0.3, [0.2, 0.5]],
    [10, 10, [10, 20]],
    [0.0021, 0.0021, [0.002, 0.005]],
    [999.9999999, 1000.0000001, [1000, 2000]],
  ])('%d to %d', (low, high, ticks) => {
    expect(logScale(low, high)).toEqual({ low: ticks[0], high: ticks.at(-1), ticks });
  });

  it.each([
    [0, 1],
    [2, 1],
    [-1, 1],
    [NaN, 1],
  ])('has nothing to hold %d to %d', (low, high) => {
    expect(() => logScale(low, high)).toThrow(RangeError);
  });
});

import { describe, expect, it } from 'vitest';
import { niceTicks } from './nice-ticks';

describe('niceTicks', () => {
  it.each([
    [0, 75, 5, [0, 20, 40, 60, 80]],
    [0, 75, 4, [0, 20, 40, 60, 80]],
    [-0.4, 0.9, 5, [-0.5, 0, 0.5, 1]],
    [14.99996, 30.5, 4, [15, 20, 25, 30, 35]],
    [10, 50, 4, [10, 20, 30, 40, 50]],
  ])('holds %d to %d in at most %d steps', (low, high, most, ticks) => {
    expect(niceTicks(low, high, most)).toEqual(ticks);
  });

  it.each([0, 15, -3])('holds a range of nothing at %d', (at) => {
    const ticks = niceTicks(at, at, 4);
    expect(ticks.length).toBeGreaterThanOrEqual(2);
    expect(ticks[0]).toBeLessThanOrEqual(at);
    expect(ticks.at(-1)).toBeGreaterThanOrEqual(at);
  });

  it('always holds the range, in even steps', () => {
    for (let i = 1; i < 400; i += 1) {
      const [low, high] = [-50 + i * 0.7, -50 + i * 0.7 + 1.37 ** (i % 30)];
      const ticks = niceTicks(low, high, 5);
      expect(ticks.length).toBeLessThanOrEqual(6);
      const step = (ticks[1] ?? 0) - (ticks[0] ?? 0);
      expect(ticks[0]).toBeLessThanOrEqual(low + 0.0021 * step);
      expect(ticks.at(-1)).toBeGreaterThanOrEqual(high - 0.0021 * step);
    }
  });
});

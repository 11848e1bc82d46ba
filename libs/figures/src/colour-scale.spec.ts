import { describe, expect, it } from 'vitest';
import { classOf, colourScale, type ColourScale, stretches } from './colour-scale';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const EVEN: ColourScale = { by: 'pressure', kind: 'pressure', limits: [0, 10, 20, 30, 40, 50, 60, 70], decimals: 0 };

describe('classes', () => {
  it('takes a value at a limit into the class above, and values beyond the ends into the outer classes', () => {
    expect([-5, 0, 9.9, 10, 69, 70, 500].map((value) => classOf(value, EVEN))).toEqual([1, 1, 1, 2, 7, 7, 7]);
  });

  it('is finite before anything is solved', () => {
    for (const by of ['pressure', 'flash', 'velocity'] as const) {
      const { limits } = colourScale(by, [], US);
      expect(limits).toHaveLength(8);
      expect(limits.every((limit, i) => Number.isFinite(limit) && (i === 0 || limit > (limits[i - 1] ?? 0)))).toBe(
        true,
      );
    }
  });
});

describe('stretches', () => {
  it('changes class along a pipe where its value passes a limit', () => {
    expect(stretches(25, 5, EVEN)).toEqual([
      { from: 0, to: 0.25, level: 3 },
      { from: 0.25, to: 0.75, level: 2 },
      { from: 0.75, to: 1, level: 1 },
    ]);
  });

  it('is one piece within a class', () => {
    expect(stretches(12, 18, EVEN)).toEqual([{ from: 0, to: 1, level: 2 }]);
    expect(stretches(12, 12, EVEN)).toEqual([{ from: 0, to: 1, level: 2 }]);
  });
});

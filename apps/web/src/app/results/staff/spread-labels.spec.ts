import { describe, expect, it } from 'vitest';
import { spreadLabels } from './spread-labels';

describe('spreadLabels', () => {
  const label = (at: number, height = 18) => ({ at, height });

  it('leaves labels alone that have room', () => {
    expect(spreadLabels([label(20), label(100), label(60)], 0, 200)).toEqual([20, 100, 60]);
  });

  it('spreads a crowd evenly around its middle, in the order of what is named', () => {
    expect(spreadLabels([label(100), label(101), label(102)], 0, 200)).toEqual([83, 101, 119]);
    expect(spreadLabels([label(50), label(50)], 0, 200)).toEqual([41, 59]);
  });

  it('stays between top and bottom', () => {
    expect(spreadLabels([label(199), label(200)], 0, 200)).toEqual([173, 191]);
    expect(spreadLabels([label(0), label(1)], 0, 200)).toEqual([9, 27]);
  });

  it('never lets two overlap, wherever they crowd', () => {
    let seed = 11;
    const random = () => (seed = (seed * 16_807) % 2_147_483_647) / 2_147_483_647;
    for (let trial = 0; trial < 500; trial += 1) {
      const wishes = Array.from({ length: 7 }, (_, i) => label(300 * random() ** 3, i === 2 ? 30 : 18));
      const placed = spreadLabels(wishes, 0, 300)
        .map((middle, i) => ({ middle, half: (wishes[i]?.height ?? 0) / 2 }))
        .sort((a, b) => a.middle - b.middle);
      placed.forEach(({ middle, half }, i) => {
        const above = placed[i - 1];
        if (above !== undefined) expect(middle - half).toBeGreaterThanOrEqual(above.middle + above.half - 1e-9);
        expect(middle - half).toBeGreaterThanOrEqual(-1e-9);
        expect(middle + half).toBeLessThanOrEqual(300 + 1e-9);
      });
    }
  });
});

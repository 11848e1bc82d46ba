import { describe, expect, it } from 'vitest';
import { solveLinearSystem } from './linear-system';

describe('solveLinearSystem', () => {
  it('solves a system whose first pivot is zero', () => {
    const x = Float64Array.of(5, 3, 6);
    // x = 1, y = 2, z = 3 put into 0x + y + z, x + y + 0z, 0x + 0y + 2z
    expect(solveLinearSystem(Float64Array.of(0, 1, 1, 1, 1, 0, 0, 0, 2), x)).toBe(true);
    expect([...x]).toEqual([1, 2, 3]);
  });

  it('meets random systems made from their solutions', () => {
    // a linear congruential generator, so that every run is the same
    let seed = 12_345;
    const random = (): number => (seed = (seed * 1_103_515_245 + 12_345) % 2 ** 31) / 2 ** 31 - 0.5;
    for (let n = 1; n <= 30; n++) {
      const matrix = Float64Array.from({ length: n * n }, random);
      const solution = Array.from({ length: n }, random);
      const b = Float64Array.from({ length: n }, (_, row) =>
        solution.reduce((sum, value, k) => sum + (matrix[row * n + k] ?? NaN) * value, 0),
      );
      expect(solveLinearSystem(matrix, b)).toBe(true);
      for (const [i, value] of solution.entries()) expect(Math.abs((b[i] ?? NaN) - value)).toBeLessThan(1e-9);
    }
  });

  it('tells a singular system, and refuses sizes that do not match', () => {
    expect(solveLinearSystem(Float64Array.of(1, 2, 2, 4), Float64Array.of(1, 2))).toBe(false);
    expect(() => solveLinearSystem(new Float64Array(3), new Float64Array(2))).toThrow();
  });
});

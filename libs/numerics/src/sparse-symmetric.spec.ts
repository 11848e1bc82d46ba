import { describe, expect, it } from 'vitest';
import { solveLinearSystem } from './linear-system';
import { SparseSymmetric } from './sparse-symmetric';

describe('SparseSymmetric', () => {
  it('solves random networks of springs as elimination with a full matrix does', () => {
    // a linear congruential generator, so that every run is the same
    let seed = 4711;
    const random = (): number => (seed = (seed * 1_103_515_245 + 12_345) % 2 ** 31) / 2 ** 31;
    for (let size = 1; size <= 40; size++) {
      const edges = Array.from({ length: 2 * size }, () => [Math.floor(random() * size), Math.floor(random() * size)])
        .filter(([a, b]) => a !== b)
        .map(([a = 0, b = 0]) => ({ a, b, stiffness: 0.1 + random() }));
      const diagonal = Float64Array.from({ length: size }, () => 0.1 + random());
      const full = new Float64Array(size * size);
      for (const { a, b, stiffness } of edges) {
        diagonal[a] = (diagonal[a] ?? NaN) + stiffness;
        diagonal[b] = (diagonal[b] ?? NaN) + stiffness;
        full[a * size + b] = (full[a * size + b] ?? NaN) - stiffness;
        full[b * size + a] = (full[b * size + a] ?? NaN) - stiffness;
      }
      diagonal.forEach((value, i) => (full[i * size + i] = value));
      const load = Float64Array.from({ length: size }, () => random() - 0.5);
      const [sparse, dense] = [load.slice(), load.slice()];
      const system = new SparseSymmetric(
        size,
        Int32Array.from(edges, ({ a }) => a),
        Int32Array.from(edges, ({ b }) => b),
      );
      const off = Float64Array.from(edges, ({ stiffness }) => -stiffness);
      expect(system.solve(diagonal, off, sparse)).toBe(true);
      expect(solveLinearSystem(full, dense)).toBe(true);
      dense.forEach((value, i) => expect(Math.abs((sparse[i] ?? NaN) - value)).toBeLessThan(1e-11));
    }
  });

  it('takes a chain of 50,000 rows in its stride', () => {
    const size = 50_000;
    const first = Int32Array.from({ length: size - 1 }, (_, i) => i);
    const system = new SparseSymmetric(
      size,
      first,
      first.map((i) => i + 1),
    );
    // −x'' = 0 between 0 held at the left end and 1 at the right: a straight line
    const load = new Float64Array(size);
    load[size - 1] = 1;
    expect(system.solve(new Float64Array(size).fill(2), new Float64Array(size - 1).fill(-1), load)).toBe(true);
    expect(Math.abs((load[24_999] ?? NaN) - 25_000 / 50_001)).toBeLessThan(1e-6);
  });

  it('tells a matrix that is not positive definite, and refuses sizes that do not match', () => {
    const system = new SparseSymmetric(2, Int32Array.of(0), Int32Array.of(1));
    expect(system.solve(Float64Array.of(1, 1), Float64Array.of(2), Float64Array.of(1, 1))).toBe(false);
    expect(() => system.solve(Float64Array.of(1), Float64Array.of(2), Float64Array.of(1, 1))).toThrow();
  });
});

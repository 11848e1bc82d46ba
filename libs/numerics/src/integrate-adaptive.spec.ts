import { describe, expect, it } from 'vitest';
import { integrateAdaptive, NoConvergenceError, NonPhysicalInputError } from './index';

const options = { absoluteTolerance: 1e-9, maximumSteps: 10_000 };

describe('integrateAdaptive', () => {
  // solutions in closed form
  it.each([
    { name: "y' = y", f: (_: number, y: number) => y, s: 0, y: 1, end: 1, exact: Math.E },
    {
      name: "y' = −2sy, backwards",
      f: (s: number, y: number) => -2 * s * y,
      s: 1,
      y: 1 / Math.E,
      end: -1,
      exact: 1 / Math.E,
    },
    { name: "y' = y²", f: (_: number, y: number) => y * y, s: 0, y: 1, end: 0.9, exact: 10, within: 1e-5 },
    { name: "y' = cos s", f: (s: number) => Math.cos(s), s: 0, y: 0, end: 20, exact: Math.sin(20) },
    {
      name: 'gas in a pipe, (p²)′ = −2c',
      f: (_: number, p: number) => -1e5 / p,
      s: 0,
      y: 1e3,
      end: 4,
      exact: Math.sqrt(2e5),
    },
    { name: 'a slope that jumps', f: (s: number) => (s < 1 / 3 ? 100 : -5), s: 0, y: 0, end: 1, exact: 30 },
  ])('follows $name', ({ f, s, y, end, exact, within = 1e-7 }) => {
    expect(Math.abs(integrateAdaptive(f, { s, y }, end, options).y - exact)).toBeLessThan(within);
  });

  it('is exact for slopes of fourth degree, in one step where the tolerance lets it', () => {
    const result = integrateAdaptive((s) => 5 * s ** 4, { s: 0, y: 0 }, 2, { ...options, absoluteTolerance: 1 });
    expect(result.steps).toBe(1);
    expect(Math.abs(result.y - 32)).toBeLessThan(1e-13);
  });

  it('sees no error in slopes of third degree, so it takes one step whatever the tolerance', () => {
    const result = integrateAdaptive((s) => 4 * s ** 3, { s: 0, y: 0 }, 2, { ...options, absoluteTolerance: 1e-12 });
    expect(result.steps).toBe(1);
    expect(Math.abs(result.y - 16)).toBeLessThan(1e-13);
  });

  it('shrinks its error with the tolerance', () => {
    const errorAt = (absoluteTolerance: number): number => {
      const { y, steps } = integrateAdaptive((_, v) => v, { s: 0, y: 1 }, 10, { ...options, absoluteTolerance });
      // each step's error grows by the solution itself on the way to the end, at most e¹⁰-fold
      expect(Math.abs(y - Math.exp(10))).toBeLessThan(steps * absoluteTolerance * Math.exp(10));
      return Math.abs(y - Math.exp(10));
    };
    expect(errorAt(1e-7)).toBeLessThan(errorAt(1e-3) / 100);
  });

  it('lands on the end to the bit and reports every step on the way', () => {
    const seen: number[] = [];
    const end = 0.1 + 0.2;
    const { steps } = integrateAdaptive((s) => Math.sin(50 * s), { s: 0, y: 0 }, end, {
      ...options,
      initialStep: 0.01,
      onStep: (s) => seen.push(s),
    });
    expect(seen).toHaveLength(steps);
    expect(seen.at(-1)).toBe(end);
    expect(seen).toEqual([...seen].sort((a, b) => a - b));
  });

  it('does nothing over no distance', () => {
    const result = integrateAdaptive(() => NaN, { s: 3, y: 7 }, 3, options);
    expect(result).toMatchObject({ y: 7, steps: 0 });
  });

  it('integrates parts that add up to the change of y', () => {
    const result = integrateAdaptive(
      (s, y, parts) => {
        parts[0] = -y;
        parts[1] = 3 * s * s;
        return -y + 3 * s * s;
      },
      { s: 0, y: 2 },
      3,
      { ...options, partCount: 2 },
    );
    const [decay = NaN, cubic = NaN] = result.parts;
    expect(Math.abs(cubic - 27)).toBeLessThan(1e-8);
    expect(Math.abs(2 + decay + cubic - result.y)).toBeLessThan(1e-12);
  });

  it('shortens a trial step that leaves the domain of the slope', () => {
    // y' = −1/(2√(1 − s)): y = √(1 − s), and the slope is NaN beyond s = 1, which a long first step would look at
    const slope = (s: number, y: number): number => (y > 0.05 ? -0.5 / y : NaN * s);
    const { y, rejectedSteps } = integrateAdaptive(slope, { s: 0, y: 1 }, 0.99, {
      ...options,
      absoluteTolerance: 1e-6,
    });
    expect(Math.abs(y - 0.1)).toBeLessThan(1e-4);
    expect(rejectedSteps).toBeGreaterThan(0);
  });

  it('names where it fails', () => {
    const at = { ...options, where: 'pipe L-3' };
    expect(() => integrateAdaptive(() => NaN, { s: 0, y: 0 }, 1, at)).toThrow(
      /^pipe L-3 did not converge: residual 1 /,
    );
    expect(() => integrateAdaptive((s) => (s > 0.5 ? Infinity : 1), { s: 0, y: 0 }, 1, at)).toThrow(NoConvergenceError);
    // y = 1/(1 − s) has no value at s = 1
    expect(() => integrateAdaptive((_, y) => y * y, { s: 0, y: 1 }, 2, at)).toThrow(NoConvergenceError);
    expect(() => integrateAdaptive((s) => s, { s: 0, y: 0 }, 1, { ...at, maximumSteps: 0 })).toThrow(
      NoConvergenceError,
    );
  });

  it.each([
    { start: { s: NaN, y: 0 }, end: 1, tolerance: 1 },
    { start: { s: 0, y: NaN }, end: 1, tolerance: 1 },
    { start: { s: 0, y: 0 }, end: Infinity, tolerance: 1 },
    { start: { s: 0, y: 0 }, end: 1, tolerance: 0 },
    { start: { s: 0, y: 0 }, end: 1, tolerance: NaN },
  ])('refuses start $start.s, $start.y, end $end, tolerance $tolerance', ({ start, end, tolerance }) => {
    expect(() => integrateAdaptive(() => 1, start, end, { ...options, absoluteTolerance: tolerance })).toThrow(
      NonPhysicalInputError,
    );
  });
});

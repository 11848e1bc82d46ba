import { describe, expect, it } from 'vitest';
import { findRootBracketed, NoConvergenceError, NonPhysicalInputError } from './index';

describe('findRootBracketed', () => {
  // roots known in closed form, but the third: Dottie number, OEIS A003957
  it.each([
    { name: 'x² − 2', f: (x: number) => x * x - 2, low: 0, high: 2, root: Math.SQRT2 },
    { name: 'eˣ − 5', f: (x: number) => Math.exp(x) - 5, low: -10, high: 10, root: Math.log(5) },
    { name: 'cos x − x', f: (x: number) => Math.cos(x) - x, low: 0, high: 1, root: 0.7390851332151607 },
    { name: 'a root of third order, (x − 1)³', f: (x: number) => (x - 1) ** 3, low: 0, high: 3, root: 1, within: 1e-9 },
    { name: 'a pole-like 1/x − 1e-6', f: (x: number) => 1 / x - 1e-6, low: 1, high: 1e9, root: 1e6, within: 1e-6 },
    { name: 'a jump at 0.3', f: (x: number) => (x < 0.3 ? -1 : 2), low: 0, high: 1, root: 0.3 },
  ])('finds the root of $name', ({ f, low, high, root, within = 1e-12 }) => {
    expect(Math.abs(findRootBracketed(f, low, high) - root)).toBeLessThan(within);
    expect(Math.abs(findRootBracketed(f, high, low) - root)).toBeLessThan(within);
  });

  it('answers with an end that is itself the root', () => {
    expect(findRootBracketed((x) => x, 0, 5)).toBe(0);
    expect(findRootBracketed((x) => x - 5, 0, 5)).toBe(5);
  });

  it('needs far fewer calls than bisection on a smooth function', () => {
    let calls = 0;
    findRootBracketed((x) => (calls++, x ** 3 - 7), 0, 10);
    // bisection from a bracket of 10 to 1e-12 takes log₂(1e13) = 43
    expect(calls).toBeLessThan(20);
  });

  it('stops where |f| is small enough', () => {
    const x = findRootBracketed((v) => v ** 3 - 7, 0, 10, { fTolerance: 0.1 });
    expect(Math.abs(x ** 3 - 7)).toBeLessThanOrEqual(0.1);
  });

  it('refuses a bracket without a change of sign, and NaN', () => {
    expect(() => findRootBracketed((x) => x * x + 1, -1, 1, { where: 'level' })).toThrow(NonPhysicalInputError);
    expect(() => findRootBracketed((x) => x * x + 1, -1, 1, { where: 'level' })).toThrow(/level cannot take low = -1/);
    expect(() => findRootBracketed((x) => x, NaN, 1)).toThrow(NonPhysicalInputError);
  });

  it('says so when it cannot finish', () => {
    expect(() => findRootBracketed((x) => x ** 3 - 7, 0, 10, { maximumIterations: 2 })).toThrow(NoConvergenceError);
    const brokenInside = (x: number): number => (Math.abs(x) < 1 ? NaN : x);
    expect(() => findRootBracketed(brokenInside, -2, 3)).toThrow(NoConvergenceError);
  });
});

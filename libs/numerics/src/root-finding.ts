import { NoConvergenceError, NonPhysicalInputError } from './errors';

export interface RootOptions {
  /** Half-width of the interval that may be left around the root, in the unit of x; rounding of x itself comes on top. */
  readonly xTolerance?: number;
  /** |f| at or below this counts as a root at once, in the unit of f. */
  readonly fTolerance?: number;
  readonly maximumIterations?: number;
  /** Named in the error. */
  readonly where?: string;
}

/**
 * A root of a continuous function between two points where it has opposite signs, by Brent's method: inverse quadratic
 * interpolation and secant steps while they shrink the bracket quickly, bisection otherwise, so it always converges.
 * @param f the function; called at both ends, then once for each iteration
 * @param low one end of the bracket
 * @param high the other end; need not be the greater one
 * @throws NonPhysicalInputError when f has the same sign at both ends or is NaN there
 * @throws NoConvergenceError when the iterations run out or f turns NaN inside
 * Source: Brent, Algorithms for Minimization without Derivatives (1973), chapter 4.
 */
export function findRootBracketed(
  f: (x: number) => number,
  low: number,
  high: number,
  { xTolerance = 1e-12, fTolerance = 0, maximumIterations = 200, where = 'findRootBracketed' }: RootOptions = {},
): number {
  let a = low;
  let fa = f(a);
  if (Math.abs(fa) <= fTolerance) return a;
  let b = high;
  let fb = f(b);
  if (Math.abs(fb) <= fTolerance) return b;
  if (!(Math.sign(fa) * Math.sign(fb) < 0)) {
    throw new NonPhysicalInputError(where, { low, high, atLow: fa, atHigh: fb });
  }

  // b is the best estimate, a the one before, c the far end of the bracket
  let c = a;
  let fc = fa;
  let step = b - a;
  let stepBefore = step;
  for (let iteration = 1; iteration <= maximumIterations; iteration++) {
    if (Math.sign(fb) === Math.sign(fc)) {
      c = a;
      fc = fa;
      step = stepBefore = b - a;
    }
    if (Math.abs(fc) < Math.abs(fb)) {
      [a, b, c] = [b, c, b];
      [fa, fb, fc] = [fb, fc, fb];
    }
    const tolerance = 2 * Number.EPSILON * Math.abs(b) + xTolerance / 2;
    const toMiddle = (c - b) / 2;
    if (Math.abs(toMiddle) <= tolerance || Math.abs(fb) <= fTolerance) return b;

    const interpolated = interpolatedStep(a, fa, b, fb, c, fc);
    const accepted =
      Math.abs(stepBefore) >= tolerance &&
      Math.abs(fa) > Math.abs(fb) &&
      interpolated * toMiddle > 0 &&
      Math.abs(interpolated) < 1.5 * Math.abs(toMiddle) - tolerance / 2 &&
      Math.abs(interpolated) < Math.abs(stepBefore) / 2;
    stepBefore = accepted ? step : toMiddle;
    step = accepted ? interpolated : toMiddle;

    a = b;
    fa = fb;
    b += Math.abs(step) > tolerance ? step : Math.sign(toMiddle) * tolerance;
    fb = f(b);
    if (Number.isNaN(fb)) throw new NoConvergenceError(where, iteration, fb);
  }
  throw new NoConvergenceError(where, maximumIterations, fb);
}

/** Step from b by inverse quadratic interpolation, or by the secant where only two points differ. */
function interpolatedStep(a: number, fa: number, b: number, fb: number, c: number, fc: number): number {
  const s = fb / fa;
  if (a === c) return ((c - b) * s) / (s - 1);
  const q = fa / fc;
  const r = fb / fc;
  const p = s * ((c - b) * q * (q - r) - (b - a) * (r - 1));
  return -p / ((q - 1) * (r - 1) * (s - 1));
}

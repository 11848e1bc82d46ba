/** One cause of doubt about a pressure. A rectangular one is a limit within which every value is as likely. */
export type UncertaintyPart =
  | { readonly cause: UncertaintyCause; readonly shape: 'rectangular'; readonly limitPa: number }
  | { readonly cause: UncertaintyCause; readonly shape: 'normal'; readonly standardPa: number };

export type UncertaintyCause = 'accuracy' | 'resolution' | 'elevation' | 'loads' | 'receiver' | 'model';

export interface ExpandedUncertainty {
  readonly parts: readonly UncertaintyPart[];
  /** Combined standard uncertainty. */
  readonly standardPa: number;
  readonly coverageFactor: number;
  /** About 95 % either way. */
  readonly expandedPa: number;
}

const COVERAGE = 0.95;
/** Of sums in which nothing dominates. */
const NORMAL_FACTOR = 2;
/** EA-4/02 S9.14: up to this share the rest does not change the shape of what dominates. */
const REST_THAT_MATTERS = 0.3;

/**
 * Combines causes that have nothing to do with one another.
 *     u² = Σ u_i²,   U = k u;   u_i = limit/√3 of a rectangular one
 * k covers 95 %: exactly, for one or two rectangular causes (0.95 of the limit where one stands alone); towards 2 as the rest grows to
 * 0.3 of those two, and 2 beyond.
 * Source: JCGM 100:2008 (GUM) 4.3.7, 5.1.2, G.6; k of dominating causes from EA-4/02 S9.14 and S10.13. The line between the two is ours:
 * without it E_n would jump where the rest reaches 0.3.
 */
export function expandedUncertainty(parts: readonly UncertaintyPart[]): ExpandedUncertainty {
  const standardPa = Math.hypot(...parts.map(standardOf));
  const limits = parts.flatMap((part) => (part.shape === 'rectangular' ? [part.limitPa] : [])).sort((a, b) => b - a);
  const [first = 0, second = 0, ...others] = limits;
  const twoPa = Math.hypot(first, second) / Math.sqrt(3);
  const normal = parts.flatMap((part) => (part.shape === 'normal' ? [part.standardPa] : []));
  const restPa = Math.hypot(...others.map((limit) => limit / Math.sqrt(3)), ...normal);
  const coverageFactor = twoPa === 0 ? NORMAL_FACTOR : towardsNormal(trapezoidFactor(first, second), restPa / twoPa);
  return { parts, standardPa, coverageFactor, expandedPa: coverageFactor * standardPa };
}

export function standardOf(part: UncertaintyPart): number {
  return part.shape === 'normal' ? part.standardPa : part.limitPa / Math.sqrt(3);
}

function towardsNormal(factor: number, restShare: number): number {
  return factor + (NORMAL_FACTOR - factor) * Math.min(1, restShare / REST_THAT_MATTERS);
}

/**
 * Coverage factor of the sum of two rectangular causes, whose density is a trapezoid with edge parameter β = (a₁ − a₂)/(a₁ + a₂):
 *     k = [1 − √((1 − p)(1 − β²))]/√((1 + β²)/6)     for β < p/(2 − p)
 * beyond, the 95 % lie under the flat top, and U = p a₁.
 */
function trapezoidFactor(larger: number, smaller: number): number {
  const beta = (larger - smaller) / (larger + smaller);
  if (beta < COVERAGE / (2 - COVERAGE))
    return (1 - Math.sqrt((1 - COVERAGE) * (1 - beta ** 2))) / Math.sqrt((1 + beta ** 2) / 6);
  return (COVERAGE * larger * Math.sqrt(3)) / Math.hypot(larger, smaller);
}

import { NoConvergenceError, NonPhysicalInputError } from '@riseback/numerics';

/** Laminar up to here: Hagen-Poiseuille, f = 64/Re. */
export const LAMINAR_LIMIT_RE = 2000;
/** Colebrook-White from here. Between the two limits ln f is linear in Re. */
export const TURBULENT_LIMIT_RE = 2300;

/**
 * Where Colebrook-White is documented to hold (Moody's chart). Outside it the functions still answer, because solver
 * iterates pass through; a result that ends there deserves a warning.
 */
export const COLEBROOK_RANGE = { Re: [4e3, 1e8], relativeRoughness: [0, 0.05] } as const;

const TWO_PER_LN10 = 2 / Math.LN10;
const LN_LAMINAR_END = Math.log(64 / LAMINAR_LIMIT_RE);
/** Two Halley steps are enough from Re 100 up; the cap only guards against a programming error. */
const MAX_ITERATIONS = 20;
/** Halley triples the correct digits, so the step after one of this relative size is below 1e-12. */
const LAST_STEP = 1e-4;

/**
 * Darcy friction factor of flow in a round pipe, over the whole range of Reynolds numbers.
 *     Re ≤ 2000:  f = 64/Re
 *     Re ≥ 2300:  Colebrook-White
 *     between:    ln f linear in Re, so that f is continuous and the loss f Re² still rises with the flow
 * @param Re Reynolds number ρvD/μ [–], > 0; a still pipe has no friction factor, its gradient is zero
 * @param relativeRoughness k = ε/D [–], 0 ≤ k < 1
 * @returns Darcy factor f [–]; Fanning is f/4
 * @throws NonPhysicalInputError for Re ≤ 0, k < 0, k ≥ 1 or NaN
 * @remarks The bridge is narrow because the handbook's dry-closed-return table, which the flash method follows, has
 *   cells at Re 2,900 to 3,300 that agree with Colebrook-White.
 * Source: Colebrook, J. Inst. Civ. Eng. 11 (1939) 133-156; 64/Re is Hagen-Poiseuille; the bridge is this program's choice.
 */
export function darcyFrictionFactor(Re: number, relativeRoughness: number): number {
  return Re >= TURBULENT_LIMIT_RE
    ? darcyFrictionFactorColebrook(Re, relativeRoughness)
    : belowTurbulence(Re, relativeRoughness);
}

/** Apart, so that the turbulent way stays short enough for a compiler to take it into the loops that call it. */
function belowTurbulence(Re: number, relativeRoughness: number): number {
  // not `Re <= 0 || …`: every comparison with NaN is false, so NaN would slip through
  if (!(Re > 0 && relativeRoughness >= 0 && relativeRoughness < 1)) {
    throw new NonPhysicalInputError('darcyFrictionFactor', { Re, relativeRoughness });
  }
  if (Re <= LAMINAR_LIMIT_RE) return 64 / Re;
  const lnTurbulentStart = Math.log(darcyFrictionFactorColebrook(TURBULENT_LIMIT_RE, relativeRoughness));
  const share = (Re - LAMINAR_LIMIT_RE) / (TURBULENT_LIMIT_RE - LAMINAR_LIMIT_RE);
  return Math.exp(LN_LAMINAR_END + share * (lnTurbulentStart - LN_LAMINAR_END));
}

/** The last two answers, latest first: a two-phase law asks for the liquid alone, for the vapour alone, and for the liquid again. */
const answered = new Float64Array(6).fill(NaN);
const [RE, ROUGHNESS, FACTOR, NEXT] = [0, 1, 2, 3];

/**
 * Darcy friction factor of turbulent flow by Colebrook-White, solved to better than 1e-10.
 *     1/√f = −2 log₁₀[ k/3.7 + 2.51/(Re √f) ]
 * Solved in y = 1/√f, in which the equation is nearly linear, by Halley's method; the start is the equation itself
 * with 12/Re in place of the second term (the first step of Serghides), within a few per cent of the root.
 * @param Re Reynolds number ρvD/μ [–], > 0 (meant for turbulent flow; it answers from about Re 10 up)
 * @param relativeRoughness k = ε/D [–], 0 ≤ k < 1
 * @returns Darcy factor f [–]
 * @throws NonPhysicalInputError for Re ≤ 0, infinite Re, k < 0, k ≥ 1 or NaN
 * @throws NoConvergenceError never in the range above
 * @remarks 1/√f satisfies the equation to 1e-12 over Re 2300..1e9, k 0..0.05 (swept in the spec).
 * Source: Colebrook, J. Inst. Civ. Eng. 11 (1939) 133-156; start by Serghides, Chem. Eng. 91 (1984) no. 5, 63-64.
 */
export function darcyFrictionFactorColebrook(Re: number, relativeRoughness: number): number {
  if (!(Re > 0 && Re < Infinity && relativeRoughness >= 0 && relativeRoughness < 1)) {
    throw new NonPhysicalInputError('darcyFrictionFactorColebrook', { Re, relativeRoughness });
  }
  if (Re === answered[RE] && relativeRoughness === answered[ROUGHNESS]) return answered[FACTOR] as number;
  if (Re === answered[NEXT + RE] && relativeRoughness === answered[NEXT + ROUGHNESS])
    return answered[NEXT + FACTOR] as number;
  const a = relativeRoughness / 3.7;
  const b = 2.51 / Re;
  let y = -TWO_PER_LN10 * Math.log(a + 12 / Re);
  if (y < 0.5) y = 0.5; // only below Re of about 20, where the start would be useless
  let step = 0;
  for (let iteration = 0; iteration < MAX_ITERATIONS; iteration++) {
    const inside = a + b * y;
    const residual = y + TWO_PER_LN10 * Math.log(inside);
    const relativeSlope = b / inside;
    const slope = 1 + TWO_PER_LN10 * relativeSlope;
    const curvature = -TWO_PER_LN10 * relativeSlope * relativeSlope;
    step = (2 * residual * slope) / (2 * slope * slope - residual * curvature);
    y -= step;
    if (Math.abs(step) < LAST_STEP * y) {
      for (let i = 0; i < NEXT; i++) answered[NEXT + i] = answered[i] as number;
      answered[RE] = Re;
      answered[ROUGHNESS] = relativeRoughness;
      return (answered[FACTOR] = 1 / (y * y));
    }
  }
  throw new NoConvergenceError('darcyFrictionFactorColebrook', MAX_ITERATIONS, Math.abs(step));
}

/**
 * Darcy friction factor of fully rough flow, the limit of Colebrook-White at Re → ∞.
 *     1/√f = −2 log₁₀(k/3.7)
 * @param relativeRoughness k = ε/D [–], 0 < k < 1
 * @throws NonPhysicalInputError for k outside it: a smooth pipe has no such limit
 * Source: von Kármán, as in Colebrook, J. Inst. Civ. Eng. 11 (1939) 133-156.
 */
export function darcyFrictionFactorFullyRough(relativeRoughness: number): number {
  if (!(relativeRoughness > 0 && relativeRoughness < 1)) {
    throw new NonPhysicalInputError('darcyFrictionFactorFullyRough', { relativeRoughness });
  }
  const y = -TWO_PER_LN10 * Math.log(relativeRoughness / 3.7);
  return 1 / (y * y);
}

import { NonPhysicalInputError } from '@riseback/numerics';
import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { massFluxOf } from './two-phase-point';

/** What a rise can show, in Mishima and Ishii's words. */
export type RiseFlowPattern = 'bubbly' | 'slug' | 'churn' | 'annular';

export interface RiseFlow {
  readonly pattern: RiseFlowPattern;
  /** Mean void fraction over a slug and its bubble, a [–]. */
  readonly voidFraction: number;
  /** Void fraction of the bubble section a_m: at it the slugs collapse into churn [–]. */
  readonly slugLimit: number;
}

/**
 * Flow pattern of liquid and vapour in a rise, by Mishima and Ishii's criteria for upward flow.
 *     bubbly    j_l > (3.33/C0 − 1) j_g − (0.76/C0) (σ g d/ρ_l²)^(1/4)
 *     annular   j_g ≥ √(d g D/ρ_g) (a_m − 0.11); from the bore at which entrainment comes first,
 *               D ≥ √(σ/(g d)) N^−0.4/((1 − 0.11 C0)/C0)², j_g ≥ (σ g d/ρ_g²)^(1/4) N^−0.2
 *     churn     a ≥ a_m,   a = j_g/(C0 j + 0.35 V)
 *     slug      else
 *     a_m = 1 − 0.813 {[(C0 − 1) j + 0.35 V]/[j + 0.75 V (d g D³/(ρ_l ν_l²))^(1/18)]}^0.75
 *     d = ρ_l − ρ_g,   j = j_l + j_g,   V = √(d g D/ρ_l),   C0 = 1.2 − 0.2 √(ρ_g/ρ_l),   N = μ_l/√(ρ_l σ √(σ/(g d)))
 * @throws NonPhysicalInputError outside 0 < x < 1, for a still pipe, and for NaN
 * @remarks Made for vertical pipes; used here for every rise steeper than 10°.
 * Source: Mishima & Ishii, Int. J. Heat Mass Transfer 27 (1984) 723-737; see docs/methods/flow-patterns.md.
 */
export function riseFlow(flow: FlashingFlow): RiseFlow {
  const { quality, massFlowKgS, insideDiameterM: D } = flow;
  if (!(quality > 0 && quality < 1 && massFlowKgS > 0 && D > 0)) {
    throw new NonPhysicalInputError('riseFlow', { quality, massFlowKgS, insideDiameterM: D });
  }
  const {
    liquidDensityKgM3: rhoL,
    vapourDensityKgM3: rhoG,
    liquidViscosityPaS: muL,
    surfaceTensionNM: sigma,
  } = flow.saturation;
  const massFlux = massFluxOf(flow);
  const jL = (massFlux * (1 - quality)) / rhoL;
  const jG = (massFlux * quality) / rhoG;
  const j = jL + jG;
  const dg = (rhoL - rhoG) * GRAVITY_M_S2;
  const V = Math.sqrt((dg * D) / rhoL);
  const C0 = 1.2 - 0.2 * Math.sqrt(rhoG / rhoL);
  const N = muL / Math.sqrt(rhoL * sigma * Math.sqrt(sigma / dg));
  const voidFraction = jG / (C0 * j + 0.35 * V);
  const galilei = (dg * D ** 3 * rhoL) / (muL * muL);
  const slugLimit = 1 - 0.813 * (((C0 - 1) * j + 0.35 * V) / (j + 0.75 * V * galilei ** (1 / 18))) ** 0.75;
  return { pattern: pattern(), voidFraction, slugLimit };

  function pattern(): RiseFlowPattern {
    const bubbleDriftMS = ((sigma * dg) / (rhoL * rhoL)) ** 0.25;
    if (jL > (3.33 / C0 - 1) * jG - (0.76 / C0) * bubbleDriftMS) return 'bubbly';
    if (jG >= Math.sqrt((dg * D) / rhoG) * (slugLimit - 0.11)) return 'annular';
    const entrainsFromM = (Math.sqrt(sigma / dg) * N ** -0.4) / ((1 - 0.11 * C0) / C0) ** 2;
    const entrainsFromMS = ((sigma * dg) / (rhoG * rhoG)) ** 0.25 * N ** -0.2;
    if (D >= entrainsFromM && jG >= entrainsFromMS) return 'annular';
    return voidFraction >= slugLimit ? 'churn' : 'slug';
  }
}

import { NonPhysicalInputError } from '@riseback/numerics';
import type { FlashingFlow } from './flash-vapour';
import { darcyFrictionFactor } from './friction-factor';
import { sectionAtLogit, type LevelSection } from './level-section';
import {
  isCreep,
  leaveFactor,
  stratifiedForces,
  vapourFrictionPaM,
  velocityHeadPa,
  type FrictionLaw,
  type LiquidSurface,
} from './stratified-forces';
import { lowestLevel } from './stratified-level';

/** Liquid along the bottom of a level or nearly level pipe, its vapour above. */
export interface StratifiedFlow {
  readonly section: LevelSection;
  /** Friction of vapour and surface, fittings on the vapour's velocity head included [Pa/m]. */
  readonly gradientPaM: number;
  /** r_A: the pull of the speeding vapour over a wave crest, over the wave's weight. From 1 up the flow leaves stratified. */
  readonly leaveRatio: number;
}

/** Taitel and Dukler's balance is used up to this angle either way: sin 10°. */
export const STRATIFIED_SLOPE_LIMIT = Math.sin(Math.PI / 18);

/**
 * Level and friction of stratified flow by Taitel and Dukler's balance of forces, in dimensional form:
 *     τ_l S_l/A_l − τ_g S_g/A_g − τ_i S_i (1/A_l + 1/A_g) − (ρ_l − ρ_g) g sin β = 0
 *     τ_k = f_k ρ_k u_k²/8 with f_k at (u_k D_k, ε/D_k),   τ_i = f_i ρ_g u_g²/8
 *     D_l = 4 A_l/S_l,   D_g = 4 A_g/(S_g + S_i)
 *     gradient = (τ_g S_g + τ_i S_i)/A_g + (K/L) ρ_g j_g²/2
 * β is the angle of fall. f_i = f_g on a smooth surface; on a wavy one f_i = f_g [1 + 15 √h (j_g/j_t − 1)] for j_g above
 * j_t = 5 √(1.2/ρ_g) m/s. The lowest root counts.
 *     r_A = [ρ_g j_g²/((ρ_l − ρ_g) g D cos β)] (u_g/j_g)² r/((A_g/D²)(1 − h)²),   r = S_i/D
 * @param friction this program's Darcy factor unless a check needs another law
 * @returns undefined where no level below 1 − 1e-7 of the bore balances: the pipe runs full; and for a phase of less than 1e-150 m/s
 * @throws NonPhysicalInputError for a quality outside 0 < x < 1, a flow that does not move, a slope beyond 10°, or NaN
 * Source: Taitel & Dukler, AIChE J. 22 (1976) 47-55; wavy surface: Andritsos & Hanratty, AIChE J. 33 (1987) 444-454;
 *   see docs/methods/by-pattern.md.
 */
export function stratifiedFlow(
  flow: FlashingFlow,
  surface: LiquidSurface = 'smooth',
  friction: FrictionLaw = darcyFrictionFactor,
): StratifiedFlow | undefined {
  const { quality, massFlowKgS, fallSlope, insideDiameterM, saturation } = flow;
  const isNearlyLevel = Math.abs(fallSlope) <= STRATIFIED_SLOPE_LIMIT;
  if (!(quality > 0 && quality < 1 && massFlowKgS > 0 && insideDiameterM > 0 && isNearlyLevel)) {
    throw new NonPhysicalInputError('stratifiedFlow', { quality, massFlowKgS, insideDiameterM, fallSlope });
  }
  const forces = stratifiedForces(flow, surface, friction);
  const logit = isCreep(forces) ? undefined : lowestLevel(forces);
  if (logit === undefined) return undefined;
  const section = sectionAtLogit(logit);
  const fittingsPaM = flow.lossCoefficientPerM * velocityHeadPa(forces.vapourSpeedMS, saturation.vapourDensityKgM3);
  return {
    section,
    gradientPaM: vapourFrictionPaM(forces, section) + fittingsPaM,
    leaveRatio: forces.vapourPull * leaveFactor(section),
  };
}

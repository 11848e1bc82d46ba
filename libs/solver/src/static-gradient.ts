import { GRAVITY_M_S2 } from '@riseback/hydraulics';
import type { Method } from '@riseback/network';

/**
 * Static gradient in the direction of flow by the network's basis, of a still pipe too.
 *     rise: basis × slope;   fall: −dropCredit × share that fills the bore × min(basis, ρ_l g) × slope
 * @param riseSlope rise per metre of pipe in the direction of flow
 * @param densityKgM3 of what flows, for the two-phase basis
 * @param fullBoreShare what runs stratified gives no head back: its slope drives it already
 * @returns [Pa/m]
 * Source: docs/methods/static-lift.md.
 */
export function staticGradient(
  { staticLift, liftRulePaM, dropCredit }: Pick<Method, 'staticLift' | 'liftRulePaM' | 'dropCredit'>,
  riseSlope: number,
  liquidDensityKgM3: number,
  densityKgM3: number,
  fullBoreShare: number,
): number {
  if (riseSlope === 0) return 0;
  const liquidPaM = liquidDensityKgM3 * GRAVITY_M_S2;
  let basisPaM = liftRulePaM;
  if (staticLift === 'liquidFull') basisPaM = liquidPaM;
  else if (staticLift === 'twoPhase') basisPaM = densityKgM3 * GRAVITY_M_S2;
  if (riseSlope > 0) return basisPaM * riseSlope;
  return dropCredit * fullBoreShare * Math.min(basisPaM, liquidPaM) * riseSlope;
}

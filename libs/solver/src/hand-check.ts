import { DEFAULT_LIFT_RULE_PA_M, type RoutePiece } from '@riseback/network';

/**
 * The hand check's lift: half a psi per foot (common practice) of every rise in the direction of flow, falls not credited.
 * It is the same whatever basis the network takes for static lift.
 */
export function handCheckLiftPa(piecesInFlow: readonly RoutePiece[]): number {
  let lift = 0;
  for (const { riseM } of piecesInFlow) lift += Math.max(0, riseM) * DEFAULT_LIFT_RULE_PA_M;
  return lift;
}

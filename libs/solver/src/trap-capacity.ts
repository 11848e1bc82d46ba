import type { TrapModel } from '@riseback/network';

type CapacityPoints = NonNullable<TrapModel['capacity']>;

/**
 * What a trap model passes at a differential, from its capacity points in order of rising differential.
 * Between points the flow is linear in √Δp, as through an orifice; below the first it falls with √Δp to nothing; above the
 * last it stays: a maker's figures are never stretched upwards.
 * @returns [kg/s]; 0 without points or at Δp ≤ 0
 */
export function trapCapacityKgS(points: CapacityPoints, differentialPa: number): number {
  if (!(differentialPa > 0)) return 0;
  const root = Math.sqrt(differentialPa);
  let belowRoot = 0;
  let belowKgS = 0;
  for (const { differentialPa: abovePa, flowKgS: aboveKgS } of points) {
    const aboveRoot = Math.sqrt(abovePa);
    if (root <= aboveRoot) return belowKgS + ((root - belowRoot) / (aboveRoot - belowRoot)) * (aboveKgS - belowKgS);
    belowRoot = aboveRoot;
    belowKgS = aboveKgS;
  }
  return belowKgS;
}

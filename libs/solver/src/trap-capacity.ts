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
  let below = { root: 0, flowKgS: 0 };
  for (const point of points) {
    const above = { root: Math.sqrt(point.differentialPa), flowKgS: point.flowKgS };
    if (root <= above.root) {
      return below.flowKgS + ((root - below.root) / (above.root - below.root)) * (above.flowKgS - below.flowKgS);
    }
    below = above;
  }
  return below.flowKgS;
}

import type { Position } from '@riseback/network';
import type { DrawnNetwork, DrawnPipe } from './drawn-network';
import { longestPiece } from './geometry';

/** A rise lower than this is no lift worth a mark, m: 3 ft. */
const LEAST_LIFT_M = 0.9144;

/** The rise of a pipe and the upright piece that shows it; none where it is no lift worth a mark. */
export function liftOf(
  { nodes }: DrawnNetwork,
  { from, to }: DrawnPipe['pipe'],
  points: readonly Position[],
): { readonly riseM: number; readonly piece: readonly [Position, Position] | undefined } {
  const riseM = (nodes.get(to)?.node.elevationM ?? 0) - (nodes.get(from)?.node.elevationM ?? 0);
  return { riseM, piece: riseM >= LEAST_LIFT_M ? longestPiece(points, 'upright') : undefined };
}

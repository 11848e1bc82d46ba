import type { Position } from '@riseback/network';
import { line } from 'd3-shape';

const straight = line<Position>(
  ({ x }) => x,
  ({ y }) => y,
);

/** The path of a line with its corners kept as they are. */
export function linePath(points: readonly Position[]): string {
  return straight([...points]) ?? '';
}

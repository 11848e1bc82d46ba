import type { Position } from '@riseback/network';
import { distance, distanceToPiece, pieces } from './geometry';

/** Step of the drawing's grid, drawing units. */
export const GRID = 20;
/** Symbols nearer than this would touch each other's labels. */
const CLEARANCE = 4 * GRID;
const FARTHEST_RING = 60;

export function snap(value: number): number {
  return Math.round(value / GRID) * GRID;
}

export function snapPoint({ x, y }: Position): Position {
  return { x: snap(x), y: snap(y) };
}

/** What lies on the sheet already. */
export interface Occupied {
  readonly nodes: readonly Position[];
  readonly lines: readonly (readonly Position[])[];
}

/** The grid point nearest to a place that keeps clear of every symbol and pipe; rings outwards, right first, then below. */
export function nearestFreePoint(near: Position, occupied: Occupied): Position {
  const centre = snapPoint(near);
  if (isFree(centre, occupied)) return centre;
  for (let ring = 1; ring <= FARTHEST_RING; ring++) {
    const free = ringAround(centre, ring).filter((point) => isFree(point, occupied));
    if (free.length > 0)
      return free.reduce((best, point) => (distance(point, centre) < distance(best, centre) ? point : best));
  }
  return centre;
}

function isFree(point: Position, { nodes, lines }: Occupied): boolean {
  return (
    nodes.every((node) => Math.abs(node.x - point.x) >= CLEARANCE || Math.abs(node.y - point.y) >= CLEARANCE) &&
    lines.every((line) => pieces(line).every((piece) => distanceToPiece(point, piece) >= GRID))
  );
}

function ringAround({ x, y }: Position, ring: number): Position[] {
  const points: Position[] = [];
  for (let step = -ring; step <= ring; step++) {
    points.push({ x: x + ring * GRID, y: y + step * GRID });
    points.push({ x: x + step * GRID, y: y + ring * GRID });
    points.push({ x: x - ring * GRID, y: y + step * GRID });
    points.push({ x: x + step * GRID, y: y - ring * GRID });
  }
  return points;
}

import type { NodeKind, Position } from '@riseback/network';
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

const FIRST_TAGS: Readonly<Record<NodeKind | 'pipe', string>> = {
  trap: 'TR-101',
  junction: '',
  receiver: 'R-1',
  flashVessel: 'V-1',
  pumpedInlet: 'P-1',
  pipe: 'CR-1',
};

/**
 * A tag to offer for the next element: the last one's, counted up past all that share its letters. Junctions get none until one has a
 * tag, since most stay nameless.
 * @param tags tags of the kind in the file's order
 * @param taken tags of every element, which the offer must not repeat
 */
export function nextTag(kind: NodeKind | 'pipe', tags: readonly string[], taken: ReadonlySet<string>): string {
  const last = tags.findLast((tag) => NUMBERED.test(tag));
  const start = NUMBERED.exec(last ?? FIRST_TAGS[kind]);
  if (start === null) return '';
  const [, letters = '', digits = ''] = start;
  let number = last === undefined ? Number(digits) : Number(digits) + 1;
  while (taken.has(tagged(letters, number, digits.length))) number++;
  return tagged(letters, number, digits.length);
}

const NUMBERED = /^(.*?)(\d{1,9})$/;

function tagged(letters: string, number: number, width: number): string {
  return letters + String(number).padStart(width, '0');
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

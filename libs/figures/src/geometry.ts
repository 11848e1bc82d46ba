import type { Position } from '@riseback/network';

export type Axis = 'level' | 'upright';

/** A point on a polyline and the direction it is passed in, degrees clockwise from +x (y runs down the sheet). */
export interface PointOnLine extends Position {
  readonly angleDeg: number;
}

/**
 * Joins points with right angles: between two points that share neither line nor column an elbow is put in, going straight on from the
 * piece before it where that is possible.
 * @param first which way the line leaves its first point
 */
export function rightAngled(points: readonly Position[], first: Axis): Position[] {
  const line: Position[] = [];
  let axis = first;
  for (const point of points) {
    const last = line.at(-1);
    if (last === undefined) {
      line.push(point);
      continue;
    }
    if (last.x === point.x && last.y === point.y) continue;
    if (last.x !== point.x && last.y !== point.y) {
      line.push(axis === 'upright' ? { x: last.x, y: point.y } : { x: point.x, y: last.y });
      axis = axis === 'upright' ? 'level' : 'upright';
    } else {
      axis = last.x === point.x ? 'upright' : 'level';
    }
    line.push(point);
  }
  return line;
}

export function distance(a: Position, b: Position): number {
  return Math.hypot(b.x - a.x, b.y - a.y);
}

export function lineLength(points: readonly Position[]): number {
  return pieces(points).reduce((sum, [a, b]) => sum + distance(a, b), 0);
}

/** The straight pieces of a line, from its start. */
export function pieces(points: readonly Position[]): [Position, Position][] {
  return points.flatMap((b, i): [Position, Position][] => {
    const a = points[i - 1];
    return a === undefined ? [] : [[a, b]];
  });
}

/** The point at a share (0 to 1) of the line's length. A line of no length gives its first point, heading right. */
export function pointAt(points: readonly Position[], share: number): PointOnLine {
  let left = lineLength(points) * Math.min(1, Math.max(0, share));
  let found: PointOnLine = { ...(points[0] ?? { x: 0, y: 0 }), angleDeg: 0 };
  for (const [a, b] of pieces(points)) {
    const length = distance(a, b);
    if (length === 0) continue;
    const along = Math.min(1, left / length);
    found = { x: a.x + (b.x - a.x) * along, y: a.y + (b.y - a.y) * along, angleDeg: heading(a, b) };
    if (left <= length) return found;
    left -= length;
  }
  return found;
}

/** The part of a line between two shares of its length. */
export function cutLine(points: readonly Position[], from: number, to: number): Position[] {
  const total = lineLength(points);
  const [start, end] = [from * total, to * total];
  const inside: Position[] = [];
  let passed = 0;
  for (const [a, b] of pieces(points)) {
    passed += distance(a, b);
    if (passed > start && passed < end) inside.push(b);
  }
  return [at(points, from), ...inside, at(points, to)];
}

/** The longest straight piece that runs along an axis; undefined where there is none. */
export function longestPiece(points: readonly Position[], axis: Axis): [Position, Position] | undefined {
  const along = pieces(points).filter(([a, b]) => (axis === 'level' ? a.y === b.y : a.x === b.x) && distance(a, b) > 0);
  return along.reduce<[Position, Position] | undefined>(
    (best, piece) => (best === undefined || distance(...piece) > distance(...best) ? piece : best),
    undefined,
  );
}

export function middle([a, b]: readonly [Position, Position]): Position {
  return { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
}

/** How near a point comes to a straight piece. */
export function distanceToPiece(point: Position, [a, b]: readonly [Position, Position]): number {
  const square = (b.x - a.x) ** 2 + (b.y - a.y) ** 2;
  const along = square === 0 ? 0 : ((point.x - a.x) * (b.x - a.x) + (point.y - a.y) * (b.y - a.y)) / square;
  const share = Math.min(1, Math.max(0, along));
  return distance(point, { x: a.x + (b.x - a.x) * share, y: a.y + (b.y - a.y) * share });
}

function at(points: readonly Position[], share: number): Position {
  const { x, y } = pointAt(points, share);
  return { x, y };
}

function heading(a: Position, b: Position): number {
  return (Math.atan2(b.y - a.y, b.x - a.x) * 180) / Math.PI;
}

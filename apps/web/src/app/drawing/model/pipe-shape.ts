import type { Position } from '@riseback/network';

/** What of a pipe is taken hold of. */
export type PipeGrip =
  | { readonly kind: 'corner'; readonly index: number }
  /** A straight piece, which moves across itself; from `split` on where that is given, which makes two new bends. */
  | { readonly kind: 'piece'; readonly index: number; readonly split: Position | null };

/**
 * A line with one of its grips moved. Every piece stays level or upright: what adjoins follows in one coordinate, and where a pipe's end
 * would have to follow it stays and the line gets a corner there instead.
 * @param points the whole line, ends included; a corner's index counts from the first corner
 */
export function reshaped(points: readonly Position[], grip: PipeGrip, dx: number, dy: number): Position[] {
  return tidied(
    grip.kind === 'corner'
      ? cornerMoved(points, grip.index + 1, dx, dy)
      : pieceMoved(points, grip.index, grip.split, dx, dy),
  );
}

/**
 * A line without one of its corners, as short of others as it can be then; the same line when it cannot do without it.
 * @param rejoin joins points with right angles, as the pipe is drawn
 */
export function withoutCorner(
  points: readonly Position[],
  index: number,
  rejoin: (points: readonly Position[]) => readonly Position[],
): readonly Position[] {
  const without = (...dropped: number[]) => tidied(rejoin(points.filter((_, i) => !dropped.includes(i))));
  const corner = index + 1;
  const last = points.length - 1;
  const candidates = [
    without(corner),
    ...(corner + 1 < last ? [without(corner, corner + 1)] : []),
    ...(corner - 1 > 0 ? [without(corner - 1, corner)] : []),
    tidied(rejoin(points.filter((_, i) => i === 0 || i === last))),
  ];
  return candidates.find((line) => line.length < points.length) ?? points;
}

/** Without points that repeat the one before, and without those that a straight run passes through. */
export function tidied(points: readonly Position[]): Position[] {
  const line: Position[] = [];
  for (const point of points) {
    const last = line.at(-1);
    if (last !== undefined && last.x === point.x && last.y === point.y) continue;
    const before = line.at(-2);
    if (before !== undefined && last !== undefined && inLine(before, last, point)) line.pop();
    line.push(point);
  }
  return line;
}

/** Of some coordinates the nearest within reach, so that a piece that is dragged nearly into line comes into line. */
export function nearestWithin(value: number, coordinates: readonly number[], reach: number): number | undefined {
  let best: number | undefined;
  for (const coordinate of coordinates) {
    const off = Math.abs(coordinate - value);
    if (off <= reach && (best === undefined || off < Math.abs(best - value))) best = coordinate;
  }
  return best;
}

function cornerMoved(points: readonly Position[], at: number, dx: number, dy: number): Position[] {
  const corner = points[at];
  const [before, after] = [points[at - 1], points[at + 1]];
  if (corner === undefined || before === undefined || after === undefined) return [...points];
  const moved = { x: corner.x + dx, y: corner.y + dy };
  return [
    ...points.slice(0, at - 1),
    ...follows(before, corner, moved, at - 1 === 0),
    moved,
    ...follows(after, corner, moved, at + 1 === points.length - 1).toReversed(),
    ...points.slice(at + 2),
  ];
}

/** The neighbour of a moved corner in its new place; an end stays where it is and is joined by a corner of its own. */
function follows(neighbour: Position, corner: Position, moved: Position, isEnd: boolean): Position[] {
  const there = neighbour.y === corner.y ? { x: neighbour.x, y: moved.y } : { x: moved.x, y: neighbour.y };
  return isEnd ? [neighbour, there] : [there];
}

function pieceMoved(
  points: readonly Position[],
  index: number,
  split: Position | null,
  dx: number,
  dy: number,
): Position[] {
  const [a, b] = [points[index], points[index + 1]];
  if (a === undefined || b === undefined) return [...points];
  const level = a.y === b.y;
  const across = ({ x, y }: Position): Position => (level ? { x, y: y + dy } : { x: x + dx, y });
  const along = ({ x, y }: Position): Position => (level ? { x: x + dx, y } : { x, y: y + dy });
  const head = points.slice(0, index);
  const tail = points.slice(index + 2);
  const cut = split === null ? null : along(split);
  const start = cut === null ? (index === 0 ? [a, across(a)] : [across(a)]) : [a, cut, across(cut)];
  const end = tail.length === 0 ? [across(b), b] : [across(b)];
  return [...head, ...start, ...end, ...tail];
}

function inLine(a: Position, b: Position, c: Position): boolean {
  return (a.x === b.x && b.x === c.x) || (a.y === b.y && b.y === c.y);
}

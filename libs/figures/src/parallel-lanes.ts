import type { Position } from '@riseback/network';
import { pieces } from './geometry';
import { GRID } from './placement';

/** Room between two pipes that join the same nodes, drawing units. */
const LANE = 2 * GRID;

export interface DrawnLine {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  readonly points: readonly Position[];
}

/**
 * How far each pipe that would lie exactly upon an earlier one is set off from it, by id. The earliest keeps its place, so that a
 * second pipe between two nodes moves nothing.
 */
export function laneShifts(lines: Iterable<DrawnLine>): Map<string, number> {
  const shifts = new Map<string, number>();
  const onSameLine = new Map<string, number>();
  for (const { id, from, to, points } of lines) {
    const turned = from > to;
    const line = (turned ? points.toReversed() : points).map(({ x, y }) => `${String(x)},${String(y)}`).join(' ');
    const key = `${turned ? `${to} ${from}` : `${from} ${to}`} ${line}`;
    const before = onSameLine.get(key) ?? 0;
    onSameLine.set(key, before + 1);
    if (before > 0) shifts.set(id, laneShift(before) * (turned ? -1 : 1));
  }
  return shifts;
}

/** The shift of the n-th pipe upon one line, the first being 0: to one side, to the other, then farther out. */
export function laneShift(n: number): number {
  return LANE * Math.ceil(n / 2) * (n % 2 === 1 ? 1 : -1) + 0;
}

/** A right-angled line set off to one side (right of its direction where positive), still joining the same ends. */
export function setOff(points: readonly Position[], by: number): Position[] {
  const runs = pieces(points).filter(([a, b]) => a.x !== b.x || a.y !== b.y);
  const [first, last] = [points[0], points.at(-1)];
  if (first === undefined || last === undefined || runs.length === 0) return [...points];
  const sides = runs.map(([a, b]) => ({
    x: -Math.sign(b.y - a.y) * by,
    y: Math.sign(b.x - a.x) * by,
  }));
  const line = [first];
  for (const [i, [a]] of runs.entries()) {
    const [own, before] = [sides[i] ?? { x: 0, y: 0 }, sides[i - 1]];
    // at a corner both shifts hold; on a straight run they are the same one
    const turn = before === undefined || (before.x === own.x && before.y === own.y) ? { x: 0, y: 0 } : before;
    line.push({ x: a.x + own.x + turn.x, y: a.y + own.y + turn.y });
  }
  const side = sides.at(-1) ?? { x: 0, y: 0 };
  return [...line, { x: last.x + side.x, y: last.y + side.y }, last];
}

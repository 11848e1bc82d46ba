import type { Position } from '@riseback/network';
import { pieces } from './geometry';

/** Where a pipe passes over an earlier one. */
export interface Crossing extends Position {
  /** The direction of the pipe that passes over. */
  readonly level: boolean;
}

interface Line {
  readonly id: string;
  readonly points: readonly Position[];
}
interface Run {
  readonly id: string;
  readonly order: number;
  /** The coordinate that it keeps, and the range of the other. */
  readonly at: number;
  readonly low: number;
  readonly high: number;
}

/** Nearer to an end or corner than this two pipes touch rather than cross, drawing units. */
const TOUCH = 4;

/**
 * Where pipes cross without a junction, by the later of the two, which is drawn over the other with a gap so that nobody takes the
 * crossing for a junction.
 */
export function crossings(lines: Iterable<Line>): Map<string, Crossing[]> {
  const { level, upright } = runsOf(lines);
  upright.sort((a, b) => a.at - b.at);
  const found = new Map<string, Crossing[]>();
  for (const across of level) {
    for (let i = firstFrom(upright, across.low + TOUCH); i < upright.length; i++) {
      const up = upright[i];
      if (up === undefined || up.at > across.high - TOUCH) break;
      if (up.id === across.id || across.at < up.low + TOUCH || across.at > up.high - TOUCH) continue;
      const over = up.order > across.order ? up : across;
      const crossing = { x: up.at, y: across.at, level: over === across };
      const list = found.get(over.id);
      if (list === undefined) found.set(over.id, [crossing]);
      else list.push(crossing);
    }
  }
  return found;
}

function runsOf(lines: Iterable<Line>): { level: Run[]; upright: Run[] } {
  const level: Run[] = [];
  const upright: Run[] = [];
  let order = 0;
  for (const { id, points } of lines) {
    order++;
    for (const [a, b] of pieces(points)) {
      if (a.y === b.y) level.push({ id, order, at: a.y, low: Math.min(a.x, b.x), high: Math.max(a.x, b.x) });
      else if (a.x === b.x) upright.push({ id, order, at: a.x, low: Math.min(a.y, b.y), high: Math.max(a.y, b.y) });
    }
  }
  return { level, upright };
}

/** The first run, of those in order, that keeps at least this coordinate. */
function firstFrom(runs: readonly Run[], least: number): number {
  let [low, high] = [0, runs.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((runs[middle]?.at ?? Infinity) < least) low = middle + 1;
    else high = middle;
  }
  return low;
}

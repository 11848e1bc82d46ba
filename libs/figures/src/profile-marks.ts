import type { ProfilePoint } from '@riseback/solver';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

/** A rise lower than this is a pitch or a step, not a lift worth a label, m. */
const LIFT_WORTH_A_LABEL_M = 0.3;

/** A point of the way on the figure, px. */
export interface Place {
  readonly x: number;
  readonly pressureY: number;
  readonly elevationY: number;
}

export interface LiftMark {
  readonly x: number;
  readonly width: number;
  readonly labelX: number;
  readonly text: string;
}

/** A text along the way, in the middle of what it names. */
export interface AlongText {
  readonly x: number;
  readonly text: string;
}

/** Rises that follow one another are one lift. A label that would run into the one before it is left out. */
export function liftsAlong(
  points: readonly ProfilePoint[],
  places: readonly Place[],
  units: DisplayUnits,
  edges: { readonly left: number; readonly right: number },
): readonly LiftMark[] {
  const found: { from: number; to: number; riseM: number }[] = [];
  points.forEach((point, i) => {
    const before = points[i - 1];
    if (before === undefined || point.elevationM <= before.elevationM) return;
    const last = found.at(-1);
    const riseM = point.elevationM - before.elevationM;
    if (last?.to === i - 1) Object.assign(last, { to: i, riseM: last.riseM + riseM });
    else found.push({ from: i - 1, to: i, riseM });
  });
  let taken = -Infinity;
  return found
    .filter(({ riseM }) => riseM >= LIFT_WORTH_A_LABEL_M)
    .map(({ from, to, riseM }) => {
      const [left, right] = [places[from]?.x ?? 0, places[to]?.x ?? 0];
      const decimals = units.system === 'us' ? 0 : 1;
      const text = `${formatQuantity(riseM, 'length', units, { withUnit: true, decimals })} lift`;
      const half = text.length * 3.4;
      const labelX = Math.min(edges.right - half, Math.max(edges.left + half, right + half + 8));
      const free = labelX - half > taken;
      if (free) taken = labelX + half + 8;
      return { x: left, width: Math.max(2, right - left), labelX, text: free ? text : '' };
    });
}

/** Where one pipe ends and the next begins, and each pipe's number where it has room. */
export function pipesAlong(
  points: readonly ProfilePoint[],
  places: readonly Place[],
): { readonly joints: readonly Place[]; readonly pipeNumbers: readonly AlongText[] } {
  const ends = points.map((_, i) => i).filter((i) => i > 0 && points[i]?.pipeId !== points[i + 1]?.pipeId);
  let from = places[0]?.x ?? 0;
  let taken = -Infinity;
  const pipeNumbers: { x: number; text: string }[] = [];
  ends.forEach((end, i) => {
    const to = places[end]?.x ?? from;
    // numbered as in the ledger, which begins at the vessel
    const text = String(ends.length - i);
    const [middle, half] = [(from + to) / 2, 2 + text.length * 4];
    if (middle - half >= taken) {
      pipeNumbers.push({ x: middle, text });
      taken = middle + half;
    }
    from = to;
  });
  return { joints: ends.slice(0, -1).flatMap((end) => places[end] ?? []), pipeNumbers };
}

/** The pipes' sizes, once for neighbours of the same; one that has no room is left out, the table has it. */
export function sizesAlong(
  points: readonly ProfilePoint[],
  places: readonly Place[],
  sizeOf: (pipeId: string) => string,
): readonly AlongText[] {
  const runs: { text: string; from: number; to: number }[] = [];
  points.slice(1).forEach(({ pipeId }, i) => {
    const text = sizeOf(pipeId);
    const [from, to] = [places[i]?.x ?? 0, places[i + 1]?.x ?? 0];
    const last = runs.at(-1);
    if (last?.text === text) last.to = to;
    else runs.push({ text, from, to });
  });
  let taken = -Infinity;
  return runs.flatMap(({ text, from, to }) => {
    const [x, half] = [(from + to) / 2, 3 + text.length * 3.2];
    if (text === '' || x - half < taken) return [];
    taken = x + half;
    return [{ x, text }];
  });
}

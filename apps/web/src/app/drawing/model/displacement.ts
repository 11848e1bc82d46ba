import type { Position } from '@riseback/network';
import { type Displaced, type DrawnNetwork, type DrawnPipe, NOTHING_DISPLACED, shownBends } from './drawn-network';

/** Nodes shifted from where they stand; pipes and unknown ids are passed over, since a pipe follows its ends. */
export function shiftNodes({ nodes }: DrawnNetwork, ids: Iterable<string>, dx: number, dy: number): Displaced {
  const moved = new Map<string, Position>();
  for (const id of ids) {
    const at = nodes.get(id)?.at;
    if (at !== undefined) moved.set(id, { x: at.x + dx, y: at.y + dy });
  }
  return { ...NOTHING_DISPLACED, nodes: moved };
}

/** One bend of a pipe shifted; a straight pipe gets its first bend at its middle. */
export function shiftBend(drawn: DrawnPipe, bend: number, dx: number, dy: number): Displaced {
  const bends = movableBends(drawn).map((point, i) => (i === bend ? { x: point.x + dx, y: point.y + dy } : point));
  return { ...NOTHING_DISPLACED, bends: new Map([[drawn.id, bends]]) };
}

export function movableBends(drawn: DrawnPipe): readonly Position[] {
  const shown = shownBends(drawn);
  return shown.length > 0 ? shown : [drawn.at];
}

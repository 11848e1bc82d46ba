import type { Position } from '@riseback/network';
import { rightAngled } from '../../shared/geometry';
import {
  type Displaced,
  type DrawnNetwork,
  type DrawnPipe,
  leavingAxis,
  NOTHING_DISPLACED,
  pipesAt,
  shownBends,
} from './drawn-network';
import { type PipeGrip, reshaped, withoutCorner } from './pipe-shape';

/**
 * Nodes shifted from where they stand. Pipes and unknown ids are passed over, since a pipe follows its ends: with both of them shifted its
 * bends go along, with one of them the bend next to it follows in one coordinate, so that right angles stay right.
 */
export function shiftNodes(network: DrawnNetwork, ids: Iterable<string>, dx: number, dy: number): Displaced {
  const moved = new Map<string, Position>();
  for (const id of ids) {
    const at = network.nodes.get(id)?.at;
    if (at !== undefined) moved.set(id, { x: at.x + dx, y: at.y + dy });
  }
  return nodesTo(network, moved);
}

/** Nodes in new places, with the bends that follow them. */
export function nodesTo(network: DrawnNetwork, moved: ReadonlyMap<string, Position>): Displaced {
  const bends = new Map<string, readonly Position[]>();
  for (const id of new Set([...moved.keys()].flatMap((node) => pipesAt(network, node)))) {
    const pipe = network.pipes.get(id)?.pipe;
    if (pipe?.bends === undefined || pipe.bends.length === 0) continue;
    const [from, to] = [network.nodes.get(pipe.from)?.at, network.nodes.get(pipe.to)?.at];
    if (from === undefined || to === undefined) continue;
    const [newFrom, newTo] = [moved.get(pipe.from) ?? from, moved.get(pipe.to) ?? to];
    const followed = bendsFollowing(pipe.bends, { from, to }, { from: newFrom, to: newTo });
    if (followed.some((bend, i) => bend !== pipe.bends?.[i])) bends.set(id, followed);
  }
  return { nodes: moved, bends };
}

interface Ends {
  readonly from: Position;
  readonly to: Position;
}

function bendsFollowing(bends: readonly Position[], before: Ends, now: Ends): readonly Position[] {
  const start = { x: now.from.x - before.from.x, y: now.from.y - before.from.y };
  const end = { x: now.to.x - before.to.x, y: now.to.y - before.to.y };
  if (start.x === end.x && start.y === end.y) return bends.map(({ x, y }) => ({ x: x + start.x, y: y + start.y }));
  return bends.map((bend, i) => {
    const withStart = i === 0 ? following(bend, before.from, start) : bend;
    return i === bends.length - 1 ? following(withStart, before.to, end, bend) : withStart;
  });
}

/** @param was where the bend stood, where the other end has moved it already */
function following(bend: Position, end: Position, by: Position, was: Position = bend): Position {
  const [dx, dy] = [was.x === end.x ? by.x : 0, was.y === end.y ? by.y : 0];
  return dx === 0 && dy === 0 ? bend : { x: bend.x + dx, y: bend.y + dy };
}

/** A pipe with one of its grips moved. */
export function shiftGrip(drawn: DrawnPipe, grip: PipeGrip, dx: number, dy: number): Displaced {
  const bends = reshaped(drawn.points, grip, dx, dy).slice(1, -1);
  return { ...NOTHING_DISPLACED, bends: new Map([[drawn.id, bends]]) };
}

/** What `M` and a bend's handle move: a pipe's corners, or the whole of it where it is straight. */
export function gripsOf(drawn: DrawnPipe): readonly PipeGrip[] {
  const corners = shownBends(drawn).map((_, index): PipeGrip => ({ kind: 'corner', index }));
  return corners.length > 0 ? corners : [{ kind: 'piece', index: 0, split: null }];
}

/** A pipe without one of its bends; null when it cannot do without it. */
export function withoutBend(network: DrawnNetwork, drawn: DrawnPipe, bend: number): Displaced | null {
  const from = network.nodes.get(drawn.pipe.from);
  const first = from === undefined ? 'level' : leavingAxis(from.node.kind);
  const points = withoutCorner(drawn.points, bend, (line) => rightAngled(line, first));
  return points === drawn.points ? null : { ...NOTHING_DISPLACED, bends: new Map([[drawn.id, points.slice(1, -1)]]) };
}

/** A pipe laid anew, as a new one between its ends would be. */
export function withoutBends({ id }: DrawnPipe): Displaced {
  return { ...NOTHING_DISPLACED, bends: new Map([[id, []]]) };
}

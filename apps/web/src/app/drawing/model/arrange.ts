import type { NodeKind, Position } from '@riseback/network';
import { snap } from '@riseback/figures';
import type { DrawnNetwork } from './drawn-network';

export const ALIGNMENTS = ['left', 'centre', 'right', 'top', 'middle', 'bottom'] as const;
export type Alignment = (typeof ALIGNMENTS)[number];
export const DISTRIBUTIONS = ['horizontally', 'vertically'] as const;
export type Distribution = (typeof DISTRIBUTIONS)[number];

/** Half the width and height of a symbol with room for a hair's breadth, drawing units. */
const REACH: Readonly<Record<NodeKind, Readonly<Position>>> = {
  trap: { x: 17, y: 17 },
  pumpedInlet: { x: 17, y: 17 },
  junction: { x: 10, y: 10 },
  receiver: { x: 38, y: 28 },
  flashVessel: { x: 19, y: 38 },
};

/**
 * Nodes on one line, each moved across it only. The line goes through the outermost of them, or half-way between the outermost on the
 * grid: pipes join symbols at their middles, so the middles are what is brought into line.
 */
export function aligned(network: DrawnNetwork, ids: Iterable<string>, alignment: Alignment): Map<string, Position> {
  const places = placesOf(network, ids);
  const xs = [...places.values()].map(({ x }) => x);
  const ys = [...places.values()].map(({ y }) => y);
  const line = {
    left: { x: Math.min(...xs) },
    centre: { x: snap((Math.min(...xs) + Math.max(...xs)) / 2) },
    right: { x: Math.max(...xs) },
    top: { y: Math.min(...ys) },
    middle: { y: snap((Math.min(...ys) + Math.max(...ys)) / 2) },
    bottom: { y: Math.max(...ys) },
  }[alignment];
  return changed(places, (at) => ({ ...at, ...line }));
}

/** Nodes at equal distances along one direction, the outermost staying where they are. */
export function distributed(network: DrawnNetwork, ids: Iterable<string>, along: Distribution): Map<string, Position> {
  const places = placesOf(network, ids);
  const axis = along === 'horizontally' ? 'x' : 'y';
  const order = [...places].sort(([a, left], [b, right]) => left[axis] - right[axis] || (a < b ? -1 : 1));
  const [first, last] = [order[0], order.at(-1)];
  if (first === undefined || last === undefined) return new Map();
  const [start, step] = [first[1][axis], (last[1][axis] - first[1][axis]) / Math.max(1, order.length - 1)];
  const targets = new Map(order.map(([id], i) => [id, i === order.length - 1 ? last[1][axis] : start + i * step]));
  return changed(places, (at, id) => ({ ...at, [axis]: targets.get(id) ?? at[axis] }));
}

/** Two symbols that would lie on one another after a move and do not now; undefined when there are none. */
export function stackedBy(network: DrawnNetwork, moved: ReadonlyMap<string, Position>): [string, string] | undefined {
  for (const [id, at] of moved) {
    const mine = network.nodes.get(id);
    if (mine === undefined) continue;
    for (const other of network.nodes.values()) {
      if (other.id === id) continue;
      const [mineKind, otherKind] = [mine.node.kind, other.node.kind];
      const there = moved.get(other.id) ?? other.at;
      if (overlap(at, mineKind, there, otherKind) && !overlap(mine.at, mineKind, other.at, otherKind)) {
        return [id, other.id];
      }
    }
  }
  return undefined;
}

function overlap(a: Position, aKind: NodeKind, b: Position, bKind: NodeKind): boolean {
  return Math.abs(a.x - b.x) < REACH[aKind].x + REACH[bKind].x && Math.abs(a.y - b.y) < REACH[aKind].y + REACH[bKind].y;
}

function placesOf({ nodes }: DrawnNetwork, ids: Iterable<string>): Map<string, Position> {
  return new Map(
    [...ids].flatMap((id) => {
      const at = nodes.get(id)?.at;
      return at === undefined ? [] : [[id, at] as const];
    }),
  );
}

function changed(
  places: ReadonlyMap<string, Position>,
  to: (at: Position, id: string) => Position,
): Map<string, Position> {
  return new Map(
    [...places].flatMap(([id, at]) => {
      const there = to(at, id);
      return there.x === at.x && there.y === at.y ? [] : [[id, there] as const];
    }),
  );
}

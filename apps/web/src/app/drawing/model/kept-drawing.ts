import { jsonEqual } from '@riseback/network';
import type { DrawnNetwork, DrawnNode, DrawnPipe } from './drawn-network';

/**
 * The drawing after an edit, in which each element that stayed as it was is the very object that it was, so that it is not drawn anew;
 * where none changed, so are all nodes or all pipes together.
 */
export function keptDrawing(now: DrawnNetwork, before: DrawnNetwork): DrawnNetwork {
  return { ...now, nodes: kept(now.nodes, before.nodes, sameNode), pipes: kept(now.pipes, before.pipes, samePipe) };
}

/** An edit makes the elements that it touches anew and leaves the objects of all others. */
const sameNode = (a: DrawnNode, b: DrawnNode): boolean => a.node === b.node;

/** A pipe follows its ends and keeps clear of others, so its line may change without it. */
const samePipe = (a: DrawnPipe, b: DrawnPipe): boolean =>
  a.pipe === b.pipe && a.lane === b.lane && jsonEqual(a.points, b.points);

function kept<T>(
  now: ReadonlyMap<string, T>,
  before: ReadonlyMap<string, T>,
  same: (a: T, b: T) => boolean,
): ReadonlyMap<string, T> {
  const all = new Map<string, T>();
  let changed = now.size !== before.size;
  const inOrder = before.keys();
  for (const [id, item] of now) {
    const was = before.get(id);
    const stays = was !== undefined && same(was, item);
    all.set(id, stays ? was : item);
    changed ||= !stays || inOrder.next().value !== id;
  }
  return changed ? all : before;
}

import type { NetworkNode, PipeRun } from './network-file';
import { hasFixedPressure } from './topology';

/** The part of a network that hangs together, as a tree from its receiver outward. */
export interface SpanningTree {
  /** Node ids, each after its parent. */
  readonly order: readonly string[];
  readonly parents: ReadonlyMap<string, string>;
  readonly children: ReadonlyMap<string, readonly string[]>;
}

/**
 * The network as trees, whatever way the arrows point; a pipe that closes a loop is left out. Trees start at receivers, then at flash
 * vessels that no receiver is reached from, then at the first node of what is left.
 */
export function spanningTrees(nodes: readonly NetworkNode[], pipes: readonly PipeRun[]): SpanningTree[] {
  const neighbours = new Map<string, string[]>(nodes.map(({ id }) => [id, []]));
  for (const { from, to } of pipes) {
    neighbours.get(from)?.push(to);
    neighbours.get(to)?.push(from);
  }
  const receivers = nodes.filter((node) => node.kind === 'receiver');
  const vessels = nodes.filter((node) => node.kind !== 'receiver' && hasFixedPressure(node));
  const reached = new Set<string>();
  const trees: SpanningTree[] = [];
  for (const { id } of [...receivers, ...vessels, ...nodes]) {
    if (!reached.has(id)) trees.push(treeFrom(id, neighbours, reached));
  }
  return trees;
}

function treeFrom(
  root: string,
  neighbours: ReadonlyMap<string, readonly string[]>,
  reached: Set<string>,
): SpanningTree {
  const order = [root];
  const parents = new Map<string, string>();
  const children = new Map<string, string[]>();
  reached.add(root);
  // `order` grows while it is walked: nearest to the receiver first
  for (const id of order) {
    const mine: string[] = [];
    for (const neighbour of neighbours.get(id) ?? []) {
      if (reached.has(neighbour)) continue;
      reached.add(neighbour);
      parents.set(neighbour, id);
      mine.push(neighbour);
      order.push(neighbour);
    }
    children.set(id, mine);
  }
  return { order, parents, children };
}

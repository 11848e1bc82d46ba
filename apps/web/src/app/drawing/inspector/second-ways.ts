import type { NetworkDocument } from '@riseback/network';

/**
 * Whether somewhere condensate has a second way down: a loop, pipes side by side, or two receivers that drain one node. All nodes of fixed
 * pressure count as one, and a flash vessel's leaving pipe begins a tree of its own, as in the solver's walk.
 */
export function hasSecondWays({ nodes, pipes }: NetworkDocument): boolean {
  const parents = new Map<string, string>();
  const rootOf = (id: string): string => {
    let root = id;
    for (let above = parents.get(root); above !== undefined; above = parents.get(root)) root = above;
    // the next question goes straight there
    for (let at = id; at !== root;) {
      const above = parents.get(at) ?? root;
      parents.set(at, root);
      at = above;
    }
    return root;
  };
  const endOf = (id: string, leaving: boolean): string => {
    const kind = nodes.get(id)?.value.kind;
    if (kind === 'flashVessel' && leaving) return `out of ${id}`;
    return kind === 'receiver' || kind === 'flashVessel' ? FIXED : id;
  };
  const closing: string[] = [];
  for (const { value: pipe } of pipes.values()) {
    const [from, to] = [rootOf(endOf(pipe.from, true)), rootOf(endOf(pipe.to, false))];
    if (from === to) closing.push(from);
    else parents.set(from, to);
  }
  // what leads to no fixed pressure is left out of a solve, loops and all
  return closing.some((id) => rootOf(id) === rootOf(FIXED));
}

/** No id: ids have no space. */
const FIXED = 'fixed pressure';

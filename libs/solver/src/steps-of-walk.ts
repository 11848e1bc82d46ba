import type { ReturnTree } from './return-tree';

/** A pipe of a walk with the node that it leaves, by index. */
export interface TreeStep {
  readonly node: number;
  readonly pipe: number;
}

/** The pipes from a node to the end of its walk, from the node down. */
export function stepsFrom(tree: ReturnTree, start: number): TreeStep[] {
  const steps: TreeStep[] = [];
  for (let node = start; tree.outPipe[node] !== -1; node = tree.drainsTo[node] as number)
    steps.push({ node, pipe: tree.outPipe[node] as number });
  return steps;
}

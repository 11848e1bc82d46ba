import type { NetworkDocument } from './network-document';
import type { NetworkNode } from './network-file';
import { pipeEnds } from './pipe-ends';
import { pipeFindings } from './pipe-findings';
import { elementsOf, groundReached, hasBothEnds, hasFixedPressure, isSource, PipesAtNodes } from './topology';

/** Ids of what a live solve can compute. */
export interface SolvablePart {
  readonly nodes: ReadonlySet<string>;
  readonly pipes: ReadonlySet<string>;
}

/**
 * The nodes from which a fixed pressure is reached through sound pipes, and those pipes: what a live solve computes, leaving out the
 * rest. A pipe is sound when it has no finding by itself and stands the right way, and alone, at the trap, vessel or receiver where
 * it starts or ends.
 */
export function solvablePart(document: NetworkDocument): SolvablePart {
  const elements = elementsOf(document);
  const ends = pipeEnds(elements);
  const at = new PipesAtNodes(elements, ends);
  const isSound = elements.pipes.map((pipe, i) => {
    if (!hasBothEnds(ends, i)) return false;
    const fromIndex = ends.from[i] as number;
    const [from, to] = [elements.nodes[fromIndex], elements.nodes[ends.to[i] as number]] as [NetworkNode, NetworkNode];
    return pipeFindings(pipe, from, to).length === 0 && standsRight(from, to, at.leavingCount(fromIndex));
  });
  const reachesGround = groundReached(elements.nodes, ends, isSound);

  const nodes = new Set<string>();
  elements.nodes.forEach((node, index) => {
    if (hasFixedPressure(node) || reachesGround(index)) nodes.add(node.id);
  });
  const pipes = elements.pipes.filter(({ from, to }, i) => isSound[i] === true && nodes.has(from) && nodes.has(to));
  return { nodes, pipes: new Set(pipes.map(({ id }) => id)) };
}

function standsRight(from: NetworkNode, to: NetworkNode, leavingCount: number): boolean {
  if (from.kind === 'receiver' || isSource(to)) return false;
  const startsAlone = isSource(from) || from.kind === 'flashVessel';
  return !startsAlone || leavingCount === 1;
}

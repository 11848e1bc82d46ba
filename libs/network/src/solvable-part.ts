import type { NetworkDocument } from './network-document';
import { pipeFindings } from './pipe-findings';
import {
  elementsOf,
  groundReached,
  hasFixedPressure,
  isSource,
  PipesAtNodes,
  pipesWithEnds,
  type PipeEnds,
} from './topology';

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
  const all = pipesWithEnds(elements);
  const at = new PipesAtNodes(elements.nodes.length, all);
  const sound = all.filter((ends) => pipeFindings(ends).length === 0 && standsRight(ends, at));
  const reachesGround = groundReached(elements.nodes.length, sound);

  const nodes = new Set<string>();
  elements.nodes.forEach((node, index) => {
    if (hasFixedPressure(node) || reachesGround(index)) nodes.add(node.id);
  });
  const pipes = sound.filter(({ from, to }) => nodes.has(from.id) && nodes.has(to.id));
  return { nodes, pipes: new Set(pipes.map(({ pipe }) => pipe.id)) };
}

function standsRight({ from, to, fromIndex }: PipeEnds, at: PipesAtNodes): boolean {
  if (from.kind === 'receiver' || isSource(to)) return false;
  const startsAlone = isSource(from) || from.kind === 'flashVessel';
  return !startsAlone || at.leavingCount(fromIndex) === 1;
}

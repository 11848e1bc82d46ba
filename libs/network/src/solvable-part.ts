import type { NetworkDocument } from './network-document';
import { pipeFindings } from './pipe-findings';
import {
  GROUND,
  hasFixedPressure,
  isSource,
  joinEnds,
  JoinedSets,
  pipesAtNodes,
  pipesWithEnds,
  type PipeEnds,
  type PipesAtNodes,
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
  const all = pipesWithEnds(document);
  const atNodes = pipesAtNodes(all);
  const sound = all.filter((ends) => pipeFindings(ends).length === 0 && standsRight(ends, atNodes));
  const sets = new JoinedSets();
  for (const ends of sound) joinEnds(sets, ends);

  const nodes = new Set<string>();
  for (const [id, { value: node }] of document.nodes) {
    if (hasFixedPressure(node) || sets.areJoined(id, GROUND)) nodes.add(id);
  }
  const pipes = sound.filter(({ from, to }) => nodes.has(from.id) && nodes.has(to.id));
  return { nodes, pipes: new Set(pipes.map(({ pipe }) => pipe.id)) };
}

function standsRight({ pipe, from, to }: PipeEnds, atNodes: PipesAtNodes): boolean {
  if (from.kind === 'receiver' || isSource(to)) return false;
  const startsAlone = isSource(from) || from.kind === 'flashVessel';
  return !startsAlone || (atNodes.leaving.get(pipe.from)?.length ?? 0) === 1;
}

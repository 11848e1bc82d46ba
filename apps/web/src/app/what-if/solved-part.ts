import {
  applyBatch,
  type NetworkDocument,
  type NetworkFile,
  removalOps,
  solvablePart,
  toFile,
} from '@riseback/network';

export interface SolvedPart {
  readonly file: NetworkFile;
  /** Nodes that are left out since nothing sound leads from them to a receiver. */
  readonly leftOut: readonly string[];
}

/** The file of what can be solved of a network that is still being drawn: the rest is left out, as a live solve does. */
export function solvedPart(document: NetworkDocument): SolvedPart {
  const part = solvablePart(document);
  const nodes = [...document.nodes.keys()].filter((id) => !part.nodes.has(id));
  const pipes = [...document.pipes.keys()].filter((id) => !part.pipes.has(id));
  const applied = applyBatch(document, removalOps(document, { nodes, pipes }));
  return { file: toFile(applied.ok ? applied.document : document), leftOut: nodes };
}

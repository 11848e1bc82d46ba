import { applyBatch, type EditOp, type NetworkDocument, setOp } from '@riseback/network';
import { type DrawnNetwork, drawnNetwork, type DrawnPipe, shownBends } from './drawn-network';

/**
 * Operations with those added that hold parallel pipes where they are drawn: a pipe that is set off from another would fall back
 * upon the straight line once the other goes or bends. Its way is written into it as bends of its own instead.
 */
export function keepingLanes(
  network: DrawnNetwork,
  document: NetworkDocument,
  ops: readonly EditOp[],
): readonly EditOp[] {
  const setOff = [...network.pipes.values()].filter(({ lane }) => lane !== 0);
  const applied = setOff.length === 0 ? undefined : applyBatch(document, ops);
  if (applied?.ok !== true) return ops;
  const after = drawnNetwork(applied.document);
  const held = setOff
    .filter((pipe) => fellBack(pipe, network, after))
    .map((pipe) => setOp(document, 'pipes', pipe.id, 'bends', shownBends(pipe)));
  return [...ops, ...held];
}

function fellBack(pipe: DrawnPipe, before: DrawnNetwork, after: DrawnNetwork): boolean {
  const now = after.pipes.get(pipe.id);
  if (now === undefined || now.lane === pipe.lane || now.pipe.bends !== pipe.pipe.bends) return false;
  return [pipe.pipe.from, pipe.pipe.to].every((end) => {
    const [was, is] = [before.nodes.get(end)?.at, after.nodes.get(end)?.at];
    return was?.x === is?.x && was?.y === is?.y;
  });
}

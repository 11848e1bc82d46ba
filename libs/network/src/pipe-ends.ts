import type { NetworkNode, PipeRun } from './network-file';

/** By pipe, the indices of the nodes that it joins in the list of nodes; −1 for a node that is not there. */
export interface PipeEnds {
  readonly from: Int32Array;
  readonly to: Int32Array;
}

/** Ids are looked up here once for a whole solve: beyond this point a pipe's ends are numbers. */
export function pipeEnds({
  nodes,
  pipes,
}: {
  readonly nodes: readonly NetworkNode[];
  readonly pipes: readonly PipeRun[];
}): PipeEnds {
  const indexOf = new Map<string, number>();
  for (let i = 0; i < nodes.length; i++) indexOf.set((nodes[i] as NetworkNode).id, i);
  const from = new Int32Array(pipes.length);
  const to = new Int32Array(pipes.length);
  for (let i = 0; i < pipes.length; i++) {
    const pipe = pipes[i] as PipeRun;
    from[i] = indexOf.get(pipe.from) ?? -1;
    to[i] = indexOf.get(pipe.to) ?? -1;
  }
  return { from, to };
}

import type { NetworkFile, NetworkNode, PipeRun } from '@riseback/network';
import { insideDiameterM, pipeGeometry, type PipeGeometry } from './pipe-geometry';
import type { NodeResult, PipeResult, TrapResult } from './solve-result';

/** What a walk needs of a result, be it fresh from the solver or read from the server. */
export interface WalkedResult {
  readonly nodes: readonly NodeResult[];
  readonly pipes: readonly PipeResult[];
  readonly traps: readonly Pick<TrapResult, 'id' | 'backPressurePa' | 'receiverPressurePa' | 'walk'>[];
}

/** One pipe on a trap's walk. */
export interface WalkStep {
  readonly pipe: PipeRun;
  readonly result: PipeResult;
  readonly geometry: PipeGeometry;
  /** Whether the walk, which goes with the flow, goes with the pipe's arrow. */
  readonly withArrow: boolean;
  readonly upstream: NetworkNode;
  readonly upstreamResult: NodeResult;
}

/**
 * The pipes between a trap and the end of its walk, as a result gives them, from the trap down.
 * @returns undefined for a trap that the result does not have, and for a file that is not the one solved
 */
export function walkOfTrap(
  file: NetworkFile,
  result: WalkedResult,
  trapId: string,
): { readonly trap: WalkedResult['traps'][number]; readonly steps: readonly WalkStep[] } | undefined {
  const trap = result.traps.find(({ id }) => id === trapId);
  if (trap === undefined) return undefined;
  const nodes = byId(file.nodes);
  const pipes = byId(file.pipes);
  const nodeResults = byId(result.nodes);
  const pipeResults = byId(result.pipes);
  const steps: WalkStep[] = [];
  let upstream = nodes.get(trapId);
  for (const id of trap.walk) {
    const pipe = pipes.get(id);
    const pipeResult = pipeResults.get(id);
    const upstreamResult = upstream && nodeResults.get(upstream.id);
    if (!upstream || !pipe || !pipeResult || !upstreamResult || insideDiameterM(pipe) === undefined) return undefined;
    const withArrow = pipe.from === upstream.id;
    const downstream = nodes.get(withArrow ? pipe.to : pipe.from);
    const riseM = ((downstream?.elevationM ?? 0) - upstream.elevationM) * (withArrow ? 1 : -1);
    const geometry = pipeGeometry(pipe, riseM);
    if (geometry === undefined) return undefined;
    steps.push({ pipe, result: pipeResult, geometry, withArrow, upstream, upstreamResult });
    upstream = downstream;
  }
  return { trap, steps };
}

function byId<T extends { readonly id: string }>(elements: readonly T[]): Map<string, T> {
  return new Map(elements.map((element) => [element.id, element]));
}

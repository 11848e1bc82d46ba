import type { NetworkFile } from '@riseback/network';
import type { PipeGeometry } from './pipe-geometry';
import { missing, type ProblemError } from './refusal';
import type { ReturnTree, TreeBreak } from './return-tree';

/** What a network's findings mean for a solve. */
export interface Solvability {
  /** Mistakes that a solve of the whole network cannot pass over. */
  readonly errors: readonly ProblemError[];
  /** Pipes that cannot be computed; a partial solve leaves them out, with what drains through them alone. */
  readonly unusablePipes: ReadonlySet<number>;
}

export function solvability(file: NetworkFile, geometries: readonly (PipeGeometry | undefined)[]): Solvability {
  const errors: ProblemError[] = [];
  const unusablePipes = new Set<number>();
  file.pipes.forEach((pipe, i) => {
    if (geometries[i] === undefined) {
      unusablePipes.add(i);
      const { nps, schedule } = pipe.size ?? {};
      errors.push({
        pointer: `/pipes/${i}/size`,
        detail: `No pipe standard here makes NPS ${nps} in schedule ${schedule}`,
      });
    }
  });
  return { errors, unusablePipes };
}

/** What makes the network more than a set of trees, by name. */
export function loopsIn(tree: ReturnTree): ProblemError[] {
  return tree.breaks.map(({ pipe, why }) => missing(`/pipes/${pipe}`, BREAK[why]));
}

const BREAK: Readonly<Record<TreeBreak['why'], string>> = {
  loop: 'a loop (this pipe closes one)',
  parallelReceivers: 'a network that drains to several receivers at once (this pipe joins two)',
  vesselCycle: 'a vessel that drains back into itself',
};

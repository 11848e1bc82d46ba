import { fileFindings, fromFile, solvablePart, type NetworkFile } from '@riseback/network';
import { insideDiameterM, type PipeGeometry } from './pipe-geometry';
import { missing, type ProblemError } from './refusal';
import type { ReturnTree, TreeBreak } from './return-tree';

/**
 * What a solve of the whole network cannot pass over, each with its place. Loops are told by {@link loopsIn}: they are sound
 * networks, only not computed yet.
 */
export function mistakesIn(file: NetworkFile, geometries: readonly (PipeGeometry | undefined)[]): ProblemError[] {
  const found = fileFindings(file)
    .filter(({ code, severity }) => severity === 'error' && code !== 'loop')
    .map(({ pointer, what, remedy }) => ({ pointer, detail: `${what}. ${remedy}` }));
  return [...found, ...impossiblePipes(file, geometries)];
}

/** By pipe: whether a live solve may count on it. What drains through other pipes alone is left out. */
export function soundPipes(file: NetworkFile, geometries: readonly (PipeGeometry | undefined)[]): boolean[] {
  const { pipes } = solvablePart(fromFile(file));
  return file.pipes.map(({ id }, i) => pipes.has(id) && geometries[i] !== undefined);
}

/** What makes the network more than a set of trees, by name. */
export function loopsIn({ breaks }: ReturnTree): ProblemError[] {
  return breaks.map(({ pipe, why }) => missing(`/pipes/${pipe}`, BREAK[why]));
}

const BREAK: Readonly<Record<TreeBreak['why'], string>> = {
  loop: 'a loop (this pipe closes one)',
  parallelReceivers: 'a second way down (this pipe joins what drains to two receivers or vessels)',
  vesselCycle: 'a flash vessel whose liquid comes back to it (through this pipe)',
};

/** What keeps a pipe from being computed although it is drawn right. */
function impossiblePipes(file: NetworkFile, geometries: readonly (PipeGeometry | undefined)[]): ProblemError[] {
  return file.pipes.flatMap((pipe, i) => {
    if (geometries[i] !== undefined) return [];
    const { size } = pipe;
    if (size !== undefined && insideDiameterM(pipe) === undefined) {
      const detail = `No standard in the pipe catalogue makes size ${size.nps} in schedule ${size.schedule}. Choose another, or give insideDiameterM.`;
      return [{ pointer: `/pipes/${i}/size`, detail }];
    }
    const detail = `The roughness, ${pipe.roughnessM} m, fills the bore. New steel has 0.0000457 m.`;
    return [{ pointer: `/pipes/${i}/roughnessM`, detail }];
  });
}

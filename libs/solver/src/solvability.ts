import { fileFindings, fromFile, solvablePart, type NetworkFile, type PipeEnds, type PipeRun } from '@riseback/network';
import { insideDiameterM, type PipeGeometry } from './pipe-geometry';
import type { ProblemError } from './refusal';

/** What a solve of the whole network cannot pass over, each with its place. */
export function mistakesIn(
  file: NetworkFile,
  ends: PipeEnds,
  geometries: readonly (PipeGeometry | undefined)[],
): ProblemError[] {
  const found = fileFindings(file, ends)
    .filter(({ severity }) => severity === 'error')
    .map(({ pointer, what, remedy }) => ({ pointer, detail: `${what}. ${remedy}` }));
  return [...found, ...impossiblePipes(file, geometries)];
}

/** By pipe: whether a live solve may count on it. What drains through other pipes alone is left out. */
export function soundPipes(file: NetworkFile, geometries: readonly (PipeGeometry | undefined)[]): boolean[] {
  const { pipes } = solvablePart(fromFile(file));
  return file.pipes.map(({ id }, i) => pipes.has(id) && geometries[i] !== undefined);
}

/** What keeps a pipe from being computed although it is drawn right. */
function impossiblePipes(file: NetworkFile, geometries: readonly (PipeGeometry | undefined)[]): ProblemError[] {
  const impossible: ProblemError[] = [];
  file.pipes.forEach((pipe, i) => {
    if (geometries[i] === undefined) impossible.push(impossiblePipe(pipe, i));
  });
  return impossible;
}

function impossiblePipe(pipe: PipeRun, index: number): ProblemError {
  const { size } = pipe;
  if (size !== undefined && insideDiameterM(pipe) === undefined) {
    const detail = `No standard in the pipe catalogue makes size ${size.nps} in schedule ${size.schedule}. Choose another, or give insideDiameterM.`;
    return { pointer: `/pipes/${index}/size`, detail };
  }
  const detail = `The roughness, ${pipe.roughnessM} m, fills the bore. New steel has 0.0000457 m.`;
  return { pointer: `/pipes/${index}/roughnessM`, detail };
}

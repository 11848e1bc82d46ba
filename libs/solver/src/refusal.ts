import type { NetworkFile } from '@riseback/network';
import type { ReturnTree } from './return-tree';
import type { SolveProblem } from './solve-result';

/** Nothing was computed: the file shows that it cannot be, or it asks for what is not computed yet. */
export interface Refusal {
  readonly refused: true;
  readonly problem: SolveProblem;
}

export type ProblemError = SolveProblem['errors'][number];

/** The file has mistakes that no computation can pass over. */
export function unsolvable(errors: readonly ProblemError[]): Refusal {
  return refusal('/problems/unsolvable-network', 'The network cannot be solved as it stands', errors);
}

/** The file asks for something by its right name that this state of the program does not compute. */
export function notAvailable(errors: readonly ProblemError[]): Refusal {
  return refusal('/problems/not-available', 'Not available yet', errors);
}

export function unknownCase(file: NetworkFile, caseId: string): Refusal {
  const known = file.cases.map(({ id }) => id).join(', ');
  const detail = `There is no case ${JSON.stringify(caseId)}; ${known === '' ? 'the file has none' : `there are ${known}`}.`;
  return refusal('/problems/unknown-case', 'No such case', [{ pointer: '/cases', detail }]);
}

/** Computing began and found that there is no solution. */
export function noSolution(element: string, pointer: string, reason: string): SolveProblem {
  return {
    type: '/problems/no-solution',
    title: 'The network has no solution',
    status: 422,
    detail: `At ${element}: ${reason}`,
    errors: [{ pointer, detail: reason }],
  };
}

/** Probable coincidence sums what comes from upstream, which a mesh has no one answer to. */
export function probableInMeshes(file: NetworkFile, tree: ReturnTree): ProblemError[] {
  if (file.method.coincidence !== 'probable' || tree.chords.length === 0) return [];
  const detail =
    'Probable coincidence needs one way down for every trap, and this network has loops or second ways down: choose average or ownPeak.';
  return [{ pointer: '/method/coincidence', detail }];
}

function refusal(type: string, title: string, errors: readonly ProblemError[]): Refusal {
  const details = errors.map(({ detail }) => detail);
  const more = details.length > 3 ? `; and ${details.length - 3} more` : '';
  return {
    refused: true,
    problem: { type, title, status: 400, detail: `${details.slice(0, 3).join('; ')}${more}`, errors },
  };
}

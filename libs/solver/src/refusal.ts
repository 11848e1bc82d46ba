import type { NetworkFile } from '@riseback/network';
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

/** What a solve of the network would need and is not computed yet, each by name. */
export function notAvailableYet(file: NetworkFile): ProblemError[] {
  const { coincidence } = file.method;
  return coincidence === 'average' ? [] : [missing('/method/coincidence', `coincidence ${coincidence}`)];
}

export function missing(pointer: string, what: string): ProblemError {
  return { pointer, detail: `${what} is not available yet` };
}

function refusal(type: string, title: string, errors: readonly ProblemError[]): Refusal {
  const details = errors.map(({ detail }) => detail);
  const more = details.length > 3 ? `; and ${details.length - 3} more` : '';
  return {
    refused: true,
    problem: { type, title, status: 400, detail: `${details.slice(0, 3).join('; ')}${more}`, errors },
  };
}

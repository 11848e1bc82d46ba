import type { CaseOutcome, Problem, SolveResult } from '@riseback/contracts';
import { isRefusal, solveNetwork, type SolveProblem } from '@riseback/solver';
import type { SolveJob } from './solve-port';

/** The solver answers read-only objects, the contract's are plain; nothing else may differ between the two. */
type ReadOnly<T> = T extends readonly (infer Item)[]
  ? readonly ReadOnly<Item>[]
  : T extends object
    ? { readonly [Key in keyof T]: ReadOnly<T[Key]> }
    : T;
type WithoutProblem = Omit<SolveResult, 'problem'>;

/** Solves each case of a job. A case that is refused stands beside those that are solved. */
export function solveCases({ file, caseIds, partial }: SolveJob): CaseOutcome[] {
  return caseIds.map((caseId) => {
    const solved = solveNetwork(file, { caseId, partial, bands: true });
    if (isRefusal(solved)) return { caseId, status: 'refused', problem: toProblem(solved.problem) };
    const { problem, ...rest } = solved;
    const result = rest satisfies ReadOnly<WithoutProblem> as WithoutProblem;
    return {
      caseId,
      status: 'solved',
      result: problem === undefined ? result : { ...result, problem: toProblem(problem) },
    };
  });
}

/** The cases of a network, or the plain network when it has none. */
export function caseIdsOf(file: { readonly cases: readonly { readonly id: string }[] }): string[] {
  return file.cases.length === 0 ? [''] : file.cases.map(({ id }) => id);
}

function toProblem(problem: SolveProblem): Problem {
  return { ...problem, errors: [...problem.errors] };
}

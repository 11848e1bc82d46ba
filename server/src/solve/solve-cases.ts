import type { CaseOutcome, Problem, SolveResult } from '@riseback/contracts';
import { bandsLeftOut, isRefusal, solveNetwork, type SolveProblem } from '@riseback/solver';
import type { SolveJob } from './solve-port';

/** The solver answers read-only objects, the contract's are plain; nothing else may differ between the two. */
type ReadOnly<T> = T extends readonly (infer Item)[]
  ? readonly ReadOnly<Item>[]
  : T extends object
    ? { readonly [Key in keyof T]: ReadOnly<T[Key]> }
    : T;
type WithoutProblem = Omit<SolveResult, 'problem'>;

/**
 * Pipes over all cases up to which both bands of every trap are computed: beyond, they would take the solve past its time. A pipe's bands
 * cost some 20 of its solves.
 */
const PIPES_WITH_BANDS = 8000;

/** Whether there is time for the bands of these cases while somebody waits. */
export function bandsInTime({ file, caseIds }: Pick<SolveJob, 'file' | 'caseIds'>): boolean {
  return file.pipes.length * caseIds.length <= PIPES_WITH_BANDS;
}

/** Solves each case of a job. A case that is refused stands beside those that are solved. */
export function solveCases(job: SolveJob): CaseOutcome[] {
  return job.caseIds.map((caseId) => solveCase(job, caseId));
}

export function solveCase({ file, partial, bands }: Omit<SolveJob, 'caseIds'>, caseId: string): CaseOutcome {
  const solved = solveNetwork(file, { caseId, partial, bands });
  if (isRefusal(solved)) return { caseId, status: 'refused', problem: toProblem(solved.problem) };
  const { problem, ...rest } = solved;
  const result = rest satisfies ReadOnly<WithoutProblem> as WithoutProblem;
  return {
    caseId,
    status: 'solved',
    result: problem === undefined ? result : { ...result, problem: toProblem(problem) },
  };
}

/** Outcomes whose bands will not come say so. */
export function withoutBands(outcomes: readonly CaseOutcome[]): CaseOutcome[] {
  const { text, remedy, ...warning } = bandsLeftOut();
  const told = { ...warning, text: [...text], ...(remedy === undefined ? {} : { remedy: [...remedy] }) };
  return outcomes.map((outcome) =>
    outcome.status === 'refused'
      ? outcome
      : { ...outcome, result: { ...outcome.result, warnings: [...outcome.result.warnings, told] } },
  );
}

/** The cases of a network, or the plain network when it has none. */
export function caseIdsOf(file: { readonly cases: readonly { readonly id: string }[] }): string[] {
  return file.cases.length === 0 ? [''] : file.cases.map(({ id }) => id);
}

function toProblem(problem: SolveProblem): Problem {
  return { ...problem, errors: [...problem.errors] };
}

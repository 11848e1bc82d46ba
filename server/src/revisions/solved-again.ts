import type { CaseOutcome, Verification } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';
import { compareResults } from '@riseback/revisions';
import { bandsInTime, withoutBands } from '../solve/solve-cases';
import type { SolvePort } from '../solve/solve-port';

type SolvedAgain = NonNullable<Verification['solvedAgain']>;

/** What was frozen, as far as it could be read. */
export interface FrozenSolve {
  readonly id: string;
  readonly file: NetworkFile;
  readonly outcomes: readonly CaseOutcome[];
  readonly engineVersion: string;
}

/**
 * Solves the frozen inputs by the present engine and says by how much it differs from what was frozen. This judges the engine, not the
 * revision: an engine may have become better since.
 * @returns undefined when the solve did not come to its end
 */
export async function solvedAgain(
  { id, file, outcomes, engineVersion }: FrozenSolve,
  present: { readonly solver: SolvePort; readonly engineVersion: string },
): Promise<SolvedAgain | undefined> {
  const cases = { file, caseIds: outcomes.map(({ caseId }) => caseId) };
  const bands = bandsInTime(cases);
  const ended = await present.solver.solve(`verification ${id}`, { ...cases, partial: true, bands });
  if (ended.end !== 'finished') return undefined;
  const now = bands ? ended.outcomes : withoutBands(ended.outcomes);
  return {
    engineVersion: present.engineVersion,
    sameEngine: present.engineVersion === engineVersion,
    ...differenceOf(outcomes, now),
  };
}

type Difference = Pick<SolvedAgain, 'largestDifferencePa' | 'trapId' | 'caseId' | 'verdictsChanged'>;

function differenceOf(frozen: readonly CaseOutcome[], now: readonly CaseOutcome[]): Difference {
  let largest: Difference = { largestDifferencePa: 0, verdictsChanged: 0 };
  let verdictsChanged = 0;
  for (const { caseId, traps, findings } of compareResults(frozen, now).cases) {
    verdictsChanged += findings.length;
    for (const { id, before, after, changePa } of traps) {
      // a trap that only one of the two has a result for is a verdict that is not there any more
      if (before?.verdict !== after?.verdict) verdictsChanged += 1;
      const size = Math.abs(changePa ?? 0);
      if (size > largest.largestDifferencePa) {
        largest = { largestDifferencePa: size, trapId: id, caseId, verdictsChanged: 0 };
      }
    }
  }
  return { ...largest, verdictsChanged };
}

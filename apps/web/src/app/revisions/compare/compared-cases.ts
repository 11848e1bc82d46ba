import type { NetworkFile } from '@riseback/network';
import type { CaseComparison, ResultComparison } from '@riseback/revisions';

/** Stands for the worst of all cases; no case's id begins so. */
export const WORST_OF_BOTH = '~worst';

export interface CaseOption {
  readonly id: string;
  readonly name: string;
}

export interface ComparedLabels {
  readonly before: string;
  readonly after: string;
}

/** What cases of either file are called. */
export function caseNames(before: NetworkFile, after: NetworkFile): (caseId: string) => string {
  const names = new Map([...before.cases, ...after.cases].map(({ id, name }) => [id, name]));
  return (caseId) => (caseId === '' ? 'As drawn' : (names.get(caseId) ?? caseId));
}

/** The cases to choose from; the worst of all where there are several. */
export function caseOptions({ cases }: ResultComparison, nameOf: (caseId: string) => string): CaseOption[] {
  const options = cases.map(({ caseId }) => ({ id: caseId, name: nameOf(caseId) }));
  return options.length > 1 ? [{ id: WORST_OF_BOTH, name: 'Worst of all cases' }, ...options] : options;
}

/** What must be known of cases to read the numbers: which are only in one of the two, and which have no solution. */
export function caseNotes(
  cases: readonly CaseComparison[],
  nameOf: (caseId: string) => string,
  labels: ComparedLabels,
): string[] {
  return cases.flatMap(({ caseId, in: there, unsolvedBefore, unsolvedAfter }) => {
    const name = nameOf(caseId);
    return [
      ...(there === 'both' ? [] : [`${name}: only in ${there === 'after' ? labels.after : labels.before}.`]),
      ...(unsolvedBefore === undefined ? [] : [`${name} has no result in ${labels.before}: ${unsolvedBefore}`]),
      ...(unsolvedAfter === undefined ? [] : [`${name} has no result in ${labels.after}: ${unsolvedAfter}`]),
    ];
  });
}

import type { CaseOutcome, Verdict } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';
import type { TrapVerdicts } from '@riseback/revisions';

/** What a person is told of results before they sign them. */
export interface OutcomeSummary {
  readonly verdicts: TrapVerdicts;
  /** Ids of the cases that were refused or have no solution. */
  readonly unsolvedCases: readonly string[];
  /** Elements in no result of any case, because they reach no receiver. */
  readonly leftOut: number;
}

export function summaryOf(outcomes: readonly CaseOutcome[]): OutcomeSummary {
  const worst = new Map<string, Verdict>();
  const leftOut = new Set<string>();
  const unsolvedCases: string[] = [];
  for (const outcome of outcomes) {
    if (outcome.status === 'refused' || !outcome.result.converged) {
      unsolvedCases.push(outcome.caseId);
      continue;
    }
    for (const id of outcome.result.leftOut ?? []) leftOut.add(id);
    for (const { id, checks } of outcome.result.traps) {
      for (const { verdict } of checks) worst.set(id, worseOf(worst.get(id), verdict));
      if (!worst.has(id)) worst.set(id, 'pass');
    }
  }
  const verdicts = [...worst.values()];
  return {
    verdicts: {
      traps: verdicts.length,
      fail: verdicts.filter((verdict) => verdict === 'fail').length,
      watch: verdicts.filter((verdict) => verdict === 'watch').length,
    },
    unsolvedCases,
    leftOut: leftOut.size,
  };
}

/** '' is the plain network of a file without cases. */
export function caseNameOf(file: Pick<NetworkFile, 'cases'>, caseId: string): string {
  if (caseId === '') return 'the network as drawn';
  return file.cases.find(({ id }) => id === caseId)?.name ?? caseId;
}

const RANK: Readonly<Record<Verdict, number>> = { pass: 0, watch: 1, fail: 2 };

function worseOf(a: Verdict | undefined, b: Verdict): Verdict {
  return a === undefined || RANK[b] > RANK[a] ? b : a;
}

import type { CaseOutcome, NetworkResults } from '@riseback/contracts';
import { jsonEqual } from '@riseback/network';

type Finished = Extract<NetworkResults, { state: 'finished' }>;

/**
 * New results in which whatever says the same as before is the very object that it was. An edit changes few elements' results, and what
 * is drawn of the others is then not drawn anew.
 */
export function withUnchangedKept(results: Finished, before: Finished | null): Finished {
  if (before === null) return results;
  const outcomes = new Map(before.cases.map((outcome) => [outcome.caseId, outcome]));
  return { ...results, cases: results.cases.map((outcome) => keptOutcome(outcome, outcomes.get(outcome.caseId))) };
}

function keptOutcome(now: CaseOutcome, before: CaseOutcome | undefined): CaseOutcome {
  if (now.status !== 'solved' || before?.status !== 'solved') return now;
  const [{ result }, { result: was }] = [now, before];
  return {
    ...now,
    result: {
      ...result,
      nodes: kept(result.nodes, was.nodes, ({ id }) => id),
      pipes: kept(result.pipes, was.pipes, ({ id }) => id),
      traps: kept(result.traps, was.traps, ({ id }) => id),
      warnings: kept(result.warnings, was.warnings, ({ code, element }) => `${code} ${element}`),
    },
  };
}

function kept<T>(now: readonly T[], before: readonly T[], keyOf: (item: T) => string): T[] {
  const known = new Map(before.map((item) => [keyOf(item), item]));
  return now.map((item) => {
    const was = known.get(keyOf(item));
    return was !== undefined && jsonEqual(was, item) ? was : item;
  });
}

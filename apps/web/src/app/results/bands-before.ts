import type { CaseOutcome, NetworkResults, TrapCheck, TrapResult } from '@riseback/contracts';

type Finished = Extract<NetworkResults, { state: 'finished' }>;

/** The checks at a trap that its bands may turn from pass to watch; see docs/methods/spread-and-credible-band.md. */
export const BANDED_CHECKS: ReadonlySet<string> = new Set([
  'differential',
  'capacity',
  'backPressureFraction',
  'stall',
]);

/**
 * Results whose bands are to come, with the bands of the whole solve before in their places, and its watches where a check passes so far:
 * the screen keeps still for the moment until the new ones are there. What is whole stays as it is.
 */
export function withBandsBefore(results: Finished, before: Finished | null): Finished {
  if (results.bandsToCome !== true || before === null) return results;
  const outcomes = new Map(before.cases.map((outcome) => [outcome.caseId, outcome]));
  return { ...results, cases: results.cases.map((outcome) => withBandsOf(outcome, outcomes.get(outcome.caseId))) };
}

function withBandsOf(outcome: CaseOutcome, before: CaseOutcome | undefined): CaseOutcome {
  if (outcome.status !== 'solved' || before?.status !== 'solved') return outcome;
  const traps = new Map(before.result.traps.map((trap) => [trap.id, trap]));
  return {
    ...outcome,
    result: { ...outcome.result, traps: outcome.result.traps.map((trap) => trapWithBandsOf(trap, traps.get(trap.id))) },
  };
}

function trapWithBandsOf(trap: TrapResult, before: TrapResult | undefined): TrapResult {
  if (before === undefined) return trap;
  const { spread, credible } = before;
  return {
    ...trap,
    ...(spread === undefined ? {} : { spread }),
    ...(credible === undefined ? {} : { credible }),
    checks: trap.checks.map((check) => watchOf(check, before.checks) ?? check),
  };
}

/** A watch of before in the place of a pass that may yet become one. */
function watchOf(check: TrapCheck, before: readonly TrapCheck[]): TrapCheck | undefined {
  if (check.verdict !== 'pass' || !BANDED_CHECKS.has(check.code)) return undefined;
  return before.find(({ code, verdict }) => code === check.code && verdict === 'watch');
}

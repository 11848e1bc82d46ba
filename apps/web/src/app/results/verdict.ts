import type { SolveResult, TrapCheck, Verdict } from '@riseback/contracts';

const ORDER: Readonly<Record<Verdict, number>> = { pass: 0, watch: 1, fail: 2 };

/** For comparing: the higher, the worse. What was not checked at all ranks under what passed. */
export function badness(verdict: Verdict | null): number {
  return verdict === null ? -1 : ORDER[verdict];
}

/** The worst of the checks; null when none was made. */
export function worstVerdict(checks: readonly Pick<TrapCheck, 'verdict'>[]): Verdict | null {
  return checks.reduce<Verdict | null>(
    (worst, { verdict }) => (worst === null || ORDER[verdict] > ORDER[worst] ? verdict : worst),
    null,
  );
}

export interface VerdictCounts {
  readonly traps: number;
  readonly fail: number;
  readonly watch: number;
}

/** How many traps fail and how many are to be watched. */
export function countVerdicts(result: SolveResult): VerdictCounts {
  const worst = result.traps.map(({ checks }) => worstVerdict(checks));
  return {
    traps: worst.length,
    fail: worst.filter((verdict) => verdict === 'fail').length,
    watch: worst.filter((verdict) => verdict === 'watch').length,
  };
}

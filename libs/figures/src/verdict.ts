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

/** Each trap's verdict: the worst of its checks and of what the solver found about it. Null where nothing was judged. */
export function trapVerdicts({
  traps,
  warnings,
}: Pick<SolveResult, 'traps' | 'warnings'>): ReadonlyMap<string, Verdict | null> {
  const verdicts = new Map(traps.map(({ id, checks }) => [id, worstVerdict(checks)]));
  for (const { element, verdict } of warnings) {
    const before = verdicts.get(element);
    if (before !== undefined && badness(verdict) > badness(before)) verdicts.set(element, verdict);
  }
  return verdicts;
}

/** How many traps fail and how many are to be watched. */
export function countVerdicts(result: Pick<SolveResult, 'traps' | 'warnings'>): VerdictCounts {
  const worst = [...trapVerdicts(result).values()];
  return {
    traps: worst.length,
    fail: worst.filter((verdict) => verdict === 'fail').length,
    watch: worst.filter((verdict) => verdict === 'watch').length,
  };
}

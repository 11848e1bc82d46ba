import type { TrapCheck, Verdict } from './results';

const RANK: Readonly<Record<Verdict, number>> = { pass: 0, watch: 1, fail: 2 };

/** For comparing: the higher, the worse. What was not checked at all ranks under what passed. */
export function badness(verdict: Verdict | null): number {
  return verdict === null ? -1 : RANK[verdict];
}

/** The worst of the checks; null when none was made. */
export function worstVerdict(checks: readonly Pick<TrapCheck, 'verdict'>[]): Verdict | null {
  return checks.reduce<Verdict | null>(
    (worst, { verdict }) => (worst === null || RANK[verdict] > RANK[worst] ? verdict : worst),
    null,
  );
}

/** What verdicts are read off: a result of the solver, or what crossed the wire of one. */
export interface JudgedResult {
  readonly traps: readonly { readonly id: string; readonly checks: readonly Pick<TrapCheck, 'verdict'>[] }[];
  readonly warnings: readonly { readonly element: string; readonly verdict: Exclude<Verdict, 'pass'> }[];
}

/** Each trap's verdict: the worst of its checks and of what the solver found about it. Null where nothing was judged. */
export function trapVerdicts({ traps, warnings }: JudgedResult): ReadonlyMap<string, Verdict | null> {
  const verdicts = new Map(traps.map(({ id, checks }) => [id, worstVerdict(checks)]));
  for (const { element, verdict } of warnings) {
    const before = verdicts.get(element);
    if (before !== undefined && badness(verdict) > badness(before)) verdicts.set(element, verdict);
  }
  return verdicts;
}

export interface VerdictCounts {
  readonly traps: number;
  readonly fail: number;
  readonly watch: number;
}

/** How many traps fail and how many are to be watched. */
export function countVerdicts(result: JudgedResult): VerdictCounts {
  const worst = [...trapVerdicts(result).values()];
  return {
    traps: worst.length,
    fail: worst.filter((verdict) => verdict === 'fail').length,
    watch: worst.filter((verdict) => verdict === 'watch').length,
  };
}

/** One element in one case, as it is weighed against the same in another. */
export interface CaseWeight {
  readonly badness: number;
  readonly pressurePa: number;
}

/** Of one element in two cases: the worse verdict counts first, then the higher pressure. */
export function isWorse(next: CaseWeight, than: CaseWeight): boolean {
  return next.badness === than.badness ? next.pressurePa > than.pressurePa : next.badness > than.badness;
}

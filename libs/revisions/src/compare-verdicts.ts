export type ComparedVerdict = 'pass' | 'watch' | 'fail';

const RANK: Readonly<Record<ComparedVerdict, number>> = { pass: 0, watch: 1, fail: 2 };

/** For comparing: the higher, the worse. What was not checked at all ranks under what passed. */
export function badness(verdict: ComparedVerdict | null): number {
  return verdict === null ? -1 : RANK[verdict];
}

/** The worst of the checks; null when none was made. */
export function worstVerdict(checks: readonly { readonly verdict: ComparedVerdict }[]): ComparedVerdict | null {
  return checks.reduce<ComparedVerdict | null>(
    (worst, { verdict }) => (worst === null || RANK[verdict] > RANK[worst] ? verdict : worst),
    null,
  );
}

/** What a verdict is made of: a result of the solver, or what crossed the wire of one. */
export interface JudgedResult {
  readonly traps: readonly { readonly id: string; readonly checks: readonly { readonly verdict: ComparedVerdict }[] }[];
  readonly warnings: readonly { readonly element: string; readonly verdict: 'watch' | 'fail' }[];
}

/** Each trap's verdict: the worst of its checks and of what the solver found about it. Null where nothing was judged. */
export function trapVerdicts({ traps, warnings }: JudgedResult): ReadonlyMap<string, ComparedVerdict | null> {
  const verdicts = new Map(traps.map(({ id, checks }) => [id, worstVerdict(checks)]));
  for (const { element, verdict } of warnings) {
    const before = verdicts.get(element);
    if (before !== undefined && badness(verdict) > badness(before)) verdicts.set(element, verdict);
  }
  return verdicts;
}

/** Of one trap in two cases: the worse verdict counts first, then the higher pressure. */
export function isWorse(
  next: { readonly badness: number; readonly pressurePa: number },
  than: { readonly badness: number; readonly pressurePa: number },
): boolean {
  return next.badness === than.badness ? next.pressurePa > than.pressurePa : next.badness > than.badness;
}

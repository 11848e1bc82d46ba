import type { TrapResult } from '@riseback/contracts';

type Verdict = TrapResult['checks'][number]['verdict'];

const RANK: Readonly<Record<Verdict, number>> = { pass: 0, watch: 1, fail: 2 };

/** The worst verdict of each trap that has any. */
export function verdictsOf(traps: Iterable<TrapResult>): Map<string, Verdict> {
  const verdicts = new Map<string, Verdict>();
  for (const { id, checks } of traps) {
    const worst = checks.map(({ verdict }) => verdict).reduce<Verdict | undefined>(worse, undefined);
    if (worst !== undefined) verdicts.set(id, worst);
  }
  return verdicts;
}

/** "Would turn 1 fail and 2 watch to pass, 1 pass to fail." */
export function turnWords(before: ReadonlyMap<string, Verdict>, after: ReadonlyMap<string, Verdict>): string {
  const turns = new Map<Verdict, Map<Verdict, number>>();
  for (const [id, from] of before) {
    const to = after.get(id);
    if (to === undefined || to === from) continue;
    const counts = turns.get(to) ?? new Map<Verdict, number>();
    turns.set(to, counts.set(from, (counts.get(from) ?? 0) + 1));
  }
  if (turns.size === 0) return 'Would turn no verdict.';
  const parts = (['pass', 'watch', 'fail'] as const).flatMap((to) => {
    const counts = turns.get(to);
    if (counts === undefined) return [];
    const from = [...counts]
      .sort(([a], [b]) => RANK[b] - RANK[a])
      .map(([verdict, count]) => `${String(count)} ${verdict}`);
    return [`${from.join(' and ')} to ${to}`];
  });
  return `Would turn ${parts.join(', ')}.`;
}

function worse(a: Verdict | undefined, b: Verdict): Verdict {
  return a === undefined || RANK[b] > RANK[a] ? b : a;
}

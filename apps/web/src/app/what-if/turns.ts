import type { Verdict } from '@riseback/contracts';
import { checkName } from '../results/finding-words';
import type { Status } from '../shared/status-mark/status-mark';

/** How many verdicts go from one to another, the largest steps first. */
export interface Turn {
  readonly from: Status;
  readonly to: Status;
  readonly count: number;
}

const RANK: Readonly<Record<Status, number>> = { none: -1, pass: 0, watch: 1, fail: 2 };
const WORDS: Readonly<Record<Status, string>> = { none: 'not checked', pass: 'pass', watch: 'watch', fail: 'fail' };

/** What was judged in both and is judged otherwise. */
export function turnsOf(
  traps: readonly { readonly before: Status; readonly after: Status; readonly turned: string }[],
): Turn[] {
  const turns = new Map<string, { from: Status; to: Status; count: number }>();
  for (const { before, after, turned } of traps) {
    if (turned !== 'better' && turned !== 'worse') continue;
    const turn = turns.get(`${before} ${after}`) ?? { from: before, to: after, count: 0 };
    turn.count += 1;
    turns.set(`${before} ${after}`, turn);
  }
  const size = ({ from, to }: Turn) => Math.abs(RANK[to] - RANK[from]);
  return [...turns.values()].sort(
    (a, b) => size(b) - size(a) || RANK[b.from] - RANK[a.from] || RANK[a.to] - RANK[b.to],
  );
}

/** "Better: 1 fail to pass, 2 watch to pass. Worse: 1 pass to watch." */
export function turnWords(turns: readonly Turn[]): string {
  if (turns.length === 0) return 'No verdict is turned.';
  const list = (some: readonly Turn[]) =>
    some.map(({ from, to, count }) => `${String(count)} ${WORDS[from]} to ${WORDS[to]}`).join(', ');
  const better = turns.filter(({ from, to }) => RANK[to] < RANK[from]);
  const worse = turns.filter(({ from, to }) => RANK[to] > RANK[from]);
  return [
    ...(better.length > 0 ? [`Better: ${list(better)}.`] : []),
    ...(worse.length > 0 ? [`Worse: ${list(worse)}.`] : []),
  ].join(' ');
}

interface TurnedFinding {
  readonly name: string;
  readonly code: string;
  readonly from: Verdict;
  readonly to: Verdict;
}

/** "Velocity at CR-20 (watch mended)", the first five by name. */
export function turnedFindingWords(findings: readonly TurnedFinding[]): string {
  return firstFive(
    findings.map(({ name, code, from, to }) => `${checkName(code)} at ${name} (${findingTurn(from, to)})`),
  );
}

export function firstFive(names: readonly string[]): string {
  return names.length > 5 ? `${names.slice(0, 5).join(', ')} and ${String(names.length - 5)} more` : names.join(', ');
}

/** "mended", "new: watch", "fail to watch" */
function findingTurn(from: Verdict, to: Verdict): string {
  if (to === 'pass') return `${from} mended`;
  return from === 'pass' ? `new: ${to}` : `${from} to ${to}`;
}

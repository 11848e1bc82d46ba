import type { SolveResult, Verdict } from '@riseback/contracts';
import { compareIds, inOrder, type NetworkDocument } from '@riseback/network';
import { badness, trapVerdicts } from '../results/verdict';
import { nameOf } from '../shared/element-words';
import type { Status } from '../shared/status-mark/status-mark';

/** What a trial does to one trap. Pressures are absolute, Pa; undefined where there is no result. */
export interface Effect {
  readonly id: string;
  readonly tag: string;
  readonly before: Status;
  readonly after: Status;
  readonly turned: 'better' | 'worse' | 'same';
  readonly beforePa: number | undefined;
  readonly afterPa: number | undefined;
  readonly changePa: number | undefined;
}

/** How many verdicts go from one to another, the largest steps first. */
export interface Turn {
  readonly from: Status;
  readonly to: Status;
  readonly count: number;
}

/** A finding at a pipe or vessel that is not the same in both results. */
export interface ChangedFinding {
  readonly element: string;
  readonly name: string;
  readonly code: string;
  /** What it was and is; the one or the other 'pass' where it is new or mended. */
  readonly from: Verdict;
  readonly to: Verdict;
}

export interface Effects {
  /** Turned verdicts first, then by how much the back pressure moves. */
  readonly traps: readonly Effect[];
  readonly turns: readonly Turn[];
  /** Mended or eased, and new or worse; the gravest first. */
  readonly eased: readonly ChangedFinding[];
  readonly worsened: readonly ChangedFinding[];
}

/** A change smaller than this is none: the march's own tolerance is 0.1 Pa a step. */
export const UNCHANGED_PA = 1;

/** What changes between two results of one network, trap by trap. */
export function effectsOf(document: NetworkDocument, before: SolveResult, after: SolveResult): Effects {
  const [verdictsBefore, verdictsAfter] = [trapVerdicts(before), trapVerdicts(after)];
  const [pressuresBefore, pressuresAfter] = [pressuresOf(before), pressuresOf(after)];
  const traps = inOrder(document.nodes).flatMap(([id, { value }]): Effect[] => {
    if (value.kind !== 'trap') return [];
    const [was, is] = [verdictsBefore.get(id) ?? null, verdictsAfter.get(id) ?? null];
    const [beforePa, afterPa] = [pressuresBefore.get(id), pressuresAfter.get(id)];
    const worse = badness(is) - badness(was);
    return [
      {
        id,
        tag: nameOf(value),
        before: was ?? 'none',
        after: is ?? 'none',
        turned: worse === 0 ? 'same' : worse > 0 ? 'worse' : 'better',
        beforePa,
        afterPa,
        changePa: beforePa === undefined || afterPa === undefined ? undefined : afterPa - beforePa,
      },
    ];
  });
  const findings = changedFindings(document, before, after);
  return {
    traps: traps.sort(byEffect),
    turns: turnsOf(traps),
    eased: findings.filter(({ from, to }) => RANK[to] < RANK[from]),
    worsened: findings.filter(({ from, to }) => RANK[to] > RANK[from]),
  };
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

const RANK: Readonly<Record<Status, number>> = { none: -1, pass: 0, watch: 1, fail: 2 };
const WORDS: Readonly<Record<Status, string>> = { none: 'not checked', pass: 'pass', watch: 'watch', fail: 'fail' };
const BY_TAG = new Intl.Collator('en', { numeric: true });

function byEffect(a: Effect, b: Effect): number {
  const step = ({ before, after }: Effect) => Math.abs(RANK[after] - RANK[before]);
  const moved = ({ changePa }: Effect) => {
    const size = Math.abs(changePa ?? 0);
    return size < UNCHANGED_PA ? 0 : size;
  };
  return step(b) - step(a) || moved(b) - moved(a) || BY_TAG.compare(a.tag, b.tag) || compareIds(a.id, b.id);
}

function turnsOf(traps: readonly Effect[]): Turn[] {
  const turns = new Map<string, { from: Status; to: Status; count: number }>();
  for (const { before, after, turned } of traps) {
    if (turned === 'same') continue;
    const turn = turns.get(`${before} ${after}`) ?? { from: before, to: after, count: 0 };
    turn.count += 1;
    turns.set(`${before} ${after}`, turn);
  }
  const size = ({ from, to }: Turn) => Math.abs(RANK[to] - RANK[from]);
  return [...turns.values()].sort(
    (a, b) => size(b) - size(a) || RANK[b.from] - RANK[a.from] || RANK[a.to] - RANK[b.to],
  );
}

/** Findings at traps show in their verdicts; these are the others. */
function changedFindings(document: NetworkDocument, before: SolveResult, after: SolveResult): ChangedFinding[] {
  const [was, is] = [worstFindings(before), worstFindings(after)];
  const found = [...new Set([...was.keys(), ...is.keys()])].flatMap((key): ChangedFinding[] => {
    const finding = is.get(key) ?? was.get(key);
    const from: Verdict = was.get(key)?.verdict ?? 'pass';
    const to: Verdict = is.get(key)?.verdict ?? 'pass';
    if (finding === undefined || from === to) return [];
    const { element, code } = finding;
    const node = document.nodes.get(element)?.value;
    if (node?.kind === 'trap') return [];
    const value = node ?? document.pipes.get(element)?.value;
    return [{ element, name: value === undefined ? element : nameOf(value), code, from, to }];
  });
  const gravest = ({ from, to }: ChangedFinding) => Math.max(RANK[from], RANK[to]);
  return found.sort((a, b) => gravest(b) - gravest(a) || BY_TAG.compare(a.name, b.name));
}

/** By element and code, the worst of each. */
function worstFindings({ warnings }: SolveResult): Map<string, SolveResult['warnings'][number]> {
  const worst = new Map<string, SolveResult['warnings'][number]>();
  for (const warning of warnings) {
    const key = `${warning.element}/${warning.code}`;
    const known = worst.get(key);
    if (known === undefined || RANK[warning.verdict] > RANK[known.verdict]) worst.set(key, warning);
  }
  return worst;
}

function pressuresOf({ traps }: SolveResult): Map<string, number> {
  return new Map(traps.map(({ id, backPressurePa }) => [id, backPressurePa]));
}

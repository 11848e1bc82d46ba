import { badness, type SolveResult, type Verdict } from '@riseback/contracts';
import { compareIds, inOrder, type NetworkDocument } from '@riseback/network';
import { byEffect, byGravity, compareSolves, type TrapComparison } from '@riseback/revisions';
import { nameOf } from '../shared/element-words';
import type { Status } from '../shared/status-mark/status-mark';
import { type Turn, turnsOf } from './turns';

/** What a trial does to one trap. Pressures are absolute, Pa; undefined where there is no result. */
export interface Effect {
  readonly id: string;
  readonly tag: string;
  readonly before: Status;
  readonly after: Status;
  readonly turned: TrapComparison['turned'];
  readonly beforePa: number | undefined;
  readonly afterPa: number | undefined;
  readonly changePa: number | undefined;
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

/** What changes between two results of one network, trap by trap; a trap without any result stands last. */
export function effectsOf(document: NetworkDocument, before: SolveResult, after: SolveResult): Effects {
  const compared = compareSolves(before, after);
  const known = new Map(compared.traps.map((trap) => [trap.id, trap]));
  const tags = new Map(
    inOrder(document.nodes).flatMap(([id, { value }]) => (value.kind === 'trap' ? [[id, nameOf(value)]] : [])),
  );
  const traps = Array.from(tags.keys(), (id) => known.get(id) ?? unsolved(id))
    .sort((a, b) => byEffect(a, b) || byTag(tags.get(a.id), tags.get(b.id)) || compareIds(a.id, b.id))
    .map((trap) => effectOf(trap, tags.get(trap.id) ?? trap.id));
  const findings = compared.findings
    .filter(({ element }) => !tags.has(element))
    .map((finding) => ({ ...finding, name: nameIn(document, finding.element) }))
    .sort((a, b) => byGravity(a, b) || byTag(a.name, b.name));
  return {
    traps,
    turns: turnsOf(traps),
    eased: findings.filter(({ from, to }) => badness(to) < badness(from)),
    worsened: findings.filter(({ from, to }) => badness(to) > badness(from)),
  };
}

const BY_TAG = new Intl.Collator('en', { numeric: true });

function byTag(a = '', b = ''): number {
  return BY_TAG.compare(a, b);
}

function effectOf({ id, before, after, changePa, turned }: TrapComparison, tag: string): Effect {
  return {
    id,
    tag,
    before: before?.verdict ?? 'none',
    after: after?.verdict ?? 'none',
    turned,
    beforePa: before?.backPressurePa,
    afterPa: after?.backPressurePa,
    changePa,
  };
}

function unsolved(id: string): TrapComparison {
  return { id, before: undefined, after: undefined, changePa: undefined, turned: 'same' };
}

function nameIn(document: NetworkDocument, id: string): string {
  const value = document.nodes.get(id)?.value ?? document.pipes.get(id)?.value;
  return value === undefined ? id : nameOf(value);
}

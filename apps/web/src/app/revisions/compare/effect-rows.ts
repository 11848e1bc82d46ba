import type { CommentSubject } from '@riseback/contracts';
import type { NetworkFile, Trap } from '@riseback/network';
import { byEffect, hasMoved, type ResultEffects, type TrapComparison, type TrapState } from '@riseback/revisions';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { changeWords } from '../../results/pressure-change';
import { nameOf } from '../../shared/element-words';
import type { Status } from '../../shared/status-mark/status-mark';
import { compareTags } from './tag-runs';
import { ABSENT } from './value-words';

/** What of a trap is held against each other. */
export type ComparedQuantity = 'backPressurePa' | 'differentialPa';

/** What a comparison did to one trap, in words and marks. */
export interface EffectRow {
  readonly id: string;
  readonly tag: string;
  readonly place: string;
  readonly beforeSi: number | undefined;
  readonly afterSi: number | undefined;
  readonly before: string;
  readonly after: string;
  readonly change: string;
  readonly from: Status;
  readonly to: Status;
  /** What stands in the place of a verdict where there is no result; '' where there is one. */
  readonly fromWord: string;
  readonly toWord: string;
  readonly turned: TrapComparison['turned'];
  readonly moved: boolean;
  /** Cases that the two were taken from, where those are not chosen: the trap's worst. */
  readonly cases: string;
  readonly subject: CommentSubject;
  /** Numbers of the open comments on it. */
  readonly comments: readonly number[];
}

export interface EffectContext {
  readonly before: NetworkFile;
  readonly after: NetworkFile;
  readonly quantity: ComparedQuantity;
  readonly units: DisplayUnits;
  readonly commentsOf: ReadonlyMap<string, readonly number[]>;
  /** '' while the worst of all cases is shown. */
  readonly caseId: string | null;
  readonly caseName: (caseId: string) => string;
}

/** Every trap that either of the two has, the largest effect first. */
export function effectRows({ traps }: ResultEffects, context: EffectContext): EffectRow[] {
  const [earlier, later] = [trapsIn(context.before), trapsIn(context.after)];
  const compared = new Map(traps.map((trap) => [trap.id, trap]));
  const tagOf = (id: string) => nameOf(later.get(id) ?? earlier.get(id) ?? { id });
  return [...new Set([...later.keys(), ...earlier.keys()])]
    .map((id) => compared.get(id) ?? withoutResults(id))
    .sort((a, b) => byEffect(a, b) || compareTags(tagOf(a.id), tagOf(b.id)))
    .map((trap) => rowOf(trap, earlier.get(trap.id), later.get(trap.id), context));
}

/** "Result only in C: 2 traps, 1 failing. Result only in B: 1 trap." Traps with a result in one of the two alone turn no verdict. */
export function oneSidedWords(rows: readonly EffectRow[], labels: { before: string; after: string }): string {
  const come = rows.filter(({ beforeSi, afterSi }) => beforeSi === undefined && afterSi !== undefined);
  const gone = rows.filter(({ beforeSi, afterSi }) => beforeSi !== undefined && afterSi === undefined);
  const traps = (count: number) => `${String(count)} ${count === 1 ? 'trap' : 'traps'}`;
  const failing = come.filter(({ to }) => to === 'fail').length;
  return [
    ...(come.length > 0
      ? [`Result only in ${labels.after}: ${traps(come.length)}${failing > 0 ? `, ${String(failing)} failing` : ''}.`]
      : []),
    ...(gone.length > 0 ? [`Result only in ${labels.before}: ${traps(gone.length)}.`] : []),
  ].join(' ');
}

/** The kind of quantity that a column of pressures is printed as. */
export function kindOf(quantity: ComparedQuantity): QuantityKind {
  return quantity === 'backPressurePa' ? 'pressure' : 'pressureDifference';
}

function rowOf(
  trap: TrapComparison,
  earlier: Trap | undefined,
  later: Trap | undefined,
  { quantity, units, commentsOf, caseId, caseName }: EffectContext,
): EffectRow {
  const { id, before, after } = trap;
  const [beforeSi, afterSi] = [before?.[quantity], after?.[quantity]];
  const print = (si: number | undefined) =>
    si === undefined ? ABSENT : formatQuantity(si, kindOf(quantity), units, { decimals: 1 });
  const element = later ?? earlier;
  return {
    id,
    tag: nameOf(element ?? { id }),
    place: element?.area ?? '',
    beforeSi,
    afterSi,
    before: print(beforeSi),
    after: print(afterSi),
    change: changeWords(beforeSi === undefined || afterSi === undefined ? undefined : afterSi - beforeSi, units, 1),
    from: before?.verdict ?? 'none',
    to: after?.verdict ?? 'none',
    fromWord: wordWithout(before, earlier, 'Not there'),
    toWord: wordWithout(after, later, 'Removed'),
    turned: trap.turned,
    moved: hasMoved(trap),
    cases: caseId === null ? caseWords(before, after, caseName) : '',
    subject: { kind: 'result', elementId: id, ...(caseId === null || caseId === '' ? {} : { caseId }) },
    comments: commentsOf.get(id) ?? [],
  };
}

/** The case that governs, or both where another one does than did. */
function caseWords(
  before: TrapState | undefined,
  after: TrapState | undefined,
  caseName: (caseId: string) => string,
): string {
  const names = [before, after].flatMap((state) => (state === undefined ? [] : [caseName(state.caseId)]));
  return [...new Set(names)].filter((name) => name !== '').join(', then ');
}

function wordWithout(state: TrapState | undefined, trap: Trap | undefined, absent: string): string {
  if (state !== undefined) return '';
  return trap === undefined ? absent : 'No result';
}

function withoutResults(id: string): TrapComparison {
  return { id, before: undefined, after: undefined, changePa: undefined, turned: 'same' };
}

function trapsIn({ nodes }: NetworkFile): ReadonlyMap<string, Trap> {
  return new Map(nodes.flatMap((node) => (node.kind === 'trap' ? [[node.id, node]] : [])));
}

import { badness, type CaseWeight, isWorse, type JudgedResult, trapVerdicts, type Verdict } from '@riseback/contracts';
import { compareIds } from '@riseback/network';

/** What a comparison reads of a result: the solver's own, or one that crossed the wire. Pressures are absolute, Pa. */
export interface ComparedResult {
  readonly converged: boolean;
  readonly traps: readonly (JudgedResult['traps'][number] & {
    readonly backPressurePa: number;
    readonly differentialPa: number;
  })[];
  readonly warnings: readonly (JudgedResult['warnings'][number] & { readonly code: string })[];
  readonly problem?: { readonly detail?: string | undefined } | undefined;
}

export type ComparedOutcome = { readonly caseId: string } & (
  | { readonly status: 'solved'; readonly result: ComparedResult }
  | { readonly status: 'refused'; readonly problem: { readonly detail?: string | undefined } }
);

/** A trap in one of the two. */
export interface TrapState {
  /** The case it was taken from; of the worst of all cases, the one that is the trap's worst. */
  readonly caseId: string;
  readonly backPressurePa: number;
  readonly differentialPa: number;
  /** Null where nothing was judged. */
  readonly verdict: Verdict | null;
}

export interface TrapComparison {
  readonly id: string;
  /** Undefined where it has no result: it is not there, or nothing could be computed. */
  readonly before: TrapState | undefined;
  readonly after: TrapState | undefined;
  readonly changePa: number | undefined;
  /** `apart`: not judged in both, so that nothing can be said to be better or worse. */
  readonly turned: 'better' | 'worse' | 'same' | 'apart';
}

/** What the solver found at a pipe, a vessel or the whole, and does not find alike in both; `pass` where it finds nothing. */
export interface FindingComparison {
  readonly element: string;
  readonly code: string;
  readonly from: Verdict;
  readonly to: Verdict;
}

export interface ResultEffects {
  /** The largest effect first (`byEffect`), then by id. */
  readonly traps: readonly TrapComparison[];
  /** The gravest first. Findings at traps are in their verdicts. */
  readonly findings: readonly FindingComparison[];
}

export interface CaseComparison extends ResultEffects {
  /** '' is the plain network. */
  readonly caseId: string;
  /** Which of the two have this case. */
  readonly in: 'both' | 'before' | 'after';
  /** Why there are no pressures; undefined where there are, or no such case. */
  readonly unsolvedBefore: string | undefined;
  readonly unsolvedAfter: string | undefined;
}

export interface ResultComparison {
  /** In the later order, and those that are there no more behind. */
  readonly cases: readonly CaseComparison[];
  /** Each trap in its worst case before beside its worst case after; cases without a solution are left out of it. */
  readonly worst: ResultEffects;
}

/** A change of pressure smaller than this is none: the march's own tolerance is 0.1 Pa a step. */
export const UNCHANGED_PA = 1;

/** 0.1 psi: from here on a trap counts as moved, in whatever units it is shown, so that everybody counts the same. */
export const MOVED_PA = 689.475_729;

/** What became of the results of a network, case by case and trap by trap. */
export function compareResults(
  before: readonly ComparedOutcome[],
  after: readonly ComparedOutcome[],
): ResultComparison {
  const [earlier, later] = [byCase(before), byCase(after)];
  const cases = [...new Set([...later.keys(), ...earlier.keys()])].map((caseId): CaseComparison => {
    const [was, is] = [earlier.get(caseId), later.get(caseId)];
    return {
      caseId,
      in: was === undefined ? 'after' : is === undefined ? 'before' : 'both',
      unsolvedBefore: whyUnsolved(was),
      unsolvedAfter: whyUnsolved(is),
      ...compareSolved(was === undefined ? [] : [was], is === undefined ? [] : [is]),
    };
  });
  return { cases, worst: compareSolved(before, after) };
}

/** Two results of one case. */
export function compareSolves(before: ComparedResult, after: ComparedResult): ResultEffects {
  const outcome = (result: ComparedResult): ComparedOutcome => ({ caseId: '', status: 'solved', result });
  return compareSolved([outcome(before)], [outcome(after)]);
}

/** Turned verdicts first, then by how much the back pressure moves; 0 where both count alike. */
export function byEffect(a: TrapComparison, b: TrapComparison): number {
  return stepOf(b) - stepOf(a) || moveOf(b) - moveOf(a);
}

/** What fails in one of the two first, and of those the larger step; 0 where both count alike. */
export function byGravity(a: FindingComparison, b: FindingComparison): number {
  const gravest = ({ from, to }: FindingComparison) => Math.max(badness(from), badness(to));
  const step = ({ from, to }: FindingComparison) => Math.abs(badness(to) - badness(from));
  return gravest(b) - gravest(a) || step(b) - step(a);
}

/** Whether there is something to see: a verdict turned, a pressure moved by `MOVED_PA`, a result where the other has none. */
export function hasMoved({ before, after, changePa }: TrapComparison): boolean {
  if (before === undefined || after === undefined) return before !== after;
  return before.verdict !== after.verdict || Math.abs(changePa ?? 0) >= MOVED_PA;
}

function compareSolved(before: readonly ComparedOutcome[], after: readonly ComparedOutcome[]): ResultEffects {
  const [earlier, later] = [worstStates(before), worstStates(after)];
  const ids = [...new Set([...later.keys(), ...earlier.keys()])];
  const traps = ids.map((id): TrapComparison => {
    const [was, is] = [earlier.get(id), later.get(id)];
    return {
      id,
      before: was,
      after: is,
      changePa: was === undefined || is === undefined ? undefined : is.backPressurePa - was.backPressurePa,
      turned: turnOf(was?.verdict ?? null, is?.verdict ?? null),
    };
  });
  return {
    traps: traps.sort((a, b) => byEffect(a, b) || compareIds(a.id, b.id)),
    findings: compareFindings(before, after, new Set(ids)),
  };
}

function turnOf(from: Verdict | null, to: Verdict | null): TrapComparison['turned'] {
  if (from === to) return 'same';
  if (from === null || to === null) return 'apart';
  return badness(to) > badness(from) ? 'worse' : 'better';
}

function stepOf({ before, after }: TrapComparison): number {
  return Math.abs(badness(after?.verdict ?? null) - badness(before?.verdict ?? null));
}

function moveOf({ changePa }: TrapComparison): number {
  const size = Math.abs(changePa ?? 0);
  return size < UNCHANGED_PA ? 0 : size;
}

/** Each trap as it is in its worst case; in case of a tie the first one. */
function worstStates(outcomes: readonly ComparedOutcome[]): Map<string, TrapState> {
  const worst = new Map<string, TrapState>();
  for (const { caseId, result } of solved(outcomes)) {
    const verdicts = trapVerdicts(result);
    for (const { id, backPressurePa, differentialPa } of result.traps) {
      const next = { caseId, backPressurePa, differentialPa, verdict: verdicts.get(id) ?? null };
      const known = worst.get(id);
      if (known === undefined || isWorse(weightOf(next), weightOf(known))) worst.set(id, next);
    }
  }
  return worst;
}

function weightOf({ verdict, backPressurePa }: TrapState): CaseWeight {
  return { badness: badness(verdict), pressurePa: backPressurePa };
}

function compareFindings(
  before: readonly ComparedOutcome[],
  after: readonly ComparedOutcome[],
  traps: ReadonlySet<string>,
): FindingComparison[] {
  const [earlier, later] = [worstFindings(before), worstFindings(after)];
  const found = [...new Set([...later.keys(), ...earlier.keys()])].flatMap((key): FindingComparison[] => {
    const [was, is] = [earlier.get(key), later.get(key)];
    const finding = is ?? was;
    const from: Verdict = was?.verdict ?? 'pass';
    const to: Verdict = is?.verdict ?? 'pass';
    if (finding === undefined || traps.has(finding.element) || from === to) return [];
    return [{ element: finding.element, code: finding.code, from, to }];
  });
  return found.sort((a, b) => byGravity(a, b) || compareIds(a.element, b.element) || compareIds(a.code, b.code));
}

/** By element and code, the worst of each. */
function worstFindings(outcomes: readonly ComparedOutcome[]): Map<string, ComparedResult['warnings'][number]> {
  const worst = new Map<string, ComparedResult['warnings'][number]>();
  for (const warning of solved(outcomes).flatMap(({ result }) => result.warnings)) {
    const key = `${warning.element}/${warning.code}`;
    const known = worst.get(key);
    if (known === undefined || badness(warning.verdict) > badness(known.verdict)) worst.set(key, warning);
  }
  return worst;
}

function solved(outcomes: readonly ComparedOutcome[]): { caseId: string; result: ComparedResult }[] {
  return outcomes.flatMap((outcome) =>
    outcome.status === 'solved' && outcome.result.converged ? [{ caseId: outcome.caseId, result: outcome.result }] : [],
  );
}

function whyUnsolved(outcome: ComparedOutcome | undefined): string | undefined {
  if (outcome === undefined || (outcome.status === 'solved' && outcome.result.converged)) return undefined;
  const problem = outcome.status === 'refused' ? outcome.problem : outcome.result.problem;
  return problem?.detail ?? 'No solution was found.';
}

function byCase(outcomes: readonly ComparedOutcome[]): ReadonlyMap<string, ComparedOutcome> {
  return new Map(outcomes.map((outcome) => [outcome.caseId, outcome]));
}

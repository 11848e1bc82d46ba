import type { CaseOutcome, Verdict } from '@riseback/contracts';
import { inOrder, type NetworkDocument, type OperatingCase } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { badness, countVerdicts, trapVerdicts, type VerdictCounts } from '../results/verdict';
import type { WorstOfCases } from '@riseback/figures';
import { nameOf } from '../shared/element-words';
import type { Status } from '../shared/status-mark/status-mark';
import { caseChangeWords } from './case-changes';

export interface CaseHead {
  readonly id: string;
  readonly name: string;
  readonly load: string;
  /** Null while there is no result. */
  readonly counts: VerdictCounts | null;
  /** Why the case has no result; '' when it has one or is being solved. */
  readonly refusal: string;
}

export interface ComparedCell {
  readonly caseId: string;
  readonly caseName: string;
  readonly status: Status;
  /** Printed in the person's unit; '' without a result. */
  readonly backPressure: string;
  /** What the case sets at this trap, in words. */
  readonly changes: string;
}

export interface ComparedTrap {
  readonly id: string;
  readonly tag: string;
  readonly cells: readonly ComparedCell[];
  /** Null where no case has a result for it. */
  readonly worst: (ComparedCell & { readonly badness: number; readonly pressurePa: number }) | null;
}

export interface Comparison {
  readonly heads: readonly CaseHead[];
  readonly traps: readonly ComparedTrap[];
}

/** Traps over cases: what stands behind each trap in every case, and the worst of them. */
export function compareCases(
  document: NetworkDocument,
  cases: readonly OperatingCase[],
  outcomes: ReadonlyMap<string, CaseOutcome>,
  worst: WorstOfCases | null,
  units: DisplayUnits,
): Comparison {
  const judged = new Map(cases.map(({ id }) => [id, judgedTraps(outcomes.get(id))]));
  const cellOf = (trapId: string, { id, name }: OperatingCase): ComparedCell => {
    const trap = judged.get(id)?.get(trapId);
    return {
      caseId: id,
      caseName: name,
      status: trap?.verdict ?? 'none',
      backPressure: trap === undefined ? '' : formatQuantity(trap.pressurePa, 'pressure', units),
      changes: caseChangeWords(document, id, trapId, units).join(', '),
    };
  };
  const worstOf = (trapId: string): ComparedTrap['worst'] => {
    const worstCase = cases.find(({ id }) => id === worst?.caseOf.get(trapId));
    const trap = worstCase === undefined ? undefined : judged.get(worstCase.id)?.get(trapId);
    if (worstCase === undefined || trap === undefined) return null;
    return { ...cellOf(trapId, worstCase), badness: badness(trap.verdict), pressurePa: trap.pressurePa };
  };
  return {
    heads: cases.map((operatingCase) => headOf(operatingCase, outcomes.get(operatingCase.id), units)),
    traps: inOrder(document.nodes).flatMap(([id, { value: node }]) => {
      if (node.kind !== 'trap') return [];
      const cells = cases.map((operatingCase) => cellOf(id, operatingCase));
      return [{ id, tag: nameOf(node), cells, worst: worstOf(id) }];
    }),
  };
}

export type ComparisonOrder = 'tag' | 'worst';

/** By tag as a person counts, or the worst first: by verdict, then by back pressure. Traps without any result come last. */
export function ordered(traps: readonly ComparedTrap[], order: ComparisonOrder): ComparedTrap[] {
  return [...traps].sort((a, b) => (order === 'worst' ? byWorst(a, b) : 0) || BY_TAG.compare(a.tag, b.tag));
}

const BY_TAG = new Intl.Collator('en', { numeric: true });

function byWorst({ worst: a }: ComparedTrap, { worst: b }: ComparedTrap): number {
  if (a === null || b === null) return Number(a === null) - Number(b === null);
  return b.badness - a.badness || b.pressurePa - a.pressurePa;
}

function headOf(
  { id, name, loadFactor }: OperatingCase,
  outcome: CaseOutcome | undefined,
  units: DisplayUnits,
): CaseHead {
  return {
    id,
    name,
    load: formatQuantity(loadFactor, 'fraction', units, { withUnit: true }),
    counts: outcome?.status === 'solved' && outcome.result.converged ? countVerdicts(outcome.result) : null,
    refusal: refusalOf(outcome),
  };
}

/** Why a case has no result; '' when it has one, or none yet. */
export function refusalOf(outcome: CaseOutcome | undefined): string {
  if (outcome === undefined) return '';
  if (outcome.status === 'refused') return outcome.problem.detail ?? outcome.problem.title;
  if (outcome.result.converged) return '';
  return outcome.result.problem?.detail ?? 'The network has no solution in this case.';
}

interface JudgedTrap {
  readonly verdict: Verdict | null;
  readonly pressurePa: number;
}

function judgedTraps(outcome: CaseOutcome | undefined): ReadonlyMap<string, JudgedTrap> {
  if (outcome?.status !== 'solved' || !outcome.result.converged) return new Map();
  const verdicts = trapVerdicts(outcome.result);
  return new Map(
    outcome.result.traps.map(({ id, backPressurePa }) => [
      id,
      { verdict: verdicts.get(id) ?? null, pressurePa: backPressurePa },
    ]),
  );
}

import type { CaseOutcome, TrapResult } from '@riseback/contracts';
import { inOrder, type NetworkDocument, type OperatingCase } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { badness, countVerdicts, type VerdictCounts, worstVerdict } from '../results/verdict';
import type { WorstOfCases } from '../results/worst-of-cases';
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
  const results = new Map(cases.map(({ id }) => [id, trapResults(outcomes.get(id))]));
  const cellOf = (trapId: string, { id, name }: OperatingCase): ComparedCell => {
    const trap = results.get(id)?.get(trapId);
    return {
      caseId: id,
      caseName: name,
      status: statusOf(trap),
      backPressure: trap === undefined ? '' : formatQuantity(trap.backPressurePa, 'pressure', units),
      changes: caseChangeWords(document, id, trapId, units).join(', '),
    };
  };
  return {
    heads: cases.map((operatingCase) => headOf(operatingCase, outcomes.get(operatingCase.id), units)),
    traps: inOrder(document.nodes).flatMap(([id, { value: node }]) => {
      if (node.kind !== 'trap') return [];
      const worstCase = cases.find((operatingCase) => operatingCase.id === worst?.caseOf.get(id));
      const trap = worstCase === undefined ? undefined : results.get(worstCase.id)?.get(id);
      return [
        {
          id,
          tag: nameOf(node),
          cells: cases.map((operatingCase) => cellOf(id, operatingCase)),
          worst:
            worstCase === undefined || trap === undefined
              ? null
              : {
                  ...cellOf(id, worstCase),
                  badness: badness(worstVerdict(trap.checks)),
                  pressurePa: trap.backPressurePa,
                },
        },
      ];
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

function trapResults(outcome: CaseOutcome | undefined): ReadonlyMap<string, TrapResult> {
  const traps = outcome?.status === 'solved' && outcome.result.converged ? outcome.result.traps : [];
  return new Map(traps.map((trap) => [trap.id, trap]));
}

function statusOf(trap: TrapResult | undefined): Status {
  return trap === undefined ? 'none' : (worstVerdict(trap.checks) ?? 'none');
}

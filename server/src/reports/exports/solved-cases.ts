import type { CaseOutcome, NodeResult, PipeResult, SolveResult, TrapResult } from '@riseback/contracts';
import { byElement, drawnFindings, type ElementFinding, solvedFindings } from './element-findings';
import { caseNameOf, type TableSource } from './table-source';

/** One case with its results by element. */
export interface SolvedCase {
  readonly caseId: string;
  readonly name: string;
  /** Undefined where the case was refused or has no solution. */
  readonly result: SolveResult | undefined;
  readonly traps: ReadonlyMap<string, TrapResult>;
  readonly pipes: ReadonlyMap<string, PipeResult>;
  readonly nodes: ReadonlyMap<string, NodeResult>;
  readonly findings: ReadonlyMap<string, readonly ElementFinding[]>;
  /** Why an element has no numbers; 'Solved' where it has. */
  readonly stateOf: (elementId: string) => string;
}

export function solvedCases(source: TableSource): SolvedCase[] {
  const drawn = drawnFindings(source.topology, source.units);
  return source.outcomes.map((outcome) => solvedCase(source, outcome, drawn));
}

/** Why a case has no results, in words; undefined where it has. */
export function unsolvedWords(outcome: CaseOutcome): string | undefined {
  if (outcome.status === 'refused') return `Case not solved: ${outcome.problem.detail ?? outcome.problem.title}`;
  const { converged, problem } = outcome.result;
  return converged ? undefined : `No solution: ${problem?.detail ?? problem?.title ?? 'the solve did not converge'}`;
}

function solvedCase(source: TableSource, outcome: CaseOutcome, drawn: readonly ElementFinding[]): SolvedCase {
  const { caseId } = outcome;
  const whole = outcome.status === 'solved' ? outcome.result : undefined;
  const result = whole?.converged === true ? whole : undefined;
  const leftOut = new Set(result?.leftOut);
  const unsolved = outcome.status === 'refused' ? 'Case not solved' : 'No solution';
  return {
    caseId,
    name: caseNameOf(source, caseId),
    result,
    traps: byId(result?.traps),
    pipes: byId(result?.pipes),
    nodes: byId(result?.nodes),
    findings: byElement([...drawn, ...(result === undefined ? [] : solvedFindings(result, source.units))]),
    stateOf: (elementId) => (result === undefined ? unsolved : leftOut.has(elementId) ? 'Left out' : 'Solved'),
  };
}

function byId<T extends { readonly id: string }>(items: readonly T[] = []): ReadonlyMap<string, T> {
  return new Map(items.map((item) => [item.id, item]));
}

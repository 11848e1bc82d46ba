import {
  badness,
  type CaseOutcome,
  type CaseWeight,
  isWorse,
  type NodeResult,
  type PipeResult,
  type SolveResult,
  type SolveWarning,
  type TrapResult,
  trapVerdicts,
  worstVerdict,
} from '@riseback/contracts';

/** What the worst of all cases is called where a case's id stands, in addresses as in results. */
export const WORST_OF_ALL = 'worst';

export interface WorstOfCases {
  /**
   * Each element with its result of its own worst case. A picture of the whole, not an account: numbers of neighbours may come from
   * different cases and need not add up along a way.
   */
  readonly result: SolveResult;
  /** The case that each node's and pipe's result was taken from, by the element's id. */
  readonly caseOf: ReadonlyMap<string, string>;
  /** Cases that gave no result, so that nothing is known of them. */
  readonly unanswered: readonly string[];
}

/** One element in one case. */
interface Candidate<T> extends CaseWeight {
  readonly caseId: string;
  readonly value: T;
}

/**
 * Joins the cases into the worst per element: the worst verdict counts first, then the highest pressure, then the order of the cases.
 * A trap goes by its verdict and back pressure, and its node with it; other nodes and the pipes by what the solver found about them and
 * by their pressure (a pipe's at its higher end).
 * @returns null while no case has a result
 */
export function worstOfCases(outcomes: readonly CaseOutcome[]): WorstOfCases | null {
  const results = outcomes.flatMap((outcome) =>
    outcome.status === 'solved' && outcome.result.converged ? [outcome.result] : [],
  );
  if (results.length === 0) return null;

  const traps = new Map<string, Candidate<TrapResult>>();
  const nodes = new Map<string, Candidate<NodeResult>>();
  const pipes = new Map<string, Candidate<PipeResult>>();
  for (const result of results) {
    const warned = warningsByElement(result.warnings);
    const found = (id: string) => badness(worstVerdict(warned.get(id) ?? []));
    const verdicts = trapVerdicts(result);
    const caseId = result.case;
    for (const value of result.traps) {
      const { id, backPressurePa: pressurePa } = value;
      keepWorse(traps, { caseId, value, badness: badness(verdicts.get(id) ?? null), pressurePa });
    }
    for (const value of result.nodes) {
      keepWorse(nodes, { caseId, value, badness: found(value.id), pressurePa: value.pressurePa });
    }
    for (const value of result.pipes) {
      const pressurePa = Math.max(value.upstreamPressurePa, value.downstreamPressurePa);
      keepWorse(pipes, { caseId, value, badness: found(value.id), pressurePa });
    }
  }
  const caseOf = new Map([...nodes, ...pipes, ...traps].map(([id, { caseId }]) => [id, caseId]));
  const trapNodes = results.flatMap((result) =>
    result.nodes.filter(({ id }) => traps.has(id) && caseOf.get(id) === result.case),
  );
  const answered = new Set(results.map((result) => result.case));
  return {
    caseOf,
    unanswered: outcomes.map(({ caseId }) => caseId).filter((id) => !answered.has(id)),
    result: {
      case: WORST_OF_ALL,
      converged: true,
      iterations: Math.max(...results.map(({ iterations }) => iterations)),
      nodes: [...values(nodes).filter(({ id }) => !traps.has(id)), ...trapNodes],
      pipes: values(pipes),
      traps: values(traps),
      warnings: results.flatMap((result) =>
        result.warnings.filter(({ element }) => (caseOf.get(element) ?? result.case) === result.case),
      ),
      ...leftOutOfAll(results),
    },
  };
}

function keepWorse<T extends { readonly id: string }>(kept: Map<string, Candidate<T>>, next: Candidate<T>): void {
  const { id } = next.value;
  const before = kept.get(id);
  if (before === undefined || isWorse(next, before)) kept.set(id, next);
}

function values<T>(kept: ReadonlyMap<string, Candidate<T>>): T[] {
  return Array.from(kept.values(), ({ value }) => value);
}

function warningsByElement(warnings: readonly SolveWarning[]): ReadonlyMap<string, readonly SolveWarning[]> {
  const byElement = new Map<string, SolveWarning[]>();
  for (const warning of warnings) byElement.set(warning.element, [...(byElement.get(warning.element) ?? []), warning]);
  return byElement;
}

/** What no case could solve. */
function leftOutOfAll([first, ...others]: readonly SolveResult[]): Pick<SolveResult, 'partial' | 'leftOut'> {
  const leftOut = (first?.leftOut ?? []).filter((id) => others.every((result) => result.leftOut?.includes(id)));
  return leftOut.length === 0 ? {} : { partial: true, leftOut };
}

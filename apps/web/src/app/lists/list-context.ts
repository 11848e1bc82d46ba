import type { CaseOutcome, NodeResult, PipeResult, SolveResult, TrapResult } from '@riseback/contracts';
import type { NetworkDocument, TopologyFinding } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import type { ListContext } from './columns/column';
import { rowFindings } from './row-findings';

interface Solved {
  readonly document: NetworkDocument;
  readonly units: DisplayUnits;
  readonly topology: readonly TopologyFinding[];
  readonly outcome: CaseOutcome | null;
  readonly result: SolveResult | null;
  readonly traps: ReadonlyMap<string, TrapResult>;
  readonly pipes: ReadonlyMap<string, PipeResult>;
  readonly nodes: ReadonlyMap<string, NodeResult>;
}

/** All that the cells of the lists are printed from. */
export function listContext(solved: Solved): ListContext {
  const { document, units, topology, result, traps, pipes, nodes } = solved;
  const findings = rowFindings(topology, result, units);
  const leftOut = new Set(result?.leftOut);
  return {
    document,
    units,
    traps,
    pipes,
    nodes,
    findings,
    staffTopPa: staffTopPa(result, units),
    waiting: (id) => {
      if (result === null) return withoutResult(solved.outcome);
      if (!result.converged) return 'No solution in this case';
      if (leftOut.has(id)) return leftOutWords(findings.get(id)?.find(({ status }) => status === 'fail')?.word);
      return traps.has(id) || pipes.has(id) || nodes.has(id) ? '' : 'Waiting for the solve';
    },
  };
}

function withoutResult(outcome: CaseOutcome | null): string {
  return outcome?.status === 'refused'
    ? `Not solved: ${outcome.problem.detail ?? outcome.problem.title}`
    : 'Waiting for the solve';
}

function leftOutWords(finding: string | undefined): string {
  return finding === undefined ? 'Waiting for a way to a receiver' : `Waiting: ${finding.toLowerCase()}`;
}

/** One scale for every staff: up to the highest inlet or back pressure, rounded up to a whole ten in the person's unit. */
function staffTopPa(result: SolveResult | null, units: DisplayUnits): number {
  const highest = (result?.traps ?? []).reduce(
    (top, { backPressurePa, differentialPa }) => Math.max(top, backPressurePa, backPressurePa + differentialPa),
    units.atmosphericPressurePa,
  );
  const step = units.system === 'us' ? 10 * 6_894.757 : 50_000;
  const steps = Math.max(1, Math.ceil((highest - units.atmosphericPressurePa) / step - 1e-6));
  return units.atmosphericPressurePa + steps * step;
}

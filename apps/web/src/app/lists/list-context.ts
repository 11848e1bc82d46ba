import type { CaseOutcome, NodeResult, PipeResult, Problem, SolveResult, TrapResult } from '@riseback/contracts';
import type { NetworkDocument, TopologyFinding } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import type { ListContext, Waiting } from './columns/column';
import { type RowFinding, rowFindings } from './row-findings';

interface Solved {
  readonly document: NetworkDocument;
  readonly units: DisplayUnits;
  readonly topology: readonly TopologyFinding[];
  readonly outcome: CaseOutcome | null;
  readonly result: SolveResult | null;
  readonly traps: ReadonlyMap<string, TrapResult>;
  readonly pipes: ReadonlyMap<string, PipeResult>;
  readonly nodes: ReadonlyMap<string, NodeResult>;
  readonly caseNameOf?: ((id: string) => string) | undefined;
}

/** All that the cells of the lists are printed from. */
export function listContext(solved: Solved): ListContext {
  const { document, units, topology, result, traps, pipes, nodes, caseNameOf } = solved;
  const findings = rowFindings(topology, result, units);
  const leftOut = new Set(result?.leftOut);
  return {
    document,
    units,
    traps,
    pipes,
    nodes,
    findings,
    caseNameOf,
    staffTopPa: staffTopPa(result, units),
    waiting: (id) => {
      if (result === null) return withoutResult(solved.outcome);
      if (!result.converged) return refusedBy('No solution', result.problem);
      if (leftOut.has(id)) return leftOutFor(findings.get(id)?.find(({ status }) => status === 'fail'));
      return traps.has(id) || pipes.has(id) || nodes.has(id) ? null : WAITING_FOR_SOLVE;
    },
  };
}

const WAITING_FOR_SOLVE: Waiting = { words: 'Waiting for the solve', sentence: '' };

function withoutResult(outcome: CaseOutcome | null): Waiting {
  return outcome?.status === 'refused' ? refusedBy('Case not solved', outcome.problem) : WAITING_FOR_SOLVE;
}

function refusedBy(words: string, problem: Problem | undefined): Waiting {
  const detail = problem?.detail ?? problem?.title;
  return { words, sentence: detail === undefined ? '' : `${words}: ${detail}.` };
}

function leftOutFor(finding: RowFinding | undefined): Waiting {
  if (finding === undefined || finding.code === 'cutOff')
    return { words: 'Waiting for a way to a receiver', sentence: '' };
  return { words: `Waiting: ${finding.word.toLowerCase()}`, sentence: finding.sentences.join(' ') };
}

/** How many of a hundred inlets lie within the scale; the few highest would press all others into a corner. */
const INLETS_WITHIN = 0.75;

/** One scale for every staff: all back pressures and most inlets, rounded up to a whole ten psi or half a bar. */
function staffTopPa(result: SolveResult | null, units: DisplayUnits): number {
  const traps = result?.traps ?? [];
  const inletsPa = traps
    .map(({ backPressurePa, differentialPa }) => backPressurePa + differentialPa)
    .sort((a, b) => a - b);
  const usualInletPa = inletsPa[Math.floor(INLETS_WITHIN * inletsPa.length)] ?? units.atmosphericPressurePa;
  const highest = traps.reduce((top, { backPressurePa }) => Math.max(top, backPressurePa), usualInletPa);
  const step = units.system === 'us' ? 10 * 6_894.757 : 50_000;
  const steps = Math.max(1, Math.ceil((highest - units.atmosphericPressurePa) / step - 1e-6));
  return units.atmosphericPressurePa + steps * step;
}

import type { NetworkFile } from '@riseback/network';
import { saturationState } from '@riseback/steam';
import { limitsInForce, type LimitsInForce } from './check-limits';
import { ownRuns, type AverageRun } from './coincidence';
import { atElement } from './element-failure';
import { fluidStateAt, vapourFraction } from './fluid-state';
import { networkBands } from './network-bands';
import { nodeQualities, type NodeQualities } from './node-qualities';
import { failedOpen } from './open-traps';
import { vesselCannotDrain } from './pipe-checks';
import type { NodeResult, SolveResult, SolveWarning, TrapResult } from './solve-result';
import { tellPipes } from './tell-pipes';
import { trapResult } from './trap-result';

/** A network solved in one case, before its results are told. */
export interface Solved extends AverageRun {
  readonly caseId: string;
  /** Whether each trap is to have its spread and its credible band. */
  readonly bands: boolean;
}

/**
 * The result as it is handed out, elements in the file's order; what reaches no fixed pressure is listed as left out.
 * @throws ElementFailure where a state outside the steam properties comes up, or a trap's own run has no solution
 */
export function assembleResult(solved: Solved): SolveResult {
  const { file, tree, limits } = partsOf(solved);
  const qualities = nodeQualities(solved.state);
  const pipes = tellPipes(solved, limits, qualities, solved.bands);
  const runs = ownRuns(solved, file.method.coincidence);
  const bands = solved.bands ? networkBands({ ...solved, ends: pipes.ends, ownRuns: runs }) : undefined;
  const models = new Map(file.trapModels.map((model) => [model.id, model]));
  const nodes: NodeResult[] = [];
  const traps: TrapResult[] = [];
  const warnings: SolveWarning[] = [];
  const leftOut: string[] = [];
  file.nodes.forEach(({ id }, index) => {
    if (tree.endOfWalk[index] === -1) {
      leftOut.push(id);
      return;
    }
    nodes.push(nodeResult(solved, index, qualities));
    const trap = solved.nodes[index];
    if (trap?.kind === 'trap') {
      const model = trap.node.trapModel === undefined ? undefined : models.get(trap.node.trapModel);
      const { walk } = solved.state;
      const [ownRun, ofTrap] = [runs.get(index), bands?.get(index)];
      traps.push(trapResult({ file, tree, walk, limits, trap, index, model, ownRun, bands: ofTrap }));
      addTo(warnings, failedOpen(trap, walk.pressurePa[index] as number));
    }
    addTo(warnings, vesselWarning(solved, index));
  });
  for (let index = 0; index < file.nodes.length; index++) {
    addTo(warnings, pipes.streams.thermalShock(index, file.pipes, limits));
  }
  const result = {
    case: solved.caseId,
    converged: true,
    iterations: solved.state.iterations,
    nodes,
    pipes: pipes.results,
    traps,
    warnings: [...warnings, ...pipes.warnings],
  };
  const unreached = [...leftOut, ...pipes.leftOut];
  return unreached.length === 0 ? result : { ...result, partial: true, leftOut: unreached };
}

function partsOf({ prepared: { file }, state: { tree } }: Solved): {
  file: NetworkFile;
  tree: AverageRun['state']['tree'];
  limits: LimitsInForce;
} {
  return { file, tree, limits: limitsInForce(file.limits) };
}

function addTo(warnings: SolveWarning[], warning: SolveWarning | undefined): void {
  if (warning !== undefined) warnings.push(warning);
}

function nodeResult(solved: Solved, index: number, { quality, boilingK }: NodeQualities): NodeResult {
  const { flows, walk } = solved.state;
  const node = solved.prepared.file.nodes[index] as NetworkFile['nodes'][number];
  const enthalpyJKg = flows.enthalpyJKg[index] as number;
  const pressurePa = walk.pressurePa[index] as number;
  const x = quality[index] as number;
  let temperatureK = boilingK[index] as number;
  try {
    if (!(x >= 0 && x <= 1)) temperatureK = fluidStateAt(saturationState(pressurePa), enthalpyJKg).temperatureK;
  } catch (error) {
    throw atElement('node', node, index, error);
  }
  return {
    id: node.id,
    pressurePa,
    temperatureK,
    enthalpyJKg,
    quality: vapourFraction(x),
    massFlowKgS: flows.massFlowKgS[index] as number,
  };
}

function vesselWarning({ nodes, state: { tree, walk } }: Solved, index: number): SolveWarning | undefined {
  const node = nodes[index];
  const outlet = tree.outletOfVessel[index] as number;
  if (node?.kind !== 'fixedPressure' || outlet === -1 || tree.endOfWalk[outlet] === -1) return undefined;
  return vesselCannotDrain(node.node.id, node.pressurePa, walk.pressurePa[outlet] as number);
}

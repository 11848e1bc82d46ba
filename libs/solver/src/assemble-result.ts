import { boreAreaM2 } from '@riseback/hydraulics';
import type { NetworkFile, TrapModel } from '@riseback/network';
import type { SaturationState } from '@riseback/steam';
import type { LimitsInForce } from './check-limits';
import { atElement } from './element-failure';
import type { FlowAndEnergy } from './flow-and-energy';
import { fluidStateAt, vapourFraction, type FluidState } from './fluid-state';
import { failedOpen } from './open-traps';
import type { OperatingNode } from './operating-case';
import { checkPipe, vesselCannotDrain } from './pipe-checks';
import type { PipeGeometry } from './pipe-geometry';
import { pipeResult } from './pipe-result';
import { flowInPipe, type PressureWalk } from './pressure-walk';
import { inletNode, outletNode, type ReturnTree } from './return-tree';
import type { NodeResult, PipeResult, SolveResult, SolveWarning, TrapResult } from './solve-result';
import { checkTrap, ISOLATED_UNCHECKED } from './trap-checks';

/** Everything a solve found, by index. */
export interface Solved {
  readonly file: NetworkFile;
  readonly caseId: string;
  readonly tree: ReturnTree;
  readonly nodes: readonly OperatingNode[];
  readonly geometries: readonly (PipeGeometry | undefined)[];
  readonly flows: FlowAndEnergy & { readonly ambientEnthalpyJKg: number };
  readonly walk: PressureWalk;
  readonly limits: LimitsInForce;
}

/** The result as it is handed out, elements in the file's order; what reaches no fixed pressure is listed as left out. */
export function assembleResult(solved: Solved): SolveResult {
  const { file, tree } = solved;
  const models = new Map(file.trapModels.map((model) => [model.id, model]));
  const nodes: NodeResult[] = [];
  const pipes: PipeResult[] = [];
  const traps: TrapResult[] = [];
  const warnings: SolveWarning[] = [];
  const leftOut: string[] = [];
  file.nodes.forEach(({ id }, index) => {
    if (tree.endOfWalk[index] === -1) {
      leftOut.push(id);
      return;
    }
    nodes.push(nodeResult(solved, index));
    const node = solved.nodes[index];
    if (node?.kind === 'trap') {
      traps.push(trapResult(solved, node, index, models));
      const blowing = failedOpen(node, solved.walk.pressurePa[index] as number);
      if (blowing) warnings.push(blowing);
    }
    const drain = vesselWarning(solved, index);
    if (drain) warnings.push(drain);
  });
  file.pipes.forEach((pipe, index) => {
    const marched = solved.walk.marched[index];
    const geometry = solved.geometries[index];
    if (marched === undefined || geometry === undefined) {
      leftOut.push(pipe.id);
      return;
    }
    const result = pipeResult({
      pipe,
      index,
      geometry,
      marched,
      flow: flowInPipe(tree, index, geometry, solved.flows),
      arrow: tree.arrow[index] as number,
      upstream: saturationAt(solved, inletNode(tree, index)),
      downstream: saturationAt(solved, outletNode(tree, index)),
    });
    pipes.push(result);
    warnings.push(...pipeWarnings(solved, index, result));
  });
  const result = { case: solved.caseId, converged: true, iterations: 1, nodes, pipes, traps, warnings };
  return leftOut.length === 0 ? result : { ...result, partial: true, leftOut };
}

function nodeResult(solved: Solved, index: number): NodeResult {
  const { file, flows, walk } = solved;
  const node = file.nodes[index] as NetworkFile['nodes'][number];
  let state: FluidState;
  try {
    state = stateAt(solved, index, flows.enthalpyJKg[index] as number);
  } catch (error) {
    throw atElement('node', node, index, error);
  }
  return {
    id: node.id,
    pressurePa: walk.pressurePa[index] as number,
    temperatureK: state.temperatureK,
    enthalpyJKg: flows.enthalpyJKg[index] as number,
    quality: vapourFraction(state.quality),
    massFlowKgS: flows.massFlowKgS[index] as number,
  };
}

function stateAt(solved: Solved, index: number, enthalpyJKg: number): FluidState {
  return fluidStateAt(saturationAt(solved, index), enthalpyJKg);
}

function saturationAt({ walk }: Solved, index: number): SaturationState {
  const saturation = walk.saturation[index];
  if (saturation === undefined) throw new Error(`The walk left no state at node ${String(index)}`);
  return saturation;
}

function trapResult(
  solved: Solved,
  node: Extract<OperatingNode, { kind: 'trap' }>,
  index: number,
  models: ReadonlyMap<string, TrapModel>,
): TrapResult {
  const { file, tree, walk, limits } = solved;
  const { node: trap, inletPressurePa, loadKgS } = node;
  const backPressurePa = walk.pressurePa[index] as number;
  const receiverPressurePa = walk.pressurePa[tree.endOfWalk[index] as number] as number;
  const handStaticPa = walk.handCheckPa[index] as number;
  const model = trap.trapModel === undefined ? undefined : models.get(trap.trapModel);
  const { atmosphericPressurePa } = file.site;
  const checked = node.isolated
    ? { checks: [], notChecked: ISOLATED_UNCHECKED }
    : checkTrap({ trap, model, inletPressurePa, backPressurePa, loadKgS, atmosphericPressurePa, limits });
  return {
    id: trap.id,
    backPressurePa,
    receiverPressurePa,
    staticPa: walk.staticPa[index] as number,
    frictionPa: walk.frictionPa[index] as number,
    flashPa: walk.flashPa[index] as number,
    differentialPa: inletPressurePa - backPressurePa,
    handCheck: { staticPa: handStaticPa, backPressurePa: receiverPressurePa + handStaticPa },
    ...(node.liveSteamKgS === undefined ? {} : { liveSteamKgS: node.liveSteamKgS }),
    walk: walkFrom(index, solved),
    ...checked,
  };
}

function walkFrom(start: number, { tree, file }: Solved): string[] {
  const ids: string[] = [];
  for (let index = start; tree.outPipe[index] !== -1; index = tree.drainsTo[index] as number) {
    ids.push((file.pipes[tree.outPipe[index] as number] as { id: string }).id);
  }
  return ids;
}

function vesselWarning({ tree, nodes, walk }: Solved, index: number): SolveWarning | undefined {
  const node = nodes[index];
  const outlet = tree.outletOfVessel[index] as number;
  if (node?.kind !== 'fixedPressure' || outlet === -1 || tree.endOfWalk[outlet] === -1) return undefined;
  return vesselCannotDrain(node.node.id, node.pressurePa, walk.pressurePa[outlet] as number);
}

function pipeWarnings({ file, geometries, limits }: Solved, index: number, result: PipeResult): SolveWarning[] {
  const geometry = geometries[index];
  const pipe = file.pipes[index];
  if (geometry === undefined || pipe === undefined) return [];
  const massFluxKgM2S = Math.abs(result.massFlowKgS) / boreAreaM2(geometry.insideDiameterM);
  return checkPipe({ result, lengthM: geometry.lengthM, massFluxKgM2S, checkValve: pipe.checkValve, limits });
}

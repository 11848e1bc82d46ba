import { compareIds, type NetworkFile, type PipeRun } from '@riseback/network';
import { NoConvergenceError } from '@riseback/numerics';
import { ElementFailure } from './element-failure';
import type { ChordFlows } from './flow-and-energy';
import { meshCore, type MeshCore } from './mesh-core';
import { treeFlows } from './mesh-division';
import { findRough, MarchedLaw } from './mesh-law';
import { MESH_CLOSED_PA, searchDivision } from './mesh-search';
import type { MeshSolution } from './mesh-newton';
import { MeshEvaluator, type MeshState } from './mesh-state';
import type { PreparedNetwork } from './network-state';
import type { OperatingNode } from './operating-case';
import type { PipeGeometry } from './pipe-geometry';
import type { MarchOptions } from './pipe-march';
import { outletNode, type ReturnTree } from './return-tree';

/** How the flow divides between the ways down that there are. */
export interface ClosedMeshes {
  /** Ways out by the largest outflow; orders by the flow. */
  readonly tree: ReturnTree;
  readonly chordFlows: ChordFlows;
  readonly iterations: number;
  /** How the pipes were marched, finer than asked for where the meshes needed it. */
  readonly march: MarchOptions;
}

/**
 * A mesh that stays open by less than this may be open only by what the march leaves, in long lines of great pressure drop; then all
 * is marched finer.
 */
const WITHIN_MARCH_PA = 100;
const FINER_MARCH_SHARE = 0.01;

/** The last resort, so that nothing hangs: a network that takes longer is named as not converged. */
const LONGEST_SEARCH_MS = 1200;
/** More meshes than this are refused: the dense system alone would take longer than a solve may. */
export const MOST_MESHES = 600;
/** Of all that flows, the least share that a pipe is judged by before it is known what it carries. */
const LEAST_REFERENCE_SHARE = 0.1;

/** A node of fixed pressure that would have to feed the network: it has nothing to give, so there is no such solution. */
export class FlowCannotLeaveError extends Error {
  override readonly name = 'FlowCannotLeaveError';
}

/**
 * Divides the flow between meshes and receivers so that every mesh closes.
 * @throws ElementFailure where that cannot be, at the pipe or vessel where it shows
 * Method: docs/methods/loops.md.
 */
export function closeMeshes(
  prepared: PreparedNetwork,
  nodes: readonly OperatingNode[],
  march: MarchOptions,
): ClosedMeshes {
  const { file, tree, geometries } = prepared;
  refuseTooMany(file, tree);
  const core = meshCore(prepared, nodes);
  const inCore = core.pipes.map((pipe) => geometries[pipe] as PipeGeometry);
  const endMs = Date.now() + LONGEST_SEARCH_MS;
  const isOver = (): boolean => Date.now() > endMs;
  const law = new MarchedLaw(inCore, prepared.ambientEnthalpyJKg, march);
  const usual = new MeshEvaluator(core.network, law);
  makeRough(law, usual);
  let found = { march, evaluator: usual, solution: searchDivision(usual, { isOver, stallsBelowPa: WITHIN_MARCH_PA }) };
  if (!found.solution.converged && found.solution.worstPa < WITHIN_MARCH_PA) {
    const finer = { ...march, tolerancePa: march.tolerancePa * FINER_MARCH_SHARE };
    const finerLaw = new MarchedLaw(inCore, prepared.ambientEnthalpyJKg, finer, law.rough);
    const evaluator = new MeshEvaluator(core.network, finerLaw);
    const startKgS = found.solution.state.flowKgS;
    const solution = searchDivision(evaluator, { isOver, startKgS, stallsBelowPa: 0 });
    if (solution.worstPa < found.solution.worstPa) found = { march: finer, evaluator, solution };
  }
  const { evaluator, solution } = found;
  refuseUnclosed(prepared, core, solution);
  refuseReturningLiquid(prepared, core, solution.state);
  refuseFeeding(prepared, core, evaluator, solution.state);
  return { ...meshedTree(prepared, core, solution.state), iterations: solution.iterations, march: found.march };
}

function refuseTooMany({ pipes }: NetworkFile, { chords }: ReturnTree): void {
  const chord = chords[MOST_MESHES];
  if (chord === undefined) return;
  const reason = new Error(
    `${chords.length} pipes close loops or open second ways down; up to ${MOST_MESHES} are computed. Solve parts of the network by themselves.`,
  );
  throw new ElementFailure((pipes[chord] as PipeRun).id, `/pipes/${chord}`, reason);
}

/** Each pipe is judged at what it carries at the start, at a mean enthalpy and at the pressure that its way leads to. */
function makeRough(law: MarchedLaw, { network, scaleKgS }: MeshEvaluator): void {
  const enthalpyJKg =
    scaleKgS > 0 ? network.inflowW.reduce((sum, w) => sum + w, 0) / scaleKgS : network.ambientEnthalpyJKg;
  const endPa = network.fixedPressurePa.slice();
  for (const node of [...network.startOrder].reverse()) {
    const pipe = network.startWayOut[node] as number;
    if (pipe < 0) continue;
    const below = (network.from[pipe] === node ? network.to[pipe] : network.from[pipe]) as number;
    endPa[node] = endPa[below] as number;
  }
  const least = LEAST_REFERENCE_SHARE * (scaleKgS || 1);
  treeFlows(network, network.inflowKgS).forEach((flow, pipe) => {
    const massFlowKgS = Math.max(Math.abs(flow), least);
    findRough(law, pipe, { massFlowKgS, enthalpyJKg, pressurePa: endPa[network.to[pipe] as number] as number });
  });
}

function refuseUnclosed(prepared: PreparedNetwork, core: MeshCore, solution: MeshSolution): void {
  const { converged, iterations, state, worstPa, worstPipe } = solution;
  // where a law had no answer the last walk names the pipe and the value
  if (converged || (state.balanced && state.failed.length > 0)) return;
  const index = core.pipes[Math.max(0, worstPipe)] as number;
  const pipe = prepared.file.pipes[index] as PipeRun;
  const circles = state.circled.includes(worstPipe);
  const reason = circles
    ? new FlowCannotLeaveError(
        `water would go round in a circle through this pipe, driven by nothing but its own weight (${worstPa.toPrecision(4)} Pa): there is no steady division of the flow to compute. Check elevations and dropCredit.`,
      )
    : new NoConvergenceError('the mesh that this pipe closes', iterations, worstPa);
  throw new ElementFailure(pipe.id, `/pipes/${index}`, reason);
}

function refuseReturningLiquid({ file }: PreparedNetwork, core: MeshCore, state: MeshState): void {
  const link = core.network.vesselLinks.find((_, i) => state.returning[i] === 1);
  if (link === undefined) return;
  const vessel = core.nodes[link.vessel] as number;
  const reason = new FlowCannotLeaveError(
    'the liquid of this flash vessel comes back to it. Fit a check valve in the pipe that leads it back, or drain the vessel elsewhere.',
  );
  throw new ElementFailure((file.nodes[vessel] as { id: string }).id, `/nodes/${vessel}`, reason);
}

/** A pipe without a check valve, whose receiver or vessel stands above what is before it, would flow back. */
function refuseFeeding({ file }: PreparedNetwork, core: MeshCore, evaluator: MeshEvaluator, state: MeshState): void {
  const { network, law } = evaluator;
  core.pipes.forEach((index, pipe) => {
    const pipeRun = file.pipes[index] as PipeRun;
    const [from, to] = [network.from[pipe] as number, network.to[pipe] as number];
    const fixedPa = network.fixedPressurePa[to] as number;
    if (state.flowKgS[pipe] !== 0 || pipeRun.checkValve || Number.isNaN(fixedPa)) return;
    const standsPa = state.pressurePa[from] as number;
    const enthalpy = state.enthalpyJKg[to] as number;
    const creepKgS = 1e-9 * (evaluator.scaleKgS || 1);
    const backPa = law.inletPressurePa(pipe, false, creepKgS, enthalpy, standsPa);
    if (!(fixedPa - backPa > MESH_CLOSED_PA)) return;
    const end = pipeRun.to;
    const reason = new FlowCannotLeaveError(
      `${end} stands at ${kPa(fixedPa)} and ${pipeRun.from} at ${kPa(standsPa)}, so that ${end} would feed the network through this pipe, and what it would give is not known. Fit a check valve, or lead the line of the lower pressure elsewhere.`,
    );
    throw new ElementFailure(pipeRun.id, `/pipes/${index}`, reason);
  });
}

function kPa(pressurePa: number): string {
  return `${(pressurePa / 1000).toFixed(2)} kPa abs`;
}

/** The tree of the largest outflows, with the flows of all other pipes. */
function meshedTree(
  { file, tree }: PreparedNetwork,
  core: MeshCore,
  state: MeshState,
): Pick<ClosedMeshes, 'tree' | 'chordFlows'> {
  const [outPipe, drainsTo, endOfWalk, arrow] = [
    tree.outPipe.slice(),
    tree.drainsTo.slice(),
    tree.endOfWalk.slice(),
    tree.arrow.slice(),
  ];
  const chordFlows = new Float64Array(file.pipes.length);
  const isWayOut = new Uint8Array(file.pipes.length);
  core.pipes.forEach((pipe, i) => {
    arrow[pipe] = state.direction[i] === -1 ? -1 : 1;
    chordFlows[pipe] = Math.abs(state.flowKgS[i] as number);
  });
  const directed = { ...tree, arrow };
  core.nodes.forEach((node, i) => {
    const out = core.pipes[state.wayOut[i] as number];
    if (out === undefined) return;
    outPipe[node] = out;
    drainsTo[node] = outletNode(directed, out);
    isWayOut[out] = 1;
  });
  const inCore = new Set(core.nodes);
  const ends = tree.downstreamFirst.filter((node) => outPipe[node] === -1 && !inCore.has(node));
  const upstreamFirst = [...core.branches, ...Array.from(state.order, (i) => core.nodes[i] as number), ...ends];
  const downstreamFirst = upstreamFirst.toReversed();
  for (const node of downstreamFirst) {
    if (outPipe[node] !== -1) endOfWalk[node] = endOfWalk[drainsTo[node] as number] as number;
  }
  const chords = core.pipes.filter((pipe) => isWayOut[pipe] === 0);
  for (const pipe of core.pipes) if (isWayOut[pipe] === 1) chordFlows[pipe] = 0;
  return {
    tree: {
      ...directed,
      outPipe,
      drainsTo,
      endOfWalk,
      upstreamFirst,
      downstreamFirst,
      chords: sortedById(file, chords),
    },
    chordFlows,
  };
}

function sortedById({ pipes }: NetworkFile, indexes: readonly number[]): number[] {
  return [...indexes].sort((a, b) => compareIds((pipes[a] as PipeRun).id, (pipes[b] as PipeRun).id));
}

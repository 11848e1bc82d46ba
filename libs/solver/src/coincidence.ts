import type { Method, PumpedInlet, Trap } from '@riseback/network';
import { atElement } from './element-failure';
import { outletEnthalpyJKg, trapEnthalpyJKg, type PipeFlow } from './flow-and-energy';
import { networkState, type NetworkState, type PreparedNetwork } from './network-state';
import type { OperatingNode, OperatingTrap } from './operating-case';
import { probableFlowKgS, type PeakGroup } from './peak-quantile';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import { PipeMarcher, type MarchOptions } from './pipe-march';
import { flowInPipe } from './pressure-walk';
import { stepsFrom, type TreeStep } from './steps-of-walk';

/** What a trap stands against in a run of its own. */
export interface OwnRun {
  readonly basis: 'ownPeak' | 'probable';
  readonly backPressurePa: number;
  readonly staticPa: number;
  readonly frictionPa: number;
  readonly flashPa: number;
  /** By pipe of its walk, from the trap down: what flows there in this run. */
  readonly flows: readonly PipeFlow[];
}

/** The average run that own runs start from. */
export interface AverageRun {
  readonly prepared: PreparedNetwork;
  readonly nodes: readonly OperatingNode[];
  readonly state: NetworkState;
  readonly march: MarchOptions;
}

/** A trap or pump that discharges at a peak for a share of the time. */
interface PeakSource {
  readonly index: number;
  /** Traps of one batch discharge together; a source without one stands for itself. */
  readonly group: string;
  readonly averageKgS: number;
  readonly peakKgS: number;
}

/**
 * Runs of their own for the traps that intermittent discharge asks it of, by node index. Only a trap's own walk is marched again: what
 * leaves its nodes by other ways does not change.
 *     ownPeak:  an intermittent trap at load × peakFactor, all others at their load, enthalpies mixed anew
 *     probable: every trap, with its own batch at its peak, and in each pipe of its walk what the other intermittent sources upstream
 *               do not exceed 95 % of the time, never less than their average; enthalpies of the average run
 * @throws ElementFailure where such a run has no solution
 */
export function ownRuns(average: AverageRun, coincidence: Method['coincidence']): ReadonlyMap<number, OwnRun> {
  const runs = new Map<number, OwnRun>();
  if (coincidence === 'average') return runs;
  const marcher = new PipeMarcher(average.march);
  const upstream = coincidence === 'probable' ? sourcesByPipe(average) : undefined;
  average.nodes.forEach((node, index) => {
    if (node.kind !== 'trap' || !flows(average, node, index)) return;
    if (upstream !== undefined)
      runs.set(index, marchedRun(average, marcher, index, probableFlows(average, node, index, upstream)));
    else if (node.node.discharge !== 'intermittent') return;
    else if (average.state.tree.chords.length > 0) runs.set(index, solvedAgain(average, node, index));
    else runs.set(index, marchedRun(average, marcher, index, peakFlows(average, node, index)));
  });
  return runs;
}

function flows({ state }: AverageRun, { isolated, loadKgS }: OperatingTrap, index: number): boolean {
  return !isolated && loadKgS > 0 && state.tree.endOfWalk[index] !== -1;
}

function walkFrom({ state }: AverageRun, start: number): readonly TreeStep[] {
  return stepsFrom(state.tree, start);
}

function geometryOf({ prepared }: AverageRun, pipe: number): PipeGeometry {
  const geometry = prepared.geometries[pipe];
  if (geometry === undefined) throw new Error(`The walk leads through pipe ${String(pipe)}, which has no geometry`);
  return geometry;
}

/** The walk's flows with the trap at its peak: what comes in on top mixes on its way as everything does. */
function peakFlows(average: AverageRun, { node, loadKgS, inletPressurePa }: OperatingTrap, trap: number): PipeFlow[] {
  const { massFlowKgS, enthalpyJKg, ambientEnthalpyJKg } = average.state.flows;
  const addedKgS = (node.peakFactor - 1) * loadKgS;
  let addedW = addedKgS * trapEnthalpyJKg(inletPressurePa, node.subcoolingK);
  return walkFrom(average, trap).map(({ node: at, pipe }) => {
    const geometry = geometryOf(average, pipe);
    const before = flowInPipe(average.state.tree, pipe, geometry, average.state.flows);
    const flowKgS = (massFlowKgS[at] as number) + addedKgS;
    const h = ((massFlowKgS[at] as number) * (enthalpyJKg[at] as number) + addedW) / flowKgS;
    const flow = { ...before, massFlowKgS: flowKgS, inletEnthalpyJKg: h };
    const leaving = (m: number, inlet: number): number => m * outletEnthalpyJKg(geometry, m, inlet, ambientEnthalpyJKg);
    addedW = leaving(flowKgS, h) - leaving(before.massFlowKgS, before.inletEnthalpyJKg);
    return flow;
  });
}

/** The walk's flows with the trap's batch at its peak and the others as they probably coincide. */
function probableFlows(
  average: AverageRun,
  { node }: OperatingTrap,
  trap: number,
  upstream: ReadonlyMap<number, readonly PipeGroup[]>,
): PipeFlow[] {
  const own = groupName(node, trap);
  return walkFrom(average, trap).map(({ pipe }) => {
    const geometry = geometryOf(average, pipe);
    const before = flowInPipe(average.state.tree, pipe, geometry, average.state.flows);
    const others: PeakGroup[] = [];
    let [othersAverageKgS, addedKgS] = [0, 0];
    for (const group of upstream.get(pipe) ?? []) {
      if (group.name === own) {
        addedKgS += group.peakKgS - group.averageKgS;
      } else {
        others.push(group);
        othersAverageKgS += group.averageKgS;
      }
    }
    addedKgS += Math.max(0, probableFlowKgS(others) - othersAverageKgS);
    const massFlowKgS = before.massFlowKgS + addedKgS;
    // as much heat lost for each kilogram as in the average run, so that enthalpies stay as they are there
    const heatLossWM = (before.heatLossWM * massFlowKgS) / before.massFlowKgS;
    return { ...before, massFlowKgS, heatLossWM };
  });
}

/** What discharges together upstream of a pipe. */
interface PipeGroup extends PeakGroup {
  readonly name: string;
  readonly averageKgS: number;
}

/** By pipe, the groups of intermittent sources upstream of it, largest peak first. */
function sourcesByPipe(average: AverageRun): ReadonlyMap<number, readonly PipeGroup[]> {
  const groups = new Map<number, Map<string, { averageKgS: number; peakKgS: number }>>();
  for (const { index, group, averageKgS, peakKgS } of peakSources(average)) {
    for (const { pipe } of walkFrom(average, index)) {
      const ofPipe = groups.get(pipe) ?? new Map<string, { averageKgS: number; peakKgS: number }>();
      groups.set(pipe, ofPipe);
      const sum = ofPipe.get(group) ?? { averageKgS: 0, peakKgS: 0 };
      ofPipe.set(group, { averageKgS: sum.averageKgS + averageKgS, peakKgS: sum.peakKgS + peakKgS });
    }
  }
  return new Map(
    [...groups].map(([pipe, ofPipe]) => {
      const list = [...ofPipe].map(([name, { averageKgS, peakKgS }]) => ({
        name,
        averageKgS,
        peakKgS,
        // of a batch with several peak factors too, this keeps the average
        probability: averageKgS / peakKgS,
      }));
      return [pipe, list.sort((a, b) => b.peakKgS - a.peakKgS)];
    }),
  );
}

function peakSources(average: AverageRun): PeakSource[] {
  return average.nodes.flatMap((node, index): PeakSource[] => {
    if (node.kind === 'trap') {
      const { discharge, peakFactor } = node.node;
      if (discharge !== 'intermittent' || !flows(average, node, index)) return [];
      return [
        { index, group: groupName(node.node, index), averageKgS: node.loadKgS, peakKgS: node.loadKgS * peakFactor },
      ];
    }
    if (node.kind !== 'pumpedInlet' || node.flowKgS === 0 || average.state.tree.endOfWalk[index] === -1) return [];
    const { peakFactor } = node.node;
    if (peakFactor === 1) return [];
    return [
      { index, group: groupName(node.node, index), averageKgS: node.flowKgS, peakKgS: node.flowKgS * peakFactor },
    ];
  });
}

/** A batch’s name may be anything; an index of its own cannot be one of them. */
function groupName(node: Trap | PumpedInlet, index: number): string {
  return node.kind === 'trap' && node.batch !== undefined && node.discharge === 'intermittent'
    ? `batch ${node.batch}`
    : `node ${String(index)}`;
}

/** Marches a walk with other flows, from its end up. */
function marchedRun(average: AverageRun, marcher: PipeMarcher, trap: number, walkFlows: readonly PipeFlow[]): OwnRun {
  const { prepared, state } = average;
  const steps = walkFrom(average, trap);
  const totals = { staticPa: 0, frictionPa: 0, flashPa: 0 };
  let pressurePa = state.walk.pressurePa[state.tree.endOfWalk[trap] as number] as number;
  for (let i = steps.length - 1; i >= 0; i--) {
    const { pipe } = steps[i] as { pipe: number };
    const geometry = geometryOf(average, pipe);
    const pieces = piecesAgainstFlow(geometry.pieces, state.tree.arrow[pipe] === 1);
    try {
      const marched = marcher.march(geometry, walkFlows[i] as PipeFlow, pieces, pressurePa);
      pressurePa = marched.upstreamPressurePa;
      totals.staticPa += marched.staticPa;
      totals.frictionPa += marched.frictionPa;
      totals.flashPa += marched.flashPa;
    } catch (error) {
      throw atElement('pipe', prepared.file.pipes[pipe] as { id: string }, pipe, error);
    }
  }
  const basis = prepared.file.method.coincidence === 'probable' ? 'probable' : 'ownPeak';
  return { basis, backPressurePa: pressurePa, ...totals, flows: walkFlows };
}

/** In a network with meshes a trap's peak moves the flows everywhere: it is solved again as a whole. */
function solvedAgain(average: AverageRun, trap: OperatingTrap, index: number): OwnRun {
  const { prepared, nodes, march } = average;
  const atPeak = nodes.with(index, { ...trap, loadKgS: trap.loadKgS * trap.node.peakFactor });
  const state = networkState(prepared, atPeak, march);
  const walkFlows = walkFrom({ ...average, state }, index).map(({ pipe }) =>
    flowInPipe(state.tree, pipe, geometryOf(average, pipe), state.flows),
  );
  return {
    basis: 'ownPeak',
    backPressurePa: state.walk.pressurePa[index] as number,
    staticPa: state.walk.staticPa[index] as number,
    frictionPa: state.walk.frictionPa[index] as number,
    flashPa: state.walk.flashPa[index] as number,
    flows: walkFlows,
  };
}

import {
  blankSaturation,
  fillSaturation,
  liquidAtTemperature,
  saturationPressurePa,
  saturationState,
  saturationTemperatureK,
} from '@riseback/steam';
import { atElement } from './element-failure';
import type { OperatingNode } from './operating-case';
import type { PipeGeometry } from './pipe-geometry';
import { inletNode, outletNode, type ReturnTree } from './return-tree';

/** What flows into a pipe, and how it cools on its way. */
export interface PipeFlow {
  readonly massFlowKgS: number;
  readonly inletEnthalpyJKg: number;
  readonly heatLossWM: number;
  /** Enthalpy of liquid at ambient temperature: heat loss stops there, and a still pipe stands at it. */
  readonly ambientEnthalpyJKg: number;
}

/** A pipe's flow that its keeper has filled in anew for each pipe. */
export type FlowRecord = { -readonly [Key in keyof PipeFlow]: PipeFlow[Key] };

export function blankFlow(): FlowRecord {
  return { massFlowKgS: NaN, inletEnthalpyJKg: NaN, heatLossWM: NaN, ambientEnthalpyJKg: NaN };
}

export interface FlowAndEnergy {
  /**
   * By node of the tree, vessel outlets included: everything that comes to the node, which is what leaves it but for a vessel's
   * vapour.
   */
  readonly massFlowKgS: Float64Array;
  readonly enthalpyJKg: Float64Array;
  /** By pipe, in the direction of its flow. */
  readonly pipeFlowKgS: Float64Array;
}

/** Flow of each chord of a tree in the direction of its arrow; by pipe, 0 elsewhere. */
export type ChordFlows = Float64Array;

/** Colder than this, water in a return would freeze; the ambient enthalpy is not taken below it. */
const COLDEST_WATER_K = 274.15;

export function ambientLiquidEnthalpyJKg(ambientTemperatureK: number): number {
  return liquidEnthalpyJKg(Math.max(ambientTemperatureK, COLDEST_WATER_K));
}

/**
 * Flows and enthalpies of a tree, from the traps down: h does not depend on pressure, so this needs no iteration.
 *     m = Σ m_i,   h = Σ m_i h_i / m;   a vessel's liquid goes on at h_l(p_v), (1 − x) m of it
 * Chords take what they are given, and each node's way out the rest.
 * Kinetic and potential energy are left out (docs/methods/network-walk.md shows their size).
 * @throws ElementFailure where a trap, inlet or vessel stands outside the steam properties
 */
export function flowAndEnergy(
  tree: ReturnTree,
  nodes: readonly OperatingNode[],
  pipes: readonly (PipeGeometry | undefined)[],
  ambientEnthalpyJKg: number,
  chordFlows?: ChordFlows,
): FlowAndEnergy {
  const massFlowKgS = new Float64Array(tree.nodeCount);
  const enthalpyJKg = new Float64Array(tree.nodeCount);
  const pipeFlowKgS = new Float64Array(pipes.length);
  const enthalpyFlowW = new Float64Array(tree.nodeCount);
  const chordsFrom = chordsByInlet(tree);
  const add = (index: number, flowKgS: number, h: number): void => {
    massFlowKgS[index] = (massFlowKgS[index] as number) + flowKgS;
    enthalpyFlowW[index] = (enthalpyFlowW[index] as number) + flowKgS * h;
  };
  for (const index of tree.upstreamFirst) {
    const node = nodes[index] ?? nodes[tree.vesselOfOutlet[index - nodes.length] as number];
    if (node === undefined) continue;
    try {
      addSource(index, node);
    } catch (error) {
      throw atElement('node', node.node, nodes.indexOf(node), error);
    }
    const flow = massFlowKgS[index] as number;
    const h = flow > 0 ? (enthalpyFlowW[index] as number) / flow : ambientEnthalpyJKg;
    enthalpyJKg[index] = h;
    let rest = flow;
    for (const chord of chordsFrom.get(index) ?? NO_CHORDS) {
      const taken = chordFlows?.[chord] ?? 0;
      rest -= taken;
      send(chord, outletNode(tree, chord), taken, h);
    }
    const out = tree.outPipe[index] as number;
    if (out !== -1) send(out, tree.drainsTo[index] as number, rest, h);
  }
  return { massFlowKgS, enthalpyJKg, pipeFlowKgS };

  function send(index: number, to: number, flow: number, h: number): void {
    const pipe = pipes[index];
    if (pipe === undefined) return;
    pipeFlowKgS[index] = flow;
    add(to, flow, outletEnthalpyJKg(pipe, flow, h, ambientEnthalpyJKg));
  }

  function addSource(index: number, node: OperatingNode): void {
    if (node.kind === 'trap') {
      add(index, node.loadKgS, trapEnthalpyJKg(node.inletPressurePa, node.node.subcoolingK));
      const { liveSteamKgS = 0 } = node;
      if (liveSteamKgS > 0) add(index, liveSteamKgS, saturationState(node.inletPressurePa).vapourEnthalpyJKg);
    } else if (node.kind === 'pumpedInlet') {
      add(index, node.flowKgS, liquidEnthalpyJKg(node.node.temperatureK));
    } else if (node.kind === 'fixedPressure' && index >= nodes.length) {
      addDrain(index, tree.vesselOfOutlet[index - nodes.length] as number, node.pressurePa);
    }
  }

  function addDrain(outlet: number, vessel: number, pressurePa: number): void {
    const inflow = massFlowKgS[vessel] as number;
    const h = enthalpyJKg[vessel] as number;
    const { liquidEnthalpyJKg: liquid, vapourEnthalpyJKg: vapour } = saturationState(pressurePa);
    if (h <= liquid) add(outlet, inflow, h);
    else add(outlet, inflow * Math.max(0, (vapour - h) / (vapour - liquid)), liquid);
  }
}

const NO_CHORDS: readonly number[] = [];

function chordsByInlet(tree: ReturnTree): Map<number, number[]> {
  const chordsFrom = new Map<number, number[]>();
  for (const chord of tree.chords) {
    const node = inletNode(tree, chord);
    const list = chordsFrom.get(node);
    if (list === undefined) chordsFrom.set(node, [chord]);
    else list.push(chord);
  }
  return chordsFrom;
}

/** Enthalpy of what leaves a pipe; see {@link enthalpyAlong}. */
export function outletEnthalpyJKg(
  { heatLossWM, lengthM }: Pick<PipeGeometry, 'heatLossWM' | 'lengthM'>,
  massFlowKgS: number,
  inletEnthalpyJKg: number,
  ambientEnthalpyJKg: number,
): number {
  return enthalpyAlong({ massFlowKgS, inletEnthalpyJKg, heatLossWM, ambientEnthalpyJKg }, lengthM);
}

/**
 * Enthalpy at a distance from a pipe's inlet: falls evenly with the heat lost, and stops at liquid of ambient temperature.
 * What enters colder than that stays as it is.
 */
export function enthalpyAlong(flow: PipeFlow, distanceM: number): number {
  const { massFlowKgS, inletEnthalpyJKg, heatLossWM, ambientEnthalpyJKg } = flow;
  if (massFlowKgS === 0) return ambientEnthalpyJKg;
  if (heatLossWM === 0) return inletEnthalpyJKg;
  const cooled = inletEnthalpyJKg - (heatLossWM * distanceM) / massFlowKgS;
  return Math.max(cooled, Math.min(inletEnthalpyJKg, ambientEnthalpyJKg));
}

/** Filled in anew for each trap. */
const atInlet = blankSaturation();

/** Condensate comes to a trap as liquid at its inlet pressure, colder than boiling by its subcooling. */
export function trapEnthalpyJKg(inletPressurePa: number, subcoolingK: number): number {
  if (subcoolingK === 0) {
    fillSaturation(atInlet, inletPressurePa);
    return atInlet.liquidEnthalpyJKg;
  }
  return liquidAtTemperature(inletPressurePa, saturationTemperatureK(inletPressurePa) - subcoolingK).enthalpyJKg;
}

/** h_l(T). What pressure above saturation adds, some 0.1 kJ/kg per bar, is left out. */
function liquidEnthalpyJKg(temperatureK: number): number {
  return saturationState(saturationPressurePa(temperatureK)).liquidEnthalpyJKg;
}

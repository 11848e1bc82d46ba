import type { NetworkFile, PipeRun, RoutePiece } from '@riseback/network';
import { requireBoilingPressure } from '@riseback/steam';
import { atElement } from './element-failure';
import { blankFlow, type FlowAndEnergy, type FlowRecord, type PipeFlow } from './flow-and-energy';
import { handCheckLiftPa } from './hand-check';
import { MarchedPipes } from './marched-pipes';
import type { OperatingNode } from './operating-case';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import { PipeMarcher, type MarchedPipe, type MarchOptions } from './pipe-march';
import { inletNode, outletNode, type ReturnTree } from './return-tree';

/** What stands at each node of the tree above the end of its walk, by index; untouched where no fixed pressure is reached. */
export interface PressureWalk {
  readonly pressurePa: Float64Array;
  readonly staticPa: Float64Array;
  readonly frictionPa: Float64Array;
  readonly flashPa: Float64Array;
  readonly handCheckPa: Float64Array;
  readonly marched: MarchedPipes;
}

/**
 * Pressures from the nodes of fixed pressure up, each pipe once, in the order in which the tree was found: no recursion. Each
 * node's pressure comes up its way out; a chord is marched to the same node for itself, and meets it where its mesh is closed.
 * @throws ElementFailure where a pressure leaves the steam properties
 */
export function pressureWalk(
  file: NetworkFile,
  tree: ReturnTree,
  nodes: readonly OperatingNode[],
  geometries: readonly (PipeGeometry | undefined)[],
  flows: FlowAndEnergy & { readonly ambientEnthalpyJKg: number },
  options: MarchOptions,
): PressureWalk {
  const byNode = (): Float64Array => new Float64Array(tree.nodeCount);
  const [pressurePa, staticPa, frictionPa, flashPa, handCheckPa] = [byNode(), byNode(), byNode(), byNode(), byNode()];
  const marcher = new PipeMarcher(options);
  const marched = new MarchedPipes(file.pipes.length);
  const flow = blankFlow();

  for (const index of tree.downstreamFirst) {
    const end = nodes[index];
    if (end?.kind === 'fixedPressure') {
      standAt(end, index);
    } else {
      walkUpTo(index);
    }
  }
  for (const chord of tree.chords) marchChord(chord);
  return { pressurePa, staticPa, frictionPa, flashPa, handCheckPa, marched };

  function standAt(
    { node, pressurePa: given }: Extract<OperatingNode, { kind: 'fixedPressure' }>,
    index: number,
  ): void {
    pressurePa[index] = given;
    try {
      requireBoilingPressure(given);
    } catch (error) {
      throw atElement('node', node, index, error);
    }
  }

  function walkUpTo(index: number): void {
    const pipeIndex = tree.outPipe[index] as number;
    const geometry = geometries[pipeIndex];
    if (geometry === undefined) return;
    const below = tree.drainsTo[index] as number;
    const pieces = piecesAgainstFlow(geometry.pieces, tree.arrow[pipeIndex] === 1);
    const up = march(pipeIndex, geometry, pieces, below);
    try {
      requireBoilingPressure(up.upstreamPressurePa);
    } catch (error) {
      throw atElement('pipe', file.pipes[pipeIndex] as PipeRun, pipeIndex, error);
    }
    marched.set(pipeIndex, up);
    pressurePa[index] = up.upstreamPressurePa;
    staticPa[index] = (staticPa[below] as number) + up.staticPa;
    frictionPa[index] = (frictionPa[below] as number) + up.frictionPa;
    flashPa[index] = (flashPa[below] as number) + up.flashPa;
    handCheckPa[index] = (handCheckPa[below] as number) + handCheckLiftPa(pieces);
  }

  /** A chord that flows is marched like any pipe; one that stands still holds whatever its ends differ by. */
  function marchChord(chord: number): void {
    const geometry = geometries[chord];
    if (geometry === undefined) return;
    const below = outletNode(tree, chord);
    const pieces = piecesAgainstFlow(geometry.pieces, tree.arrow[chord] === 1);
    const up = march(chord, geometry, pieces, below);
    if (flows.pipeFlowKgS[chord] !== 0) {
      marched.set(chord, up);
      return;
    }
    const upstreamPressurePa = pressurePa[inletNode(tree, chord)] as number;
    marched.set(chord, { ...up, upstreamPressurePa, staticPa: upstreamPressurePa - (pressurePa[below] as number) });
  }

  function march(pipeIndex: number, geometry: PipeGeometry, pieces: readonly RoutePiece[], below: number): MarchedPipe {
    fillFlow(flow, tree, pipeIndex, geometry, flows);
    try {
      return marcher.march(geometry, flow, pieces, pressurePa[below] as number);
    } catch (error) {
      throw atElement('pipe', file.pipes[pipeIndex] as PipeRun, pipeIndex, error);
    }
  }
}

/** What flows into a pipe. */
export function flowInPipe(
  tree: ReturnTree,
  pipe: number,
  geometry: PipeGeometry,
  flows: FlowAndEnergy & { readonly ambientEnthalpyJKg: number },
): PipeFlow {
  const flow = blankFlow();
  fillFlow(flow, tree, pipe, geometry, flows);
  return flow;
}

/** {@link flowInPipe} into a record that the caller keeps, for loops over all pipes. */
export function fillFlow(
  flow: FlowRecord,
  tree: ReturnTree,
  pipe: number,
  geometry: PipeGeometry,
  flows: FlowAndEnergy & { readonly ambientEnthalpyJKg: number },
): void {
  flow.massFlowKgS = flows.pipeFlowKgS[pipe] as number;
  flow.inletEnthalpyJKg = flows.enthalpyJKg[inletNode(tree, pipe)] as number;
  flow.heatLossWM = geometry.heatLossWM;
  flow.ambientEnthalpyJKg = flows.ambientEnthalpyJKg;
}

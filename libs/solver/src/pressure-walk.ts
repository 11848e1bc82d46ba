import type { NetworkFile } from '@riseback/network';
import { saturationState, type SaturationState } from '@riseback/steam';
import { atElement } from './element-failure';
import type { FlowAndEnergy, PipeFlow } from './flow-and-energy';
import { handCheckLiftPa } from './hand-check';
import type { OperatingNode } from './operating-case';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import { PipeMarcher, type MarchedPipe, type MarchOptions } from './pipe-march';
import type { ReturnTree } from './return-tree';

/** What stands at each node of the tree above the end of its walk, by index; untouched where no fixed pressure is reached. */
export interface PressureWalk {
  readonly saturation: readonly (SaturationState | undefined)[];
  readonly pressurePa: Float64Array;
  readonly staticPa: Float64Array;
  readonly frictionPa: Float64Array;
  readonly flashPa: Float64Array;
  readonly handCheckPa: Float64Array;
  /** By pipe. */
  readonly marched: readonly (MarchedPipe | undefined)[];
}

/**
 * Pressures from the nodes of fixed pressure up, each pipe once, in the order in which the tree was found: no recursion.
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
  const saturation: (SaturationState | undefined)[] = new Array<SaturationState | undefined>(tree.nodeCount);
  const marcher = new PipeMarcher(options);
  const marched: (MarchedPipe | undefined)[] = new Array<MarchedPipe | undefined>(file.pipes.length);

  for (const index of tree.downstreamFirst) {
    const end = nodes[index];
    if (end?.kind === 'fixedPressure') {
      standAt(end, index);
    } else {
      walkUpTo(index);
    }
  }
  return { saturation, pressurePa, staticPa, frictionPa, flashPa, handCheckPa, marched };

  function standAt(
    { node, pressurePa: given }: Extract<OperatingNode, { kind: 'fixedPressure' }>,
    index: number,
  ): void {
    pressurePa[index] = given;
    try {
      saturation[index] = saturationState(given);
    } catch (error) {
      throw atElement('node', node, index, error);
    }
  }

  function walkUpTo(index: number): void {
    const pipeIndex = tree.outPipe[index] as number;
    const pipe = file.pipes[pipeIndex];
    const geometry = geometries[pipeIndex];
    if (pipe === undefined || geometry === undefined) return;
    const below = tree.drainsTo[index] as number;
    const pieces = piecesAgainstFlow(geometry.pieces, tree.arrow[pipeIndex] === 1);
    const flow = pipeFlow(index, geometry, flows);
    let up: MarchedPipe;
    try {
      up = marcher.march(geometry, flow, pieces, pressurePa[below] as number);
      saturation[index] = saturationState(up.upstreamPressurePa);
    } catch (error) {
      throw atElement('pipe', pipe, pipeIndex, error);
    }
    marched[pipeIndex] = up;
    pressurePa[index] = up.upstreamPressurePa;
    staticPa[index] = (staticPa[below] as number) + up.staticPa;
    frictionPa[index] = (frictionPa[below] as number) + up.frictionPa;
    flashPa[index] = (flashPa[below] as number) + up.flashPa;
    handCheckPa[index] = (handCheckPa[below] as number) + handCheckLiftPa(pieces);
  }
}

/** The flow in the pipe by which a node drains. */
export function pipeFlow(
  index: number,
  { heatLossWM }: PipeGeometry,
  { massFlowKgS, enthalpyJKg, ambientEnthalpyJKg }: FlowAndEnergy & { readonly ambientEnthalpyJKg: number },
): PipeFlow {
  return {
    massFlowKgS: massFlowKgS[index] as number,
    inletEnthalpyJKg: enthalpyJKg[index] as number,
    heatLossWM,
    ambientEnthalpyJKg,
  };
}

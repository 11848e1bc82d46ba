import type { NetworkFile, PipeRun } from '@riseback/network';
import { NoConvergenceError } from '@riseback/numerics';
import { closeMeshes, FlowCannotLeaveError, type ClosedMeshes } from './close-meshes';
import { ElementFailure } from './element-failure';
import { flowAndEnergy, type ChordFlows, type FlowAndEnergy } from './flow-and-energy';
import { MESH_CLOSED_PA } from './mesh-search';
import type { OperatingNode } from './operating-case';
import type { PipeGeometry } from './pipe-geometry';
import type { MarchOptions } from './pipe-march';
import { pressureWalk, type PressureWalk } from './pressure-walk';
import { inletNode, type ReturnTree } from './return-tree';

/** What stays the same however often a network is solved: in other cases, with other loads, by other methods. */
export interface PreparedNetwork {
  readonly file: NetworkFile;
  readonly geometries: readonly (PipeGeometry | undefined)[];
  readonly tree: ReturnTree;
  readonly ambientEnthalpyJKg: number;
}

/** Flows, enthalpies and pressures everywhere in one state of a network. */
export interface NetworkState {
  /** Each node with the pipe by which it drains in this state. */
  readonly tree: ReturnTree;
  readonly flows: FlowAndEnergy & { readonly ambientEnthalpyJKg: number };
  readonly walk: PressureWalk;
  /** Steps taken to close the meshes; 1 for trees. */
  readonly iterations: number;
}

/**
 * Solves a network with its nodes as they stand in one state: a tree by one walk, meshes by closing them first.
 * @throws ElementFailure where there is no solution
 */
export function networkState(
  prepared: PreparedNetwork,
  nodes: readonly OperatingNode[],
  asked: MarchOptions,
): NetworkState {
  const { file, geometries, ambientEnthalpyJKg } = prepared;
  const { tree, chordFlows, iterations, march } = directed(prepared, nodes, asked);
  const flows = { ...flowAndEnergy(tree, nodes, geometries, ambientEnthalpyJKg, chordFlows), ambientEnthalpyJKg };
  const walk = pressureWalk(file, tree, nodes, geometries, flows, march);
  proveClosed(file, { tree, flows, walk, iterations });
  return { tree, flows, walk, iterations };
}

/** The last walk is marched anew: what it gives is what is handed out, so that is where meshes have to be closed. */
function proveClosed({ pipes }: NetworkFile, { tree, flows, walk, iterations }: NetworkState): void {
  for (const chord of tree.chords) {
    if (flows.pipeFlowKgS[chord] === 0) continue;
    const nodePa = walk.pressurePa[inletNode(tree, chord)] as number;
    const openPa = Math.abs(walk.marched.upstreamPressurePaOf(chord) - nodePa);
    if (openPa <= MESH_CLOSED_PA) continue;
    const reason = new NoConvergenceError('the mesh that this pipe closes', iterations, openPa);
    throw new ElementFailure((pipes[chord] as PipeRun).id, `/pipes/${chord}`, reason);
  }
}

function directed(
  prepared: PreparedNetwork,
  nodes: readonly OperatingNode[],
  march: MarchOptions,
): Omit<ClosedMeshes, 'chordFlows'> & { readonly chordFlows?: ChordFlows } {
  const { file, tree } = prepared;
  if (tree.chords.length > 0) return closeMeshes(prepared, nodes, march);
  if (tree.upstreamFirst.length === tree.downstreamFirst.length) return { tree, iterations: 1, march };
  const vessel = tree.vesselOfOutlet.find((_, k) => tree.outPipe[file.nodes.length + k] !== -1) ?? 0;
  const reason = new FlowCannotLeaveError('the liquid of this flash vessel comes back to it');
  throw new ElementFailure((file.nodes[vessel] as { id: string }).id, `/nodes/${vessel}`, reason);
}

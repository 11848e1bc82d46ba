import type { NetworkFile } from '@riseback/network';
import { closeMeshes, FlowCannotLeaveError, type ClosedMeshes } from './close-meshes';
import { ElementFailure } from './element-failure';
import { flowAndEnergy, type ChordFlows, type FlowAndEnergy } from './flow-and-energy';
import type { OperatingNode } from './operating-case';
import type { PipeGeometry } from './pipe-geometry';
import type { MarchOptions } from './pipe-march';
import { pressureWalk, type PressureWalk } from './pressure-walk';
import type { ReturnTree } from './return-tree';

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
  return { tree, flows, walk: pressureWalk(file, tree, nodes, geometries, flows, march), iterations };
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

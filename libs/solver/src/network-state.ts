import type { NetworkFile } from '@riseback/network';
import { flowAndEnergy, type FlowAndEnergy } from './flow-and-energy';
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
 * Solves a network with its nodes as they stand in one state.
 * @throws ElementFailure where there is no solution
 */
export function networkState(
  { file, geometries, tree, ambientEnthalpyJKg }: PreparedNetwork,
  nodes: readonly OperatingNode[],
  march: MarchOptions,
): NetworkState {
  const flows = { ...flowAndEnergy(tree, nodes, geometries, ambientEnthalpyJKg), ambientEnthalpyJKg };
  return { tree, flows, walk: pressureWalk(file, tree, nodes, geometries, flows, march), iterations: 1 };
}

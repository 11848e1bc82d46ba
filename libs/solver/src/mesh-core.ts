import { compareIds, type NetworkFile } from '@riseback/network';
import { saturationState } from '@riseback/steam';
import { atElement } from './element-failure';
import { flowAndEnergy, outletEnthalpyJKg } from './flow-and-energy';
import { pipesAtNode, type MeshNetwork, type VesselLink } from './mesh-network';
import type { PreparedNetwork } from './network-state';
import type { OperatingNode } from './operating-case';
import type { PipeGeometry } from './pipe-geometry';
import type { ReturnTree } from './return-tree';

/** The part of a network whose flows depend on how its meshes divide them, and how it lies in the whole. */
export interface MeshCore {
  readonly network: MeshNetwork;
  /** By index in `network`: the index in the tree, both sorted by id, so that a file's order changes nothing. */
  readonly nodes: readonly number[];
  readonly pipes: readonly number[];
  /** The nodes outside it that drain into it or to a fixed pressure, each after all that drain into it. */
  readonly branches: readonly number[];
}

/**
 * Takes the branches off a network: what hangs on by one pipe sends a known flow on, whatever the rest does. Traps and pumped
 * inlets are among them. Outlets of vessels stay, for a vessel may lie behind a mesh.
 */
export function meshCore(prepared: PreparedNetwork, nodes: readonly OperatingNode[]): MeshCore {
  const { file, tree } = prepared;
  const branches = branchNodes(tree, nodes, (a, b) => compareIds(idOf(file.nodes, a), idOf(file.nodes, b)));
  const isBranch = new Uint8Array(tree.nodeCount);
  for (const node of branches) isBranch[node] = 1;
  const pipes = indexes(file.pipes.length)
    .filter((pipe) => tree.arrow[pipe] !== 0 && !touches(tree, pipe, isBranch))
    .sort((a, b) => compareIds(idOf(file.pipes, a), idOf(file.pipes, b)));
  const inCore = new Uint8Array(tree.nodeCount);
  for (const pipe of pipes) {
    inCore[tree.from[pipe] as number] = 1;
    inCore[tree.to[pipe] as number] = 1;
  }
  tree.vesselOfOutlet.forEach((vessel, k) => {
    if (inCore[file.nodes.length + k] === 1) inCore[vessel] = 1;
  });
  const fileNode = (node: number): number => tree.vesselOfOutlet[node - file.nodes.length] ?? node;
  const coreNodes = indexes(tree.nodeCount)
    .filter((node) => inCore[node] === 1)
    .sort((a, b) => compareIds(idOf(file.nodes, fileNode(a)), idOf(file.nodes, fileNode(b))) || a - b);
  return {
    network: meshNetwork(prepared, nodes, { nodes: coreNodes, pipes, branches }),
    nodes: coreNodes,
    pipes,
    branches,
  };
}

/** Nodes that hang on by one pipe, again and again, each after those that hang on it. */
function branchNodes(
  tree: ReturnTree,
  nodes: readonly OperatingNode[],
  byId: (a: number, b: number) => number,
): number[] {
  const { nodeCount, from, to, arrow, drainsTo, endOfWalk } = tree;
  const at = pipesAtNode(nodeCount, from, to);
  const left = new Int32Array(nodeCount);
  for (let node = 0; node < nodeCount; node++) {
    for (let i = at.first[node] as number; i < (at.first[node + 1] as number); i++) {
      if (arrow[at.pipes[i] as number] !== 0) left[node] = (left[node] as number) + 1;
    }
  }
  const isFree = (node: number): boolean =>
    endOfWalk[node] !== -1 && node < nodes.length && nodes[node]?.kind !== 'fixedPressure';
  const branches = indexes(nodeCount)
    .filter((node) => isFree(node) && left[node] === 1)
    .sort(byId);
  for (let head = 0; head < branches.length; head++) {
    const below = drainsTo[branches[head] as number] as number;
    left[below] = (left[below] as number) - 1;
    if (isFree(below) && left[below] === 1) branches.push(below);
  }
  return branches;
}

function meshNetwork(
  { file, tree, geometries, ambientEnthalpyJKg }: PreparedNetwork,
  nodes: readonly OperatingNode[],
  core: Omit<MeshCore, 'network'>,
): MeshNetwork {
  const coreIndex = new Int32Array(tree.nodeCount).fill(-1);
  core.nodes.forEach((node, i) => (coreIndex[node] = i));
  const pipeIndex = new Map(core.pipes.map((pipe, i) => [pipe, i]));
  const fixedPressurePa = Float64Array.from(core.nodes, (node) => {
    const operating = nodes[node];
    return operating?.kind === 'fixedPressure' ? operating.pressurePa : NaN;
  });
  const end = (ends: Int32Array): Int32Array =>
    Int32Array.from(core.pipes, (pipe) => coreIndex[ends[pipe] as number] as number);
  const to = end(tree.to);
  const isForcedBack = (pipe: number): boolean => tree.arrow[pipe] === -1;
  return {
    nodeCount: core.nodes.length,
    from: end(tree.from),
    to,
    oneWay: Uint8Array.from(core.pipes, (pipe, i) => {
      const giving = !Number.isNaN(fixedPressurePa[to[i] as number] as number);
      return giving || (file.pipes[pipe]?.checkValve === true && !isForcedBack(pipe)) ? 1 : 0;
    }),
    fixedPressurePa,
    ...inflows(),
    vesselLinks: core.nodes.flatMap((node, outlet) => vesselLink(node, outlet)),
    startWayOut: Int32Array.from(core.nodes, (node) => pipeIndex.get(tree.outPipe[node] as number) ?? -1),
    startOrder: tree.downstreamFirst
      .filter((node) => coreIndex[node] !== -1)
      .map((node) => coreIndex[node] as number)
      .reverse(),
    ambientEnthalpyJKg,
  };

  /** What the branches bring, worked out once. */
  function inflows(): Pick<MeshNetwork, 'inflowKgS' | 'inflowW'> {
    const inflowKgS = new Float64Array(core.nodes.length);
    const inflowW = new Float64Array(core.nodes.length);
    const branchTree = { ...tree, upstreamFirst: core.branches, chords: [] };
    const { enthalpyJKg, pipeFlowKgS } = flowAndEnergy(branchTree, nodes, geometries, ambientEnthalpyJKg);
    for (const node of core.branches) {
      const below = coreIndex[tree.drainsTo[node] as number] as number;
      const pipe = tree.outPipe[node] as number;
      if (below === -1) continue;
      const flow = pipeFlowKgS[pipe] as number;
      const geometry = geometries[pipe] as PipeGeometry;
      const h = outletEnthalpyJKg(geometry, flow, enthalpyJKg[node] as number, ambientEnthalpyJKg);
      inflowKgS[below] = (inflowKgS[below] as number) + flow;
      inflowW[below] = (inflowW[below] as number) + flow * h;
    }
    return { inflowKgS, inflowW };
  }

  function vesselLink(node: number, outlet: number): VesselLink[] {
    const vessel = tree.vesselOfOutlet[node - file.nodes.length];
    if (vessel === undefined) return [];
    const inCore = coreIndex[vessel] as number;
    try {
      const { liquidEnthalpyJKg, vapourEnthalpyJKg } = saturationState(fixedPressurePa[inCore] as number);
      return [{ vessel: inCore, outlet, liquidEnthalpyJKg, vapourEnthalpyJKg }];
    } catch (error) {
      throw atElement('node', file.nodes[vessel] as { id: string }, vessel, error);
    }
  }
}

function touches({ from, to }: ReturnTree, pipe: number, isBranch: Uint8Array): boolean {
  return isBranch[from[pipe] as number] === 1 || isBranch[to[pipe] as number] === 1;
}

function indexes(count: number): number[] {
  return Array.from({ length: count }, (_, i) => i);
}

function idOf(elements: NetworkFile['nodes'] | NetworkFile['pipes'], index: number): string {
  return (elements[index] as { readonly id: string }).id;
}

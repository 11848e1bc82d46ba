import { compareIds, type NetworkFile, type PipeEnds } from '@riseback/network';
import { pipesAtNode } from './mesh-network';

/**
 * The network as trees that drain to nodes of fixed pressure (receivers and flash vessels), by index in the file's order, and the
 * chords that make meshes of them.
 * A flash vessel stands twice: as the end of what drains into it, and after all file nodes as the source of its leaving pipe.
 */
export interface ReturnTree {
  /** File nodes and vessel outlets together. */
  readonly nodeCount: number;
  /** By pipe: its ends, −1 where it is as if not there. What leaves a vessel starts at its outlet. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  /** Nodes that reach a fixed pressure, each after the nodes it drains to. */
  readonly downstreamFirst: readonly number[];
  /** The same nodes, each after all that drain into it, vessels before what they feed; empty where vessels feed each other. */
  readonly upstreamFirst: readonly number[];
  /** The pipe by which a node drains, that of its largest outflow; −1 at the end of a walk and where nothing is reached. */
  readonly outPipe: Int32Array;
  /** The node it drains to; −1 likewise. */
  readonly drainsTo: Int32Array;
  /** The node of fixed pressure at the end of the walk, −1 where there is none. */
  readonly endOfWalk: Int32Array;
  /** By pipe: 1 where the flow runs with the arrow, −1 against it, 0 where it leads to no fixed pressure. */
  readonly arrow: Int8Array;
  /** Pipes that are nobody's way out, by id: each closes a loop, or joins what drains to two fixed pressures. */
  readonly chords: readonly number[];
  /** By vessel outlet (index less the number of file nodes): the vessel. */
  readonly vesselOfOutlet: readonly number[];
  /** By file node: the outlet of a vessel, −1 elsewhere. */
  readonly outletOfVessel: Int32Array;
}

/** The node at which a pipe's flow enters it. */
export function inletNode({ arrow, from, to }: ReturnTree, pipe: number): number {
  return (arrow[pipe] === -1 ? to : from)[pipe] as number;
}

/** The node at which it leaves. */
export function outletNode({ arrow, from, to }: ReturnTree, pipe: number): number {
  return (arrow[pipe] === -1 ? from : to)[pipe] as number;
}

/**
 * Finds the trees, in time linear in nodes and pipes. No way leads against a check valve unless there is no other.
 * @param isSound by pipe; one that is not is as if not there. Left out, all are
 */
export function returnTree(file: NetworkFile, ends: PipeEnds, isSound?: readonly boolean[]): ReturnTree {
  const { nodes, pipes } = file;
  const vesselOfOutlet: number[] = [];
  const outletOfVessel = new Int32Array(nodes.length).fill(-1);
  nodes.forEach((node, i) => {
    if (node.kind === 'flashVessel') outletOfVessel[i] = nodes.length + vesselOfOutlet.push(i) - 1;
  });
  const nodeCount = nodes.length + vesselOfOutlet.length;
  const from = new Int32Array(pipes.length).fill(-1);
  const to = new Int32Array(pipes.length).fill(-1);
  for (let i = 0; i < pipes.length; i++) {
    const [start, end] = [ends.from[i] as number, ends.to[i] as number];
    if (isSound?.[i] === false || start === -1 || end === -1) continue;
    const outlet = outletOfVessel[start] as number;
    from[i] = outlet === -1 ? start : outlet;
    to[i] = end;
  }
  const at = pipesAtNode(nodeCount, from, to);
  // flows are summed in the order of the pipes' ids, so that the file's order changes no result, not even by rounding
  const byPipeId = (a: number, b: number): number => compareIds(idOf(pipes, a), idOf(pipes, b));
  for (let node = 0; node < nodeCount; node++) {
    sortStretch(at.pipes, at.first[node] as number, at.first[node + 1] as number, byPipeId);
  }
  const outPipe = new Int32Array(nodeCount).fill(-1);
  const drainsTo = new Int32Array(nodeCount).fill(-1);
  const endOfWalk = new Int32Array(nodeCount).fill(-1);
  const arrow = new Int8Array(pipes.length);
  const chords: number[] = [];
  const againstValve: { readonly pipe: number; readonly node: number }[] = [];
  const queue: number[] = [];
  nodes.forEach(({ kind }, i) => {
    if (kind === 'receiver' || kind === 'flashVessel') queue.push(i);
  });
  queue.sort((a, b) => compareIds(idOf(nodes, a), idOf(nodes, b)));
  for (const node of queue) endOfWalk[node] = node;

  // breadth first, all ends at once, so that each node is found from below and the queue is the order of the walk
  let head = 0;
  walkUp();
  for (const { pipe, node } of againstValve) {
    if (arrow[pipe] === 0) reach(pipe, node);
    walkUp();
  }
  return {
    nodeCount,
    from,
    to,
    downstreamFirst: queue,
    upstreamFirst: vesselsInOrder(queue, endOfWalk, vesselOfOutlet, nodes.length),
    outPipe,
    drainsTo,
    endOfWalk,
    arrow,
    chords: chords.sort(byPipeId),
    vesselOfOutlet,
    outletOfVessel,
  };

  function walkUp(): void {
    for (; head < queue.length; head++) {
      const node = queue[head] as number;
      for (let i = at.first[node] as number; i < (at.first[node + 1] as number); i++) {
        const pipe = at.pipes[i] as number;
        if (arrow[pipe] !== 0) continue;
        if (to[pipe] !== node && pipes[pipe]?.checkValve === true) againstValve.push({ pipe, node });
        else reach(pipe, node);
      }
    }
  }

  /** Goes up a pipe from the node that it would drain to. */
  function reach(pipe: number, node: number): void {
    const withArrow = to[pipe] === node;
    const upstream = (withArrow ? from : to)[pipe] as number;
    if (endOfWalk[upstream] !== -1) {
      chords.push(pipe);
      arrow[pipe] = 1;
      return;
    }
    arrow[pipe] = withArrow ? 1 : -1;
    outPipe[upstream] = pipe;
    drainsTo[upstream] = node;
    endOfWalk[upstream] = endOfWalk[node] as number;
    queue.push(upstream);
  }
}

/** Up to so many are put in order one by one; for more the sort of the language is worth its call. */
const FEW = 8;

function sortStretch(list: Int32Array, first: number, end: number, order: (a: number, b: number) => number): void {
  if (end - first > FEW) {
    list.subarray(first, end).sort(order);
    return;
  }
  for (let i = first + 1; i < end; i++) {
    const moving = list[i] as number;
    let to = i;
    for (; to > first && order(list[to - 1] as number, moving) > 0; to--) list[to] = list[to - 1] as number;
    list[to] = moving;
  }
}

function idOf(elements: readonly { readonly id: string }[], index: number): string {
  return (elements[index] as { readonly id: string }).id;
}

/**
 * Each tree turned upstream first, and the trees so ordered that a vessel is full before its outlet is asked for.
 * @returns nothing where vessels feed each other in a circle
 */
function vesselsInOrder(
  downstreamFirst: readonly number[],
  endOfWalk: Int32Array,
  vesselOfOutlet: readonly number[],
  fileNodes: number,
): number[] {
  if (vesselOfOutlet.length === 0) return downstreamFirst.toReversed();
  const treeOf = new Map<number, number[]>();
  const waitingFor = new Map<number, number>();
  const feeds = new Map<number, number[]>();
  for (const node of downstreamFirst) {
    const end = endOfWalk[node] as number;
    const tree = treeOf.get(end);
    if (tree) tree.push(node);
    else treeOf.set(end, [node]);
    if (node < fileNodes) continue;
    const vessel = vesselOfOutlet[node - fileNodes] as number;
    waitingFor.set(end, (waitingFor.get(end) ?? 0) + 1);
    feeds.set(vessel, [...(feeds.get(vessel) ?? []), end]);
  }
  const ready = [...treeOf.keys()].filter((end) => !waitingFor.has(end));
  const ordered: number[] = [];
  for (let head = 0; head < ready.length; head++) {
    const end = ready[head] as number;
    const tree = treeOf.get(end) as number[];
    for (let i = tree.length - 1; i >= 0; i--) ordered.push(tree[i] as number);
    for (const fed of feeds.get(end) ?? []) {
      const waiting = (waitingFor.get(fed) as number) - 1;
      waitingFor.set(fed, waiting);
      if (waiting === 0) ready.push(fed);
    }
  }
  return ordered.length === downstreamFirst.length ? ordered : [];
}

import { compareIds, type NetworkFile } from '@riseback/network';

/** A pipe that closes a loop, or joins two nodes of fixed pressure, so that the network is not a tree. */
export interface TreeBreak {
  readonly pipe: number;
  readonly why: 'loop' | 'parallelReceivers' | 'vesselCycle';
}

/**
 * The network as trees that drain to nodes of fixed pressure (receivers and flash vessels), by index in the file's order.
 * A flash vessel stands twice: as the end of what drains into it, and after all file nodes as the source of its leaving pipe.
 */
export interface ReturnTree {
  /** File nodes and vessel outlets together. */
  readonly nodeCount: number;
  /** Nodes that reach a fixed pressure, each after the node it drains to. */
  readonly downstreamFirst: readonly number[];
  /** The same nodes, each after all that drain into it, vessels before what they feed. */
  readonly upstreamFirst: readonly number[];
  /** The pipe by which a node drains; −1 at the end of a walk and where nothing is reached. */
  readonly outPipe: Int32Array;
  /** The node it drains to; −1 likewise. */
  readonly drainsTo: Int32Array;
  /** The node of fixed pressure at the end of the walk, −1 where there is none. */
  readonly endOfWalk: Int32Array;
  /** By pipe: 1 where the flow runs with the arrow, −1 against it, 0 where it leads to no fixed pressure. */
  readonly arrow: Int8Array;
  /** By vessel outlet (index less the number of file nodes): the vessel. */
  readonly vesselOfOutlet: readonly number[];
  /** By file node: the outlet of a vessel, −1 elsewhere. */
  readonly outletOfVessel: Int32Array;
  readonly breaks: readonly TreeBreak[];
}

/**
 * Finds the trees, in time linear in nodes and pipes.
 * @param isSound by pipe; one that is not is as if not there. Left out, all are
 */
export function returnTree(file: NetworkFile, isSound?: readonly boolean[]): ReturnTree {
  const { nodes, pipes } = file;
  const vesselOfOutlet: number[] = [];
  const outletOfVessel = new Int32Array(nodes.length).fill(-1);
  const indexOf = new Map(nodes.map((node, i) => [node.id, i]));
  nodes.forEach((node, i) => {
    if (node.kind === 'flashVessel') outletOfVessel[i] = nodes.length + vesselOfOutlet.push(i) - 1;
  });
  const nodeCount = nodes.length + vesselOfOutlet.length;

  const ends = pipes.map((pipe, i) =>
    (isSound?.[i] ?? true) ? endsOf(pipe.from, pipe.to, indexOf, outletOfVessel) : undefined,
  );
  const touching = pipesByNode(nodeCount, ends);
  // flows are summed in the order of the pipes' ids, so that the file's order changes no result, not even by rounding
  for (const list of touching) list.sort((a, b) => compareIds(idOf(pipes, a), idOf(pipes, b)));
  const outPipe = new Int32Array(nodeCount).fill(-1);
  const drainsTo = new Int32Array(nodeCount).fill(-1);
  const endOfWalk = new Int32Array(nodeCount).fill(-1);
  const arrow = new Int8Array(pipes.length);
  const breaks: TreeBreak[] = [];
  const fixed = nodes
    .flatMap((node, i) => (node.kind === 'receiver' || node.kind === 'flashVessel' ? [i] : []))
    .sort((a, b) => compareIds(idOf(nodes, a), idOf(nodes, b)));
  for (const node of fixed) endOfWalk[node] = node;

  // breadth first, all ends at once, so that each node is found from below and the queue is the order of the walk
  const queue = [...fixed];
  for (let head = 0; head < queue.length; head++) {
    const node = queue[head] as number;
    for (const pipe of touching[node] as number[]) {
      if (arrow[pipe] !== 0) continue;
      const { from, to } = ends[pipe] as PipeEnds;
      const upstream = from === node ? to : from;
      if (endOfWalk[upstream] !== -1) {
        breaks.push({ pipe, why: endOfWalk[upstream] === endOfWalk[node] ? 'loop' : 'parallelReceivers' });
        arrow[pipe] = 1;
        continue;
      }
      arrow[pipe] = upstream === from ? 1 : -1;
      outPipe[upstream] = pipe;
      drainsTo[upstream] = node;
      endOfWalk[upstream] = endOfWalk[node] as number;
      queue.push(upstream);
    }
  }
  const upstreamFirst = vesselsInOrder(queue, endOfWalk, vesselOfOutlet, nodes.length);
  if (upstreamFirst === undefined) {
    const pipe = vesselOfOutlet.map((_, k) => outPipe[nodes.length + k] as number).find((p) => p !== -1);
    breaks.push({ pipe: pipe ?? 0, why: 'vesselCycle' });
  }
  return {
    nodeCount,
    downstreamFirst: queue,
    upstreamFirst: upstreamFirst ?? [],
    outPipe,
    drainsTo,
    endOfWalk,
    arrow,
    vesselOfOutlet,
    outletOfVessel,
    breaks,
  };
}

function idOf(elements: readonly { readonly id: string }[], index: number): string {
  return (elements[index] as { readonly id: string }).id;
}

interface PipeEnds {
  readonly from: number;
  readonly to: number;
}

/** A pipe that leaves a vessel starts at its outlet; one that enters it, or any other node, ends at the node itself. */
function endsOf(
  from: string,
  to: string,
  indexOf: ReadonlyMap<string, number>,
  outletOfVessel: Int32Array,
): PipeEnds | undefined {
  const start = indexOf.get(from);
  const end = indexOf.get(to);
  if (start === undefined || end === undefined) return undefined;
  const outlet = outletOfVessel[start] as number;
  return { from: outlet === -1 ? start : outlet, to: end };
}

function pipesByNode(nodeCount: number, ends: readonly (PipeEnds | undefined)[]): number[][] {
  const touching = Array.from({ length: nodeCount }, (): number[] => []);
  ends.forEach((end, pipe) => {
    if (end === undefined) return;
    touching[end.from]?.push(pipe);
    touching[end.to]?.push(pipe);
  });
  return touching;
}

/**
 * Each tree turned upstream first, and the trees so ordered that a vessel is full before its outlet is asked for.
 * @returns undefined where vessels feed each other in a circle
 */
function vesselsInOrder(
  downstreamFirst: readonly number[],
  endOfWalk: Int32Array,
  vesselOfOutlet: readonly number[],
  fileNodes: number,
): number[] | undefined {
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
  return ordered.length === downstreamFirst.length ? ordered : undefined;
}

import type { CollectionName, NetworkDocument } from './network-document';
import type { Gauge, NetworkNode, PipeRun } from './network-file';

export type FindingCode =
  | 'noReceiver'
  | 'noSource'
  | 'cutOff'
  | 'loop'
  | 'trapPipes'
  | 'receiverPipes'
  | 'vesselPipes'
  | 'selfPipe'
  | 'zeroLength'
  | 'shorterThanRise'
  | 'routeLength'
  | 'routeRise'
  | 'gaugePastEnd';

/** A sentence as words and SI lengths, so that a screen can show it in the person's units. */
export type FindingText = readonly (string | { readonly quantity: 'length'; readonly si: number })[];

/** Something about the network as drawn that a person should know. An `error` stands in the way of a solve; it never stops a save. */
export interface TopologyFinding {
  readonly code: FindingCode;
  readonly severity: 'error' | 'note';
  /** Absent (null) when the network as a whole is meant. */
  readonly element: { readonly in: CollectionName; readonly id: string } | null;
  /** The element's key at which it can be mended, where there is one. */
  readonly key?: string;
  readonly what: string;
  /** `what` with its numbers apart, where it has any. */
  readonly whatText?: FindingText;
  readonly why: string;
  readonly remedy: string;
}

/** What the plant calls it: the tag, else the id. */
export function nameOf(element: { readonly id: string; readonly tag?: string | undefined }): string {
  return element.tag ?? element.id;
}

/** Whether the pressure is given: condensate ends its way here, and the pipes on both sides are computed apart. */
export function hasFixedPressure(node: NetworkNode): boolean {
  return node.kind === 'receiver' || node.kind === 'flashVessel';
}

/** Whether condensate enters the network here. */
export function isSource(node: NetworkNode): boolean {
  return node.kind === 'trap' || node.kind === 'pumpedInlet';
}

/** What findings look at, be it of a document or of a file. */
export interface DrawnElements {
  readonly nodes: readonly NetworkNode[];
  readonly pipes: readonly PipeRun[];
  readonly gauges: readonly Gauge[];
}

export function elementsOf(document: NetworkDocument): DrawnElements {
  const values = <T>(collection: ReadonlyMap<string, { readonly value: T }>): T[] =>
    Array.from(collection.values(), ({ value }) => value);
  return { nodes: values(document.nodes), pipes: values(document.pipes), gauges: values(document.gauges) };
}

/** A pipe with its two nodes, and their places in the list of nodes. */
export interface PipeEnds {
  readonly pipe: PipeRun;
  readonly from: NetworkNode;
  readonly to: NetworkNode;
  readonly fromIndex: number;
  readonly toIndex: number;
}

/** The pipes with their two nodes, in their order. */
export function pipesWithEnds({ nodes, pipes }: Pick<DrawnElements, 'nodes' | 'pipes'>): PipeEnds[] {
  const indexOf = new Map<string, number>();
  nodes.forEach(({ id }, index) => indexOf.set(id, index));
  const ends: PipeEnds[] = [];
  for (const pipe of pipes) {
    const fromIndex = indexOf.get(pipe.from);
    const toIndex = indexOf.get(pipe.to);
    // references hold in every document; a test may build one that breaks them
    if (fromIndex === undefined || toIndex === undefined) continue;
    ends.push({
      pipe,
      from: nodes[fromIndex] as NetworkNode,
      to: nodes[toIndex] as NetworkNode,
      fromIndex,
      toIndex,
    });
  }
  return ends;
}

/** How many pipes leave and enter each node, and which; a pipe from a node to itself counts at neither. */
export class PipesAtNodes {
  private readonly leavingCounts: Int32Array;
  private readonly enteringCounts: Int32Array;

  constructor(
    nodeCount: number,
    private readonly pipes: readonly PipeEnds[],
  ) {
    this.leavingCounts = new Int32Array(nodeCount);
    this.enteringCounts = new Int32Array(nodeCount);
    for (const { fromIndex, toIndex } of pipes) {
      if (fromIndex === toIndex) continue;
      this.leavingCounts[fromIndex] = this.leavingCount(fromIndex) + 1;
      this.enteringCounts[toIndex] = this.enteringCount(toIndex) + 1;
    }
  }

  leavingCount(index: number): number {
    return this.leavingCounts[index] ?? 0;
  }

  enteringCount(index: number): number {
    return this.enteringCounts[index] ?? 0;
  }

  leaving(index: number): readonly PipeRun[] {
    return this.lists.leaving.get(index) ?? [];
  }

  entering(index: number): readonly PipeRun[] {
    return this.lists.entering.get(index) ?? [];
  }

  private listed: { leaving: Map<number, PipeRun[]>; entering: Map<number, PipeRun[]> } | undefined;

  /** Made when first asked for: a sound network needs the counts alone. */
  private get lists(): { leaving: Map<number, PipeRun[]>; entering: Map<number, PipeRun[]> } {
    if (this.listed !== undefined) return this.listed;
    const [leaving, entering] = [new Map<number, PipeRun[]>(), new Map<number, PipeRun[]>()];
    for (const { pipe, fromIndex, toIndex } of this.pipes) {
      if (fromIndex === toIndex) continue;
      push(leaving, fromIndex, pipe);
      push(entering, toIndex, pipe);
    }
    return (this.listed = { leaving, entering });
  }
}

function push<K, T>(lists: Map<K, T[]>, key: K, item: T): void {
  const list = lists.get(key);
  if (list === undefined) lists.set(key, [item]);
  else list.push(item);
}

/** Sets of things that hang together, by index, joined pair by pair (union-find with path halving; no recursion, any size goes). */
export class JoinedSets {
  private readonly parents: Int32Array;

  constructor(count: number) {
    this.parents = Int32Array.from({ length: count }, (_, index) => index);
  }

  join(a: number, b: number): void {
    this.parents[this.rootOf(a)] = this.rootOf(b);
  }

  areJoined(a: number, b: number): boolean {
    return this.rootOf(a) === this.rootOf(b);
  }

  rootOf(item: number): number {
    const { parents } = this;
    let at = item;
    for (;;) {
      const parent = parents[at] as number;
      if (parent === at) return at;
      const grandparent = parents[parent] as number;
      parents[at] = grandparent;
      at = grandparent;
    }
  }
}

/**
 * What hangs together with a place where condensate ends. Fixed pressures cut the network: whatever enters one ends at the ground,
 * and what leaves a vessel starts there like a trap, joined to nothing else.
 * @returns by node: whether a fixed pressure is reached from it through these pipes
 */
export function groundReached(nodeCount: number, pipes: readonly PipeEnds[]): (index: number) => boolean {
  const ground = nodeCount;
  const sets = new JoinedSets(nodeCount + 1);
  for (const { from, to, fromIndex, toIndex } of pipes) {
    if (from.kind === 'flashVessel') continue;
    sets.join(hasFixedPressure(from) ? ground : fromIndex, hasFixedPressure(to) ? ground : toIndex);
  }
  return (index) => sets.areJoined(index, ground);
}

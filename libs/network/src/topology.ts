import type { CollectionName, NetworkDocument } from './network-document';
import type { Gauge, NetworkNode, PipeRun } from './network-file';
import type { PipeEnds } from './pipe-ends';

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

/** How many pipes leave and enter each node, and which; a pipe from a node to itself counts at neither. */
export class PipesAtNodes {
  private readonly leavingCounts: Int32Array;
  private readonly enteringCounts: Int32Array;

  constructor(
    private readonly elements: Pick<DrawnElements, 'nodes' | 'pipes'>,
    private readonly ends: PipeEnds,
  ) {
    const nodeCount = elements.nodes.length;
    this.leavingCounts = new Int32Array(nodeCount);
    this.enteringCounts = new Int32Array(nodeCount);
    for (let pipe = 0; pipe < elements.pipes.length; pipe++) {
      if (!joinsTwoNodes(ends, pipe)) continue;
      const [from, to] = [ends.from[pipe] as number, ends.to[pipe] as number];
      this.leavingCounts[from] = this.leavingCount(from) + 1;
      this.enteringCounts[to] = this.enteringCount(to) + 1;
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
    this.elements.pipes.forEach((pipe, i) => {
      if (!joinsTwoNodes(this.ends, i)) return;
      push(leaving, this.ends.from[i] as number, pipe);
      push(entering, this.ends.to[i] as number, pipe);
    });
    return (this.listed = { leaving, entering });
  }
}

/** Whether both ends of a pipe are there. References hold in every document; a test may build one that breaks them. */
export function hasBothEnds({ from, to }: PipeEnds, pipe: number): boolean {
  return from[pipe] !== -1 && to[pipe] !== -1;
}

function joinsTwoNodes(ends: PipeEnds, pipe: number): boolean {
  return hasBothEnds(ends, pipe) && ends.from[pipe] !== ends.to[pipe];
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
    this.parents = new Int32Array(count);
    // not Int32Array.from: its callback costs several times as much as the whole loop
    for (let index = 0; index < count; index++) this.parents[index] = index;
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
 * @param isSound by pipe; one that is not joins nothing. Left out, all are
 * @returns by node: whether a fixed pressure is reached from it through these pipes
 */
export function groundReached(
  nodes: readonly NetworkNode[],
  ends: PipeEnds,
  isSound?: readonly boolean[],
): (index: number) => boolean {
  const ground = nodes.length;
  const sets = new JoinedSets(nodes.length + 1);
  const placeOf = (index: number): number => (hasFixedPressure(nodes[index] as NetworkNode) ? ground : index);
  for (let pipe = 0; pipe < ends.from.length; pipe++) {
    if (isSound?.[pipe] === false || !hasBothEnds(ends, pipe)) continue;
    const [from, to] = [ends.from[pipe] as number, ends.to[pipe] as number];
    if (nodes[from]?.kind !== 'flashVessel') sets.join(placeOf(from), placeOf(to));
  }
  return (index) => sets.areJoined(index, ground);
}

import type { CollectionName, NetworkDocument } from './network-document';
import type { NetworkNode, PipeRun } from './network-file';

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

export interface PipeEnds {
  readonly pipe: PipeRun;
  readonly from: NetworkNode;
  readonly to: NetworkNode;
}

/** The pipes with their two nodes, in the order of the document. */
export function pipesWithEnds(document: NetworkDocument): PipeEnds[] {
  const ends: PipeEnds[] = [];
  for (const { value: pipe } of document.pipes.values()) {
    const from = document.nodes.get(pipe.from)?.value;
    const to = document.nodes.get(pipe.to)?.value;
    // references hold in every document; a test may build one that breaks them
    if (from !== undefined && to !== undefined) ends.push({ pipe, from, to });
  }
  return ends;
}

/** Pipes by the node that they leave and by the node that they enter; a pipe from a node to itself counts at neither. */
export interface PipesAtNodes {
  readonly leaving: ReadonlyMap<string, readonly PipeRun[]>;
  readonly entering: ReadonlyMap<string, readonly PipeRun[]>;
}

export function pipesAtNodes(pipes: readonly PipeEnds[]): PipesAtNodes {
  const leaving = new Map<string, PipeRun[]>();
  const entering = new Map<string, PipeRun[]>();
  for (const { pipe } of pipes) {
    if (pipe.from === pipe.to) continue;
    push(leaving, pipe.from, pipe);
    push(entering, pipe.to, pipe);
  }
  return { leaving, entering };
}

function push<T>(lists: Map<string, T[]>, key: string, item: T): void {
  const list = lists.get(key);
  if (list === undefined) lists.set(key, [item]);
  else list.push(item);
}

/** Sets of things that hang together, joined pair by pair (union-find with path halving; no recursion, so any size goes). */
export class JoinedSets {
  private readonly parents = new Map<string, string>();

  /** @returns false when the two hung together before */
  join(a: string, b: string): boolean {
    const [rootA, rootB] = [this.rootOf(a), this.rootOf(b)];
    if (rootA === rootB) return false;
    this.parents.set(rootA, rootB);
    return true;
  }

  areJoined(a: string, b: string): boolean {
    return this.rootOf(a) === this.rootOf(b);
  }

  rootOf(item: string): string {
    let at = item;
    for (;;) {
      const parent = this.parents.get(at);
      if (parent === undefined) return at;
      const grandparent = this.parents.get(parent);
      if (grandparent === undefined) return parent;
      this.parents.set(at, grandparent);
      at = grandparent;
    }
  }
}

/** Stands for all nodes of fixed pressure as places where condensate ends. No element id holds a slash. */
export const GROUND = '/ground';

/**
 * The place that an end of a pipe joins. Fixed pressures cut the network: whatever enters one ends at the ground, and what leaves a
 * vessel starts there like a trap, joined to nothing else (undefined).
 */
export function placeOf(node: NetworkNode, end: 'from' | 'to'): string | undefined {
  if (!hasFixedPressure(node)) return node.id;
  return node.kind === 'flashVessel' && end === 'from' ? undefined : GROUND;
}

/** Joins a pipe's ends. @returns false when they hung together before: the pipe gives a second way */
export function joinEnds(sets: JoinedSets, { from, to }: PipeEnds): boolean {
  const [start, end] = [placeOf(from, 'from'), placeOf(to, 'to')];
  return start === undefined || end === undefined || sets.join(start, end);
}

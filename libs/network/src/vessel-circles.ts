import type { FlashVessel, NetworkNode } from './network-file';
import type { PipeEnds } from './pipe-ends';
import { hasBothEnds, hasFixedPressure, JoinedSets } from './topology';

/**
 * Flash vessels whose own liquid comes back to them, over other vessels or directly, and can go nowhere else. Where a part leads to
 * a receiver as well, the solver finds out which way the liquid takes.
 *
 * A graph of vessels and of the parts between fixed pressures is cleared of all from which a receiver is reached, then trimmed at
 * both ends until only circles (and what lies between two circles) are left: no recursion, linear in the pipes.
 */
export function vesselsInCircles(nodes: readonly NetworkNode[], ends: PipeEnds): FlashVessel[] {
  if (!nodes.some(({ kind }) => kind === 'flashVessel')) return [];
  const pipes = joints(nodes, ends);
  const parts = new JoinedSets(nodes.length);
  for (const { from, to, fromIndex, toIndex } of pipes) {
    if (!hasFixedPressure(from) && !hasFixedPressure(to)) parts.join(fromIndex, toIndex);
  }

  const onwards = new Map<string, string[]>();
  const backwards = new Map<string, string[]>();
  const vessels = new Map<string, FlashVessel>();
  const drained: string[] = [];
  for (const { from, to, fromIndex, toIndex } of pipes) {
    for (const node of [from, to]) if (node.kind === 'flashVessel') vessels.set(node.id, node);
    if (from.id === to.id || (!hasFixedPressure(from) && !hasFixedPressure(to))) continue;
    if (from.kind === 'receiver') continue;
    const start = from.kind === 'flashVessel' ? from.id : partOf(parts, fromIndex);
    const end = hasFixedPressure(to) ? to.id : partOf(parts, toIndex);
    if (to.kind === 'receiver') drained.push(to.id);
    link(onwards, start, end);
    link(backwards, end, start);
  }
  const left = new Set([...onwards.keys(), ...backwards.keys()]);
  clear(left, drained, backwards);
  trim(left, onwards, backwards);
  trim(left, backwards, onwards);
  return [...vessels.values()].filter(({ id }) => left.has(id));
}

interface Joint {
  readonly from: NetworkNode;
  readonly to: NetworkNode;
  readonly fromIndex: number;
  readonly toIndex: number;
}

function joints(nodes: readonly NetworkNode[], ends: PipeEnds): Joint[] {
  return Array.from(ends.from, (fromIndex, pipe) => ({ fromIndex, toIndex: ends.to[pipe] as number, pipe }))
    .filter(({ pipe }) => hasBothEnds(ends, pipe))
    .map(({ fromIndex, toIndex }) => ({
      from: nodes[fromIndex] as NetworkNode,
      to: nodes[toIndex] as NetworkNode,
      fromIndex,
      toIndex,
    }));
}

/** No id holds a slash, so that a part is never taken for a vessel. */
function partOf(parts: JoinedSets, node: number): string {
  return `part/${parts.rootOf(node)}`;
}

function link(links: Map<string, string[]>, a: string, b: string): void {
  const list = links.get(a);
  if (list === undefined) links.set(a, [b]);
  else list.push(b);
}

/** Takes away all that leads to one of the ends. */
function clear(left: Set<string>, ends: string[], backwards: ReadonlyMap<string, readonly string[]>): void {
  for (let item = ends.pop(); item !== undefined; item = ends.pop()) {
    if (left.delete(item)) ends.push(...(backwards.get(item) ?? []));
  }
}

/** Takes away, again and again, what nothing leads into. */
function trim(
  left: Set<string>,
  onwards: ReadonlyMap<string, readonly string[]>,
  backwards: ReadonlyMap<string, readonly string[]>,
): void {
  const waiting = new Map<string, number>();
  const ready: string[] = [];
  for (const item of left) {
    const count = (backwards.get(item) ?? []).filter((before) => left.has(before)).length;
    waiting.set(item, count);
    if (count === 0) ready.push(item);
  }
  for (let item = ready.pop(); item !== undefined; item = ready.pop()) {
    left.delete(item);
    for (const after of onwards.get(item) ?? []) {
      const count = (waiting.get(after) ?? 0) - 1;
      waiting.set(after, count);
      if (count === 0) ready.push(after);
    }
  }
}

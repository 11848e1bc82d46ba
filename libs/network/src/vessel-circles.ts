import type { FlashVessel } from './network-file';
import { hasFixedPressure, JoinedSets, type PipeEnds } from './topology';

/**
 * Flash vessels whose own liquid comes back to them, over other vessels or directly.
 *
 * A graph of vessels and of the parts between fixed pressures is trimmed at both ends until only circles (and what lies between
 * two circles) are left: no recursion, linear in the pipes.
 */
export function vesselsInCircles(pipes: readonly PipeEnds[]): FlashVessel[] {
  const parts = new JoinedSets();
  for (const { from, to } of pipes) if (!hasFixedPressure(from) && !hasFixedPressure(to)) parts.join(from.id, to.id);

  const onwards = new Map<string, string[]>();
  const backwards = new Map<string, string[]>();
  const vessels = new Map<string, FlashVessel>();
  for (const { from, to } of pipes) {
    for (const node of [from, to]) if (node.kind === 'flashVessel') vessels.set(node.id, node);
    if (from.id === to.id || (from.kind !== 'flashVessel' && to.kind !== 'flashVessel')) continue;
    if (from.kind === 'receiver' || to.kind === 'receiver') continue;
    const start = from.kind === 'flashVessel' ? from.id : partOf(parts, from.id);
    const end = to.kind === 'flashVessel' ? to.id : partOf(parts, to.id);
    link(onwards, start, end);
    link(backwards, end, start);
  }
  const left = new Set([...onwards.keys(), ...backwards.keys()]);
  trim(left, onwards, backwards);
  trim(left, backwards, onwards);
  return [...vessels.values()].filter(({ id }) => left.has(id));
}

/** No id holds a slash, so that a part is never taken for a vessel. */
function partOf(parts: JoinedSets, nodeId: string): string {
  return `part/${parts.rootOf(nodeId)}`;
}

function link(links: Map<string, string[]>, a: string, b: string): void {
  const list = links.get(a);
  if (list === undefined) links.set(a, [b]);
  else list.push(b);
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

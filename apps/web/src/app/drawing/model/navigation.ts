import type { Position } from '@riseback/network';
import type { DrawnGauge } from './drawn-gauges';
import type { DrawnNetwork } from './drawn-network';

export type Direction = 'left' | 'right' | 'up' | 'down';

/** What the keyboard goes about in: the drawing and, where it has them, its gauges. */
export interface Walked extends DrawnNetwork {
  readonly gauges?: ReadonlyMap<string, DrawnGauge>;
}

interface Place {
  readonly id: string;
  readonly at: Position;
}

/** Which pipes carry their flow against their arrow, as the solver found it. */
export type Reversed = (pipeId: string) => boolean;

/** Every element with the place where it is focused. */
export function places({ nodes, pipes, gauges }: Walked): Place[] {
  return [...nodes.values(), ...pipes.values(), ...(gauges?.values() ?? [])];
}

/**
 * The nearest element within 45 degrees of a direction; equal distances go to the lower id.
 * @returns undefined when nothing lies that way
 */
export function nearestInDirection(network: Walked, fromId: string, direction: Direction): string | undefined {
  const from = placeOf(network, fromId);
  if (from === undefined) return undefined;
  let best: { id: string; distance: number } | undefined;
  for (const { id, at } of places(network)) {
    if (id === fromId) continue;
    const { ahead, aside } = resolve({ x: at.x - from.x, y: at.y - from.y }, direction);
    if (ahead <= 0 || Math.abs(aside) > ahead) continue;
    const distance = Math.hypot(ahead, aside);
    if (best === undefined || distance < best.distance || (distance === best.distance && id < best.id))
      best = { id, distance };
  }
  return best?.id;
}

/** With the flow: from a node to the pipe that drains it, from a pipe to the node it drains to. */
export function downstreamOf(network: Walked, id: string, reversed: Reversed): string | undefined {
  const tapped = tappedBy(network, id);
  if (tapped !== undefined) return tapped;
  const drawn = network.pipes.get(id);
  if (drawn !== undefined) return reversed(id) ? drawn.pipe.from : drawn.pipe.to;
  return drainingPipes(network, id, reversed)[0];
}

/** Against the flow: from a node to the first pipe entering it, from a pipe to the node it comes from. */
export function upstreamOf(network: Walked, id: string, reversed: Reversed): string | undefined {
  const tapped = tappedBy(network, id);
  if (tapped !== undefined) return tapped;
  const drawn = network.pipes.get(id);
  if (drawn !== undefined) return reversed(id) ? drawn.pipe.to : drawn.pipe.from;
  return feedingPipes(network, id, reversed)[0];
}

/** From one pipe entering a node to the next one, round and round; from a node to the first. */
export function nextEntering(network: Walked, id: string, reversed: Reversed): string | undefined {
  const node = network.pipes.has(id) ? downstreamOf(network, id, reversed) : id;
  if (node === undefined) return undefined;
  const feeding = feedingPipes(network, node, reversed);
  return feeding[(feeding.indexOf(id) + 1) % feeding.length];
}

/** The node of fixed pressure at the end of the walk from an element; the network's first receiver where the walk ends before one. */
export function endOfWalk(network: Walked, id: string | undefined, reversed: Reversed): string | undefined {
  const seen = new Set<string>();
  let here = id;
  while (here !== undefined && !seen.has(here)) {
    seen.add(here);
    const kind = network.nodes.get(here)?.node.kind;
    if (kind === 'receiver' || (kind === 'flashVessel' && here !== id)) return here;
    here = downstreamOf(network, here, reversed);
  }
  return [...network.nodes.values()].find(({ node }) => node.kind === 'receiver')?.id;
}

/** A trap upstream of an element, the nearest by steps; the network's first trap where none feeds it. */
export function trapAbove(network: Walked, id: string | undefined, reversed: Reversed): string | undefined {
  const queue = id === undefined ? [] : [id];
  const seen = new Set(queue);
  for (let here = queue.shift(); here !== undefined; here = queue.shift()) {
    if (network.nodes.get(here)?.node.kind === 'trap') return here;
    const above =
      network.pipes.has(here) || network.gauges?.has(here) === true
        ? [upstreamOf(network, here, reversed)]
        : feedingPipes(network, here, reversed);
    for (const next of above) {
      if (next === undefined || seen.has(next)) continue;
      seen.add(next);
      queue.push(next);
    }
  }
  return [...network.nodes.values()].find(({ node }) => node.kind === 'trap')?.id;
}

/** The element named by a tag, or the first whose tag or id starts with what was typed. Letters' case does not matter. */
export function findByTag(
  elements: Iterable<{ id: string; tag?: string | undefined }>,
  typed: string,
): string | undefined {
  const wanted = typed.trim().toLowerCase();
  if (wanted === '') return undefined;
  let starting: string | undefined;
  for (const { id, tag } of elements) {
    const names = [tag, id].flatMap((name) => (name === undefined ? [] : [name.toLowerCase()]));
    if (names.includes(wanted)) return id;
    if (starting === undefined && names.some((name) => name.startsWith(wanted))) starting = id;
  }
  return starting;
}

export function placeOf({ nodes, pipes, gauges }: Walked, id: string): Position | undefined {
  return (nodes.get(id) ?? pipes.get(id) ?? gauges?.get(id))?.at;
}

/** From a gauge, with the flow or against it, the keyboard goes to what it taps. */
function tappedBy({ gauges }: Walked, id: string): string | undefined {
  const gauge = gauges?.get(id)?.gauge;
  return gauge?.node ?? gauge?.pipe;
}

function drainingPipes({ leaving, entering }: DrawnNetwork, node: string, reversed: Reversed): string[] {
  return [
    ...(leaving.get(node) ?? []).filter((pipe) => !reversed(pipe)),
    ...(entering.get(node) ?? []).filter(reversed),
  ];
}

function feedingPipes({ leaving, entering }: DrawnNetwork, node: string, reversed: Reversed): string[] {
  return [
    ...(entering.get(node) ?? []).filter((pipe) => !reversed(pipe)),
    ...(leaving.get(node) ?? []).filter(reversed),
  ];
}

function resolve({ x, y }: Position, direction: Direction): { ahead: number; aside: number } {
  switch (direction) {
    case 'right':
      return { ahead: x, aside: y };
    case 'left':
      return { ahead: -x, aside: y };
    case 'down':
      return { ahead: y, aside: x };
    case 'up':
      return { ahead: -y, aside: x };
  }
}

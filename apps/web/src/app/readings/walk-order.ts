import { type Gauge, inOrder, type NetworkDocument } from '@riseback/network';

/**
 * The gauges in the order in which one walks past them: area by area, within an area along the flow from the far end to the vessel, so
 * that the one next to a trap comes before the one on the header that it joins. Retired gauges are not read.
 */
export function walkOrder(document: NetworkDocument): readonly Gauge[] {
  const remaining = pipesToGo(document);
  const areas = areaOrder(document);
  return inOrder(document.gauges)
    .flatMap(([, { value }]) => (value.retired ? [] : [value]))
    .map((gauge) => ({
      gauge,
      area: areas.indexOf(areaOf(document, gauge)),
      toGoM: distanceToGoM(document, gauge, remaining),
    }))
    .sort((a, b) => a.area - b.area || b.toGoM - a.toGoM)
    .map(({ gauge }) => gauge);
}

/** The area of a gauge's element; '' where it has none. A pipe lies where it starts. */
export function areaOf(document: NetworkDocument, gauge: Gauge): string {
  const pipe = document.pipes.get(gauge.pipe ?? '')?.value;
  return document.nodes.get(gauge.node ?? pipe?.from ?? '')?.value.area ?? '';
}

/** The person's own order first; what it does not name follows in ours. */
export function inOwnOrder<T extends { readonly gauge: { readonly id: string } }>(
  cards: readonly T[],
  own: readonly string[],
): readonly T[] {
  const named = own.flatMap((id) => cards.find(({ gauge }) => gauge.id === id) ?? []);
  return [...named, ...cards.filter((card) => !named.includes(card))];
}

/** Areas as the file first names them; those without one last. */
function areaOrder(document: NetworkDocument): readonly string[] {
  const named = inOrder(document.nodes).flatMap(([, { value }]) => value.area ?? []);
  return [...new Set(named), ''];
}

function distanceToGoM(document: NetworkDocument, gauge: Gauge, remaining: ReadonlyMap<string, number>): number {
  const pipe = document.pipes.get(gauge.pipe ?? '')?.value;
  if (pipe === undefined) return remaining.get(gauge.node ?? '') ?? 0;
  return (remaining.get(pipe.to) ?? 0) + pipe.lengthM - (gauge.distanceM ?? 0);
}

/** Metres of pipe from each node down to where nothing leaves, by the shortest way; a loop does not catch it. */
function pipesToGo(document: NetworkDocument): ReadonlyMap<string, number> {
  const pipes = [...document.pipes.values()].map(({ value }) => value);
  const entering = new Map<string, typeof pipes>();
  for (const pipe of pipes) entering.set(pipe.to, [...(entering.get(pipe.to) ?? []), pipe]);
  const leaves = new Set(pipes.map(({ from }) => from));
  const toGo = new Map<string, number>();
  const front: { readonly id: string; readonly toGoM: number }[] = [...document.nodes.keys()]
    .filter((id) => !leaves.has(id))
    .map((id) => ({ id, toGoM: 0 }));
  for (let at = front.shift(); at !== undefined; at = front.shift()) {
    if ((toGo.get(at.id) ?? Infinity) <= at.toGoM) continue;
    toGo.set(at.id, at.toGoM);
    for (const { from, lengthM } of entering.get(at.id) ?? []) front.push({ id: from, toGoM: at.toGoM + lengthM });
  }
  return toGo;
}

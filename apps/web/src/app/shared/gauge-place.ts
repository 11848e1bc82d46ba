import { type EditOp, type Gauge, inOrder, type NetworkDocument, setOp } from '@riseback/network';
import { nameOf } from './element-words';

/** Where a gauge may be put: everything that has a name people use. */
export function gaugePlaces(document: NetworkDocument): string[] {
  return [...inOrder(document.nodes), ...inOrder(document.pipes)].map(([, { value }]) => nameOf(value));
}

/** What a gauge taps, by the name that people use. */
export function gaugePlaceName({ node, pipe }: Pick<Gauge, 'node' | 'pipe'>, document: NetworkDocument): string {
  const element = document.nodes.get(node ?? '')?.value ?? document.pipes.get(pipe ?? '')?.value;
  return element === undefined ? (node ?? pipe ?? '') : nameOf(element);
}

/** The node or pipe that a text names, by tag before id, nodes before pipes. */
export function findPlace(
  text: string,
  { nodes, pipes }: NetworkDocument,
): { readonly node: string } | { readonly pipe: string } | undefined {
  const wanted = text.trim().toLowerCase();
  const isTag = ({ tag }: { readonly tag?: string | undefined }): boolean => tag?.toLowerCase() === wanted;
  const node = inOrder(nodes).find(([, { value }]) => isTag(value))?.[0];
  if (node !== undefined) return { node };
  const pipe = inOrder(pipes).find(([, { value }]) => isTag(value))?.[0];
  if (pipe !== undefined) return { pipe };
  const isId = (id: string): boolean => id.toLowerCase() === wanted;
  const byId = { node: [...nodes.keys()].find(isId), pipe: [...pipes.keys()].find(isId) };
  if (byId.node !== undefined) return { node: byId.node };
  return byId.pipe === undefined ? undefined : { pipe: byId.pipe };
}

/** A gauge stands at a node or some way along a pipe, so three keys change in one edit; a reason where nothing has that name. */
export function gaugePlaceOps(
  text: string,
  { id, distanceM, pipe }: Pick<Gauge, 'id' | 'distanceM' | 'pipe'>,
  document: NetworkDocument,
): { readonly ok: true; readonly ops: EditOp[] } | { readonly ok: false; readonly reason: string } {
  const place = findPlace(text, document);
  if (place === undefined)
    return { ok: false, reason: `Nothing in this network is called ${text}. Type the tag of an element or a pipe.` };
  const onPipe = 'pipe' in place ? place.pipe : undefined;
  return {
    ok: true,
    ops: [
      setOp(document, 'gauges', id, 'node', 'node' in place ? place.node : undefined),
      setOp(document, 'gauges', id, 'pipe', onPipe),
      // at the start of another pipe until its place is typed
      setOp(document, 'gauges', id, 'distanceM', onPipe === undefined ? undefined : onPipe === pipe ? distanceM : 0),
    ],
  };
}

import { makeSetOp } from './apply-batch';
import type { EditOp, SetNetworkOp, SetOp } from './edit-batch';
import { COLLECTION_NAMES, type CollectionName, type NetworkDocument, type NetworkSettings } from './network-document';
import { splitOverrideId } from './override-keys';

/** Ids of elements by collection; what is left out is empty. */
export type Selection = { readonly [C in CollectionName]?: Iterable<string> };
export type SelectedIds = { readonly [C in CollectionName]: readonly string[] };

/**
 * Sets a key of an element from what it is now. `to` undefined removes the key (which then takes its default, if it has one).
 * @throws RangeError when the document has no such element
 */
export function setOp(
  document: NetworkDocument,
  collection: CollectionName,
  id: string,
  key: string,
  to: unknown,
): SetOp {
  const element = document[collection].get(id);
  if (element === undefined) throw new RangeError(`setOp: no ${id} in ${collection}`);
  return makeSetOp(collection, id, key, new Map<string, unknown>(Object.entries(element.value)).get(key), to);
}

/** Sets the network's own name, site, method or limits from what they are now. */
export function setNetworkOp<K extends keyof NetworkSettings>(
  document: NetworkDocument,
  key: K,
  to: NetworkSettings[K],
): SetNetworkOp {
  return { op: 'set', in: 'network', key, from: document[key], to };
}

/** A place behind the last element of a collection. */
export function nextOrdinal(document: NetworkDocument, collection: CollectionName): number {
  let next = 0;
  for (const { ordinal } of document[collection].values()) next = Math.max(next, ordinal + 1);
  return next;
}

/**
 * An id that is free in every collection: the prefix and one more than the highest number in use behind it (T3, J12, L40).
 * @param taken ids given out but not in the document yet, when one batch adds several elements
 */
export function newElementId(document: NetworkDocument, prefix: string, taken: Iterable<string> = []): string {
  let highest = 0;
  const count = (id: string): void => {
    const digits = id.startsWith(prefix) ? id.slice(prefix.length) : '';
    // more digits than these are someone's own numbering, and would not count exactly
    if (/^\d{1,9}$/.test(digits)) highest = Math.max(highest, Number(digits));
  };
  for (const collection of COLLECTION_NAMES) for (const id of document[collection].keys()) count(id);
  for (const id of taken) count(id);
  return `${prefix}${highest + 1}`;
}

/** A selection and all that must go along when it is deleted: pipes of its nodes, overrides, gauges. */
export function withDependents(document: NetworkDocument, selection: Selection): SelectedIds {
  const nodes = new Set(selection.nodes);
  const pipes = new Set(selection.pipes);
  const cases = new Set(selection.cases);
  const overrides = new Set(selection.overrides);
  const gauges = new Set(selection.gauges);
  if (nodes.size > 0) {
    for (const [id, { value }] of document.pipes) if (nodes.has(value.from) || nodes.has(value.to)) pipes.add(id);
  }
  if (nodes.size > 0 || cases.size > 0) {
    for (const [id, { value }] of document.overrides) {
      if (nodes.has(value.node) || cases.has(splitOverrideId(id).caseId)) overrides.add(id);
    }
  }
  for (const [id, { value }] of document.gauges) {
    if (value.node !== undefined && nodes.has(value.node)) gauges.add(id);
    if (value.pipe !== undefined && pipes.has(value.pipe)) gauges.add(id);
  }
  return {
    nodes: [...nodes],
    pipes: [...pipes],
    trapModels: [...new Set(selection.trapModels)],
    cases: [...cases],
    overrides: [...overrides],
    gauges: [...gauges],
  };
}

/** The operations that delete a selection with its dependents. A trap outlives its model and merely forgets it. */
export function removalOps(document: NetworkDocument, selection: Selection): EditOp[] {
  const going = withDependents(document, selection);
  const models = new Set(going.trapModels);
  const nodes = new Set(going.nodes);
  const ops: EditOp[] = [];
  if (models.size > 0) {
    for (const [id, { value }] of document.nodes) {
      if (value.kind === 'trap' && value.trapModel !== undefined && models.has(value.trapModel) && !nodes.has(id)) {
        ops.push(setOp(document, 'nodes', id, 'trapModel', undefined));
      }
    }
  }
  for (const collection of ['overrides', 'gauges', 'pipes', 'nodes', 'trapModels', 'cases'] as const) {
    for (const id of going[collection]) ops.push({ op: 'remove', in: collection, id });
  }
  return ops;
}

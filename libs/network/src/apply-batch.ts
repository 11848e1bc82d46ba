import { elementError, type BatchError, type Draft, type Drafts } from './batch-draft';
import { referenceErrors } from './batch-references';
import type { AddOp, EditOp, RemoveOp, SetNetworkOp, SetOp } from './edit-batch';
import { jsonEqual } from './json-value';
import { mistakesOf, quoted } from './mistakes';
import {
  COLLECTION_NAMES,
  type CollectionName,
  type Collections,
  type NetworkDocument,
  type NetworkSettings,
  type Placed,
} from './network-document';
import { FileNode, Gauge, NetworkFileShape, OperatingCase, Override, PipeRun, TrapModel } from './network-file';

export type AppliedBatch =
  | { readonly ok: true; readonly document: NetworkDocument; readonly inverse: EditOp[] }
  | { readonly ok: false; readonly errors: BatchError[] };

type SettingsDraft = Map<keyof NetworkSettings, { value: unknown; opIndex: number }>;

/** A key that is left out takes its default, in an edit as in a file. */
const SCHEMAS = {
  nodes: FileNode,
  pipes: PipeRun,
  trapModels: TrapModel,
  cases: OperatingCase,
  overrides: Override,
  gauges: Gauge,
} as const;

/**
 * The one reducer: applies a batch as a whole, or refuses it as a whole with the reasons.
 *
 * Elements and references are checked once, after the last operation, so that a batch may pass through states that would not do by
 * themselves (a receiver from a pressure to vented, a pipe added before its node). Only *shape* is kept here; whether the network
 * can be solved is a finding. Costs what the touched collections cost to copy, not what the network costs to check.
 *
 * @returns the new document and the exact inverse: applied to it, the inverse gives back the first document, ordinals included
 */
export function applyBatch(document: NetworkDocument, ops: readonly EditOp[]): AppliedBatch {
  const drafts: Drafts = {
    nodes: new Map(),
    pipes: new Map(),
    trapModels: new Map(),
    cases: new Map(),
    overrides: new Map(),
    gauges: new Map(),
  };
  const settings: SettingsDraft = new Map();
  const refused = ops.flatMap((op, opIndex) => applyOp(document, drafts, settings, op, opIndex) ?? []);
  if (refused.length > 0) return { ok: false, errors: refused };

  const errors: BatchError[] = [];
  const next: NetworkDocument = {
    ...finishSettings(document, settings, errors),
    nodes: finishCollection(document, drafts, 'nodes', errors),
    pipes: finishCollection(document, drafts, 'pipes', errors),
    trapModels: finishCollection(document, drafts, 'trapModels', errors),
    cases: finishCollection(document, drafts, 'cases', errors),
    overrides: finishCollection(document, drafts, 'overrides', errors),
    gauges: finishCollection(document, drafts, 'gauges', errors),
  };
  if (errors.length === 0) errors.push(...referenceErrors(next, drafts));
  if (errors.length > 0) return { ok: false, errors };
  return { ok: true, document: next, inverse: inverseOf(document, next, drafts, settings) };
}

/** The collections that a batch touches, and `network` for the network's own settings. */
export function touchedCollections(ops: readonly EditOp[]): Set<CollectionName | 'network'> {
  return new Set(ops.map((op) => op.in));
}

function applyOp(
  document: NetworkDocument,
  drafts: Drafts,
  settings: SettingsDraft,
  op: EditOp,
  opIndex: number,
): BatchError | undefined {
  switch (op.op) {
    case 'add':
      return add(document, drafts, op, opIndex);
    case 'remove':
      return remove(document, drafts, op, opIndex);
    case 'set':
      return op.in === 'network' ? setSetting(document, settings, op, opIndex) : set(document, drafts, op, opIndex);
  }
}

function draftOf(document: NetworkDocument, drafts: Drafts, collection: CollectionName, id: string): Draft {
  const present = drafts[collection].get(id);
  if (present !== undefined) return present;
  const before = document[collection].get(id);
  const draft: Draft = {
    before,
    ordinal: before?.ordinal ?? 0,
    keys: before === undefined ? undefined : new Map(Object.entries(before.value)),
    lastOp: 0,
    opOfKey: new Map(),
  };
  drafts[collection].set(id, draft);
  return draft;
}

function add(document: NetworkDocument, drafts: Drafts, op: AddOp, opIndex: number): BatchError | undefined {
  const id = op.in === 'overrides' ? op.id : (op.id ?? op.value['id']);
  if (typeof id !== 'string') {
    return {
      opIndex,
      detail: op.in === 'overrides' ? 'An override is added under the id case/node' : 'The element has no id',
    };
  }
  if (op.in !== 'overrides' && op.value['id'] !== id) {
    return { opIndex, element: id, key: 'id', detail: `The operation's id ${quoted(id)} is not that of the element` };
  }
  const draft = draftOf(document, drafts, op.in, id);
  if (draft.keys !== undefined) return { opIndex, element: id, detail: `There already is an element ${quoted(id)}` };
  draft.ordinal = op.ordinal;
  draft.keys = new Map(Object.entries(op.value).filter(([, value]) => value !== undefined));
  draft.opOfKey.clear();
  draft.lastOp = opIndex;
  return undefined;
}

function remove(document: NetworkDocument, drafts: Drafts, op: RemoveOp, opIndex: number): BatchError | undefined {
  const draft = draftOf(document, drafts, op.in, op.id);
  if (draft.keys === undefined) return { opIndex, element: op.id, detail: `There is no element ${quoted(op.id)}` };
  draft.keys = undefined;
  draft.lastOp = opIndex;
  return undefined;
}

function set(document: NetworkDocument, drafts: Drafts, op: SetOp, opIndex: number): BatchError | undefined {
  const place = { opIndex, element: op.id, key: op.key };
  const draft = draftOf(document, drafts, op.in, op.id);
  const { keys } = draft;
  if (keys === undefined) return { ...place, detail: `There is no element ${quoted(op.id)}` };
  if (op.key === 'id' || op.key === 'kind' || (op.in === 'overrides' && op.key === 'node')) {
    return { ...place, detail: `${op.key} is never changed; remove the element and add another` };
  }
  if (!jsonEqual(keys.get(op.key), op.from)) return { ...place, detail: changedMeanwhile(op.key) };
  if (op.to === undefined) keys.delete(op.key);
  else keys.set(op.key, op.to);
  draft.opOfKey.set(op.key, opIndex);
  draft.lastOp = opIndex;
  return undefined;
}

function setSetting(
  document: NetworkDocument,
  settings: SettingsDraft,
  op: SetNetworkOp,
  opIndex: number,
): BatchError | undefined {
  const drafted = settings.get(op.key);
  const present = drafted === undefined ? document[op.key] : drafted.value;
  if (!jsonEqual(present, op.from)) return { opIndex, key: op.key, detail: changedMeanwhile(op.key) };
  settings.set(op.key, { value: op.to, opIndex });
  return undefined;
}

function changedMeanwhile(key: string): string {
  return `${key} no longer has the value that this edit started from`;
}

function finishSettings(document: NetworkDocument, settings: SettingsDraft, errors: BatchError[]): NetworkSettings {
  const { name, site, method, limits } = document;
  const present: NetworkSettings = { name, site, method, limits };
  if (settings.size === 0) return present;
  const next: Record<string, unknown> = { ...present };
  for (const [key, { value, opIndex }] of settings) {
    const read = NetworkFileShape.shape[key].safeParse(value);
    if (read.success) next[key] = read.data;
    else errors.push(...mistakesOf(read.error, value, [key]).map(({ detail }) => ({ opIndex, key, detail })));
  }
  return next as unknown as NetworkSettings;
}

function finishCollection<C extends CollectionName>(
  document: NetworkDocument,
  drafts: Drafts,
  collection: C,
  errors: BatchError[],
): NetworkDocument[C] {
  const present = document[collection];
  if (drafts[collection].size === 0) return present;
  const next = new Map<string, Placed<Collections[CollectionName]>>(present);
  for (const [id, draft] of drafts[collection]) {
    if (draft.keys === undefined) {
      next.delete(id);
      continue;
    }
    const value: unknown = Object.fromEntries(draft.keys);
    const read = SCHEMAS[collection].safeParse(value);
    if (read.success) next.set(id, { ordinal: draft.ordinal, value: read.data });
    else {
      errors.push(
        ...mistakesOf(read.error, value).map(({ pointer, detail }) => elementError(id, draft, keyOf(pointer), detail)),
      );
    }
  }
  // the schema that read each value belongs to C, which the compiler cannot follow through the table
  return next as unknown as NetworkDocument[C];
}

/** The top-level key that a pointer leads into. */
function keyOf(pointer: string): string | undefined {
  return pointer.split('/')[1]?.replaceAll('~1', '/').replaceAll('~0', '~');
}

/**
 * The inverse is made from what is different at the end, not from the operations one by one: it is exact whatever the batch passed
 * through and whatever defaults it filled in, and as short as can be.
 */
function inverseOf(before: NetworkDocument, after: NetworkDocument, drafts: Drafts, settings: SettingsDraft): EditOp[] {
  const removals: EditOp[] = [];
  const additions: EditOp[] = [];
  const changes: EditOp[] = [];
  for (const collection of COLLECTION_NAMES) {
    for (const [id, { before: old }] of drafts[collection]) {
      const current = after[collection].get(id);
      if (old !== undefined && current !== undefined && isSameElement(old, current)) {
        changes.push(...changesBack(collection, id, old.value, current.value));
        continue;
      }
      if (current !== undefined) removals.push({ op: 'remove', in: collection, id });
      if (old !== undefined) {
        const override = collection === 'overrides' ? { id } : {};
        additions.push({ op: 'add', in: collection, ...override, ordinal: old.ordinal, value: { ...old.value } });
      }
    }
  }
  for (const key of settings.keys()) {
    if (!jsonEqual(before[key], after[key])) {
      changes.push({ op: 'set', in: 'network', key, from: after[key], to: before[key] });
    }
  }
  return [...removals, ...additions, ...changes];
}

/** Whether `set` can lead from one to the other: place and kind are given only by `add`. */
function isSameElement(
  old: Placed<Collections[CollectionName]>,
  current: Placed<Collections[CollectionName]>,
): boolean {
  const kind = (value: object): unknown => new Map(Object.entries(value)).get('kind');
  return old.ordinal === current.ordinal && kind(old.value) === kind(current.value);
}

function changesBack(collection: CollectionName, id: string, old: object, current: object): SetOp[] {
  const to = new Map<string, unknown>(Object.entries(old));
  const from = new Map<string, unknown>(Object.entries(current));
  return [...new Set([...to.keys(), ...from.keys()])]
    .filter((key) => !jsonEqual(to.get(key), from.get(key)))
    .map((key) => makeSetOp(collection, id, key, from.get(key), to.get(key)));
}

/** A `set` without the keys `from` or `to` where the element's key is absent. */
export function makeSetOp(collection: CollectionName, id: string, key: string, from: unknown, to: unknown): SetOp {
  return {
    op: 'set',
    in: collection,
    id,
    key,
    ...(from === undefined ? {} : { from }),
    ...(to === undefined ? {} : { to }),
  };
}

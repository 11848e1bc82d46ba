import {
  type AddOp,
  applyBatch,
  type EditBatch,
  type EditOp,
  inOrder,
  jsonEqual,
  type NetworkDocument,
  type RemoveOp,
  type SetNetworkOp,
  withDependents,
} from '@riseback/network';
import { renameInOps, renamesFor } from './conflicting-ids';
import { mergedSettings } from './merged-settings';
import { type Place, placeKey, type Side, sideOf } from './place';
import { placeName } from './place-name';
import { type Touches, touchedPlace } from './touches';

/** Two people changed one thing. `theirs` is what stands in the document; this keeps what it was and what this person wanted. */
export interface Conflict {
  readonly place: Place;
  /** What people call the element, as this person had it. */
  readonly name: string;
  /** Who changed it meanwhile. */
  readonly who: string;
  readonly before: Side;
  readonly mine: Side;
  /** The element as this person had it, and what hung on it: what brings it back where the other removed it. */
  readonly whole: readonly AddOp[];
}

export interface ReplayInput {
  /** What the pending batches were made on. */
  readonly before: NetworkDocument;
  /** The same with what others saved. */
  readonly after: NetworkDocument;
  readonly pending: readonly EditBatch[];
  readonly touches: Touches;
  /** Everyone who saved something meanwhile; said where no one change can be blamed. */
  readonly others: string;
}

export interface Replayed {
  readonly present: NetworkDocument;
  /** What goes out again; a batch of which something was set aside has a new id. */
  readonly pending: readonly EditBatch[];
  readonly conflicts: readonly Conflict[];
  /** What became of each batch, by its old id: its new id and inverse, or null when nothing of it is left. */
  readonly fates: ReadonlyMap<string, BatchFate | null>;
  /** New ids of elements whose ids someone else took at the same time. */
  readonly renamed: ReadonlyMap<string, string>;
}
export interface BatchFate {
  readonly batchId: string;
  readonly inverse: readonly EditOp[];
}

/**
 * Puts a person's pending batches on top of what others saved. What touches other properties is merged; where both changed the
 * same one, or one removed what the other changed, this person's operation is set aside as a conflict and nothing of it is lost.
 */
export function replayOver({ before, after, pending, touches, others }: ReplayInput): Replayed {
  const renamed = renamesFor(before, after, pending);
  const batches = pending.map((batch) => ({ ...batch, ops: renameInOps(batch.ops, renamed) }));
  const aside = new Map<string, AsidePlace>();
  const agreed = new Set<string>();
  const fates = new Map<string, BatchFate | null>();
  const kept: EditBatch[] = [];
  let mine = before;
  let present = after;
  for (const [index, batch] of batches.entries()) {
    const split = splitBatch(batch.ops, { mine, present, touches, aside, agreed });
    mine = split.mine;
    present = split.present;
    const unchanged = jsonEqual(split.ops, pending[index]?.ops);
    const batchId = unchanged ? batch.batchId : crypto.randomUUID();
    if (split.ops.length > 0) kept.push({ ...batch, batchId, ops: split.ops });
    fates.set(batch.batchId, split.ops.length > 0 ? { batchId, inverse: split.inverse } : null);
  }
  const documents = { before, mine, present };
  return { present, pending: kept, conflicts: conflictsOf(aside, documents, others), fates, renamed };
}

/** A person may be asked about one place twice, with the values of two times. */
export function conflictKey({ place, mine }: Conflict): string {
  return `${placeKey(place)} ${JSON.stringify(mine)}`;
}

interface AsidePlace {
  readonly place: Place;
  readonly who: string | undefined;
}

interface SplitState {
  readonly mine: NetworkDocument;
  readonly present: NetworkDocument;
  readonly touches: Touches;
  readonly aside: Map<string, AsidePlace>;
  /** Properties that both set to the same value: what this person does to them next was not done on what the other saved. */
  readonly agreed: Set<string>;
}
interface Split {
  readonly ops: EditOp[];
  readonly inverse: readonly EditOp[];
  readonly mine: NetworkDocument;
  readonly present: NetworkDocument;
}

/** What of one batch still applies; the rest goes to `aside`, unless the other did the very same. */
function splitBatch(given: readonly EditOp[], { mine, present, touches, aside, agreed }: SplitState): Split {
  const own = applyBatch(mine, given);
  if (!own.ok) throw new Error(`A pending edit does not apply: ${own.errors.map(({ detail }) => detail).join('; ')}`);
  const setPlaceAside = (place: Place): void => {
    aside.set(placeKey(place), { place, who: touchedPlace(touches, place, present) });
  };
  const setAside = (op: EditOp): void => setPlaceAside(placeOf(op, present));
  const removals = removalsInDispute(given, mine, present, touches);
  const inQuestion = (op: EditOp): boolean => {
    if (op.op !== 'set' || op.in === 'network') return false;
    const key = placeKey(op);
    return agreed.has(key) || aside.has(key);
  };
  let ops = given
    .flatMap((op) => {
      if (op.op === 'set' && op.in === 'network') {
        const { rest, clashes } = mergedSetting(op, present);
        clashes.forEach(setPlaceAside);
        return rest;
      }
      const rest = inQuestion(op) ? [op] : restated(op, present);
      for (const place of placesLeftToTheirs(op, rest)) agreed.add(placeKey(place));
      return rest;
    })
    .filter((op) => {
      if (inQuestion(op)) {
        setAside(op);
        return false;
      }
      if (op.op !== 'remove' || !removals.all.has(op)) return true;
      if (removals.named.has(op)) setAside(op);
      return false;
    });
  for (let applied = applyBatch(present, ops); ; applied = applyBatch(present, ops)) {
    if (applied.ok) return { ops, inverse: applied.inverse, mine: own.document, present: applied.document };
    const refused = new Set(applied.errors.map(({ opIndex }) => ops[opIndex]));
    for (const op of ops) if (refused.has(op)) setAside(op);
    const rest = ops.filter((op) => !refused.has(op));
    if (rest.length === ops.length) throw new Error('A batch was refused without naming its step');
    ops = rest;
  }
}

/** A change of settings, merged with theirs part by part; a part that both changed stays theirs and is in question. */
function mergedSetting(op: SetNetworkOp, present: NetworkDocument): { rest: EditOp[]; clashes: Place[] } {
  const theirs = present[op.key];
  const { value, clashes } = mergedSettings(op.from, op.to, theirs);
  return {
    rest: jsonEqual(value, theirs) ? [] : [{ ...op, from: theirs, to: value }],
    clashes: clashes.map((path) => ({
      in: 'network',
      id: '',
      key: op.key,
      ...(path.length === 0 ? {} : { path }),
    })),
  };
}

/** The operation said anew for what others left: nothing where they did the same. */
function restated(op: EditOp, present: NetworkDocument): EditOp[] {
  if (op.op === 'remove') return present[op.in].has(op.id) ? [op] : [];
  if (op.op === 'add') {
    const there = op.in === 'overrides' && op.id !== undefined ? present.overrides.get(op.id)?.value : undefined;
    if (there === undefined || op.id === undefined) return [op];
    const id = op.id;
    const values = new Map<string, unknown>(Object.entries(there));
    // two people set values of one case at one element: theirs is there already, so ours are set one by one
    return Object.entries(op.value)
      .filter(([key, value]) => !jsonEqual(values.get(key), value))
      .map(([key, to]) => ({ op: 'set', in: 'overrides', id, key, to }));
  }
  if (op.in === 'network') return [op];
  const side = sideOf(present, op);
  return side.there && jsonEqual(side.value, op.to) && !jsonEqual(op.from, op.to) ? [] : [op];
}

/** The properties that an operation no longer sets since they stand as it wants them. */
function placesLeftToTheirs(op: EditOp, rest: readonly EditOp[]): Place[] {
  if (op.op === 'set' && op.in !== 'network') return rest.length === 0 ? [op] : [];
  const { id } = op.op === 'add' ? op : {};
  if (op.op !== 'add' || op.in !== 'overrides' || id === undefined || rest.includes(op)) return [];
  const left = new Set(rest.map((one) => (one.op === 'set' ? one.key : '')));
  return Object.keys(op.value)
    .filter((key) => !left.has(key))
    .map((key) => ({ in: op.in, id, key }));
}

/**
 * Removals of what others changed meanwhile. A removal that goes along with another's (the pipes of a node) is in dispute with
 * it, and the person is asked once, about the element that was to go.
 */
function removalsInDispute(
  ops: readonly EditOp[],
  mine: NetworkDocument,
  present: NetworkDocument,
  touches: Touches,
): { all: ReadonlySet<EditOp>; named: ReadonlySet<EditOp> } {
  const removals = ops.filter((op): op is RemoveOp => op.op === 'remove');
  const all = new Set<EditOp>();
  const named = new Set<EditOp>();
  if (touches.size === 0) return { all, named };
  const going = removals.map((op) => ({ op, along: withDependents(mine, { [op.in]: [op.id] }) }));
  const ownersOf = (op: RemoveOp) =>
    going.filter((other) => other.op !== op && other.along[op.in].includes(op.id)).map((other) => other.op);
  for (const op of removals) {
    const place = { in: op.in, id: op.id };
    if (!present[op.in].has(op.id) || touchedPlace(touches, place, present) === undefined) continue;
    const owners = ownersOf(op);
    for (const owner of owners.length > 0 ? owners : [op]) named.add(owner);
  }
  for (const { op, along } of going) {
    if (!named.has(op)) continue;
    for (const other of removals) if (other === op || along[other.in].includes(other.id)) all.add(other);
  }
  return { all, named };
}

/** Where an operation acts; on an element that is gone it is about the element. */
function placeOf(op: EditOp, present: NetworkDocument): Place {
  if (op.op === 'remove') return { in: op.in, id: op.id };
  if (op.op === 'add') return { in: op.in, id: op.id ?? String(op.value['id']) };
  if (op.in === 'network') return { in: 'network', id: '', key: op.key };
  return present[op.in].has(op.id) ? { in: op.in, id: op.id, key: op.key } : { in: op.in, id: op.id };
}

interface Documents {
  readonly before: NetworkDocument;
  readonly mine: NetworkDocument;
  readonly present: NetworkDocument;
}

function conflictsOf(aside: ReadonlyMap<string, AsidePlace>, documents: Documents, others: string): Conflict[] {
  const { before, mine, present } = documents;
  return [...aside.values()].flatMap(({ place, who }): Conflict[] => {
    // the whole element is in question already
    if (place.key !== undefined && aside.has(placeKey({ in: place.in, id: place.id }))) return [];
    const wanted = sideOf(mine, place);
    if (jsonEqual(wanted, sideOf(present, place))) return [];
    const name = placeName(place, mine) ?? placeName(place, before) ?? place.id;
    const whole = wanted.there ? wholeOf(place, mine) : [];
    return [{ place, name, who: who ?? others, before: sideOf(before, place), mine: wanted, whole }];
  });
}

/** The element, what it stands on and what hangs on it, as operations that add them. */
function wholeOf(place: Place, mine: NetworkDocument): AddOp[] {
  if (place.in === 'network') return [];
  const wanted = withDependents(mine, { [place.in]: [place.id] });
  const ids = { ...wanted, nodes: new Set(wanted.nodes), trapModels: new Set(wanted.trapModels) };
  const pipes = wanted.pipes.flatMap((id) => mine.pipes.get(id)?.value ?? []);
  if (place.in !== 'nodes') for (const { from, to } of pipes) ids.nodes.add(from).add(to);
  for (const id of ids.nodes) {
    const node = mine.nodes.get(id)?.value;
    if (node?.kind === 'trap' && node.trapModel !== undefined) ids.trapModels.add(node.trapModel);
  }
  return (['trapModels', 'nodes', 'pipes', 'cases', 'overrides', 'gauges'] as const).flatMap((collection) => {
    const chosen = new Set(ids[collection]);
    return inOrder<object>(mine[collection])
      .filter(([id]) => chosen.has(id))
      .map(([id, { ordinal, value }]): AddOp => ({
        op: 'add',
        in: collection,
        ...(collection === 'overrides' ? { id } : {}),
        ordinal,
        value: { ...value },
      }));
  });
}

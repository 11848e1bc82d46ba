import type { SavedBatch } from '@riseback/contracts';
import { type CollectionName, type EditOp, type NetworkDocument, withDependents } from '@riseback/network';
import type { Place } from './place';

/** Who last touched what, other than this tab, and in which version. Keys as `touchKey` makes them. */
export type Touches = ReadonlyMap<string, Touch>;
export interface Touch {
  readonly who: string;
  readonly version: number;
}

/** What others' batches touched: each element, and each of its keys that was set. */
export function touchesOf<B extends Pick<SavedBatch, 'ops' | 'version'>>(
  batches: readonly B[],
  nameOf: (batch: B) => string,
): Map<string, Touch> {
  const touches = new Map<string, Touch>();
  for (const batch of batches) {
    const touch = { who: nameOf(batch), version: batch.version };
    for (const op of batch.ops) {
      const { id, key } = target(op);
      touches.set(touchKey(op.in, id), touch);
      if (key !== undefined) touches.set(touchKey(op.in, id, key), touch);
    }
  }
  return touches;
}

/** Who touched a place: the property or its element, or for an element as a whole also what hangs on it. */
export function touchedPlace(touches: Touches, place: Place, present: NetworkDocument): string | undefined {
  const own = touches.get(touchKey(place.in, place.id, place.key)) ?? touches.get(touchKey(place.in, place.id));
  if (own !== undefined || place.in === 'network' || place.key !== undefined) return own?.who;
  const along = withDependents(present, { [place.in]: [place.id] });
  for (const [collection, ids] of Object.entries(along)) {
    for (const id of ids as readonly string[]) {
      const touch = touches.get(touchKey(collection as CollectionName, id));
      if (touch !== undefined) return touch.who;
    }
  }
  return undefined;
}

/** Who, after a version, touched anything that these operations act on. */
export function touchedSince(touches: Touches, ops: readonly EditOp[], version: number): string | undefined {
  for (const op of ops) {
    const { id, key } = target(op);
    const touch = touches.get(touchKey(op.in, id, key));
    if (touch !== undefined && touch.version > version) return touch.who;
  }
  return undefined;
}

function target(op: EditOp): { readonly id: string; readonly key?: string } {
  if (op.op === 'set') return { id: op.in === 'network' ? '' : op.id, key: op.key };
  return { id: op.op === 'add' ? (op.id ?? String(op.value['id'])) : op.id };
}

function touchKey(collection: CollectionName | 'network', id: string, key?: string): string {
  return JSON.stringify(key === undefined ? [collection, id] : [collection, id, key]);
}

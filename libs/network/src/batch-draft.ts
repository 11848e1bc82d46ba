import type { CollectionName, Collections, Placed } from './network-document';

/** Why a batch is refused: the operation, and the element and key where there are any. */
export interface BatchError {
  readonly opIndex: number;
  readonly detail: string;
  readonly element?: string;
  readonly key?: string;
}

/** An element that a batch touches, between its operations. Keys are held in a Map, so that no key can be a trap. */
export interface Draft {
  readonly before: Placed<Collections[CollectionName]> | undefined;
  ordinal: number;
  /** Absent once removed. */
  keys: Map<string, unknown> | undefined;
  lastOp: number;
  readonly opOfKey: Map<string, number>;
}

export type Drafts = { readonly [C in CollectionName]: Map<string, Draft> };
/** An error of a touched element, at the operation that last set the key, else the element. */
export function elementError(element: string, draft: Draft, key: string | undefined, detail: string): BatchError {
  if (key === undefined) return { opIndex: draft.lastOp, element, detail };
  return { opIndex: draft.opOfKey.get(key) ?? draft.lastOp, element, key, detail };
}

import {
  applyBatch,
  type EditOp,
  jsonEqual,
  makeSetOp,
  type NetworkDocument,
  removalOps,
  setNetworkOp,
  type NetworkSettings,
} from '@riseback/network';
import type { Conflict } from './conflicts';
import { withSetting } from './merged-settings';
import { sideOf } from './place';

/** This person's side of several conflicts as one batch, and those that it no longer fits. */
export function choiceOfMine(
  present: NetworkDocument,
  conflicts: readonly Conflict[],
): { readonly ops: EditOp[]; readonly settled: Conflict[]; readonly unfit: Conflict[] } {
  const ops: EditOp[] = [];
  const settled: Conflict[] = [];
  const unfit: Conflict[] = [];
  let document = present;
  for (const conflict of conflicts) {
    const own = opsForMine(document, conflict);
    const applied = own === undefined ? undefined : applyBatch(document, own);
    if (own === undefined || applied?.ok !== true) unfit.push(conflict);
    else {
      ops.push(...own);
      settled.push(conflict);
      document = applied.document;
    }
  }
  return { ops, settled, unfit };
}

/**
 * The operations that give this person's side of a conflict, on the document as it stands now.
 * @returns undefined where it no longer fits, such as a pipe whose ends are both gone
 */
export function opsForMine(present: NetworkDocument, conflict: Conflict): EditOp[] | undefined {
  const { place, mine } = conflict;
  if (jsonEqual(mine, sideOf(present, place))) return [];
  return [directOps, elementOps]
    .map((make) => make(present, conflict))
    .find((ops) => ops.length > 0 && fits(present, ops));
}

function fits(present: NetworkDocument, ops: readonly EditOp[]): boolean {
  return applyBatch(present, ops).ok;
}

/** The property alone; or the removal; or what brings the element back. */
function directOps(present: NetworkDocument, { place, mine, whole }: Conflict): EditOp[] {
  if (place.in === 'network') {
    const key = place.key as keyof NetworkSettings;
    const settings = withSetting(present[key], place.path ?? [], mine.there ? mine.value : undefined);
    return mine.there ? [setNetworkOp(present, key, settings as NetworkSettings[typeof key])] : [];
  }
  if (!mine.there) return removalOps(present, { [place.in]: [place.id] });
  const now = sideOf(present, place);
  if (now.there && place.key !== undefined) return [makeSetOp(place.in, place.id, place.key, now.value, mine.value)];
  return missing(present, whole);
}

/** Every key of the element as this person had it: for values that only fit together, such as vented and a pressure. */
function elementOps(present: NetworkDocument, { place, whole }: Conflict): EditOp[] {
  if (place.in === 'network') return [];
  const collection = place.in;
  const wanted = whole.find((op) => op.in === collection && (op.id ?? op.value['id']) === place.id)?.value;
  const element = present[collection].get(place.id)?.value;
  if (wanted === undefined || element === undefined) return [];
  const now = new Map<string, unknown>(Object.entries(element));
  return [...new Set([...now.keys(), ...Object.keys(wanted)])]
    .filter((key) => !jsonEqual(now.get(key), wanted[key]))
    .map((key) => makeSetOp(collection, place.id, key, now.get(key), wanted[key]));
}

/** Those of the additions that are not there and whose references all are, or come with them. */
function missing(present: NetworkDocument, whole: Conflict['whole']): EditOp[] {
  let ops = whole.filter((op) => !present[op.in].has(op.id ?? String(op.value['id'])));
  for (let applied = applyBatch(present, ops); !applied.ok; applied = applyBatch(present, ops)) {
    const refused = new Set(applied.errors.map(({ opIndex }) => opIndex));
    const rest = ops.filter((_op, index) => !refused.has(index));
    if (rest.length === ops.length) return [];
    ops = rest;
  }
  return ops;
}

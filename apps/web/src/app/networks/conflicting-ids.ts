import {
  COLLECTION_NAMES,
  type EditBatch,
  type EditOp,
  newElementId,
  type NetworkDocument,
  overrideId,
  splitOverrideId,
} from '@riseback/network';

/** Keys whose value is the id of another element. */
const REFERENCES = new Set(['from', 'to', 'node', 'pipe', 'trapModel']);

/**
 * Two people who each add an element at the same time give it the same next id. Ids are no one's choice, so this person's take
 * the next free ones; nobody has to be asked.
 */
export function renamesFor(
  before: NetworkDocument,
  after: NetworkDocument,
  pending: readonly EditBatch[],
): Map<string, string> {
  const renamed = new Map<string, string>();
  const taken = new Set(COLLECTION_NAMES.flatMap((collection) => [...before[collection].keys()]));
  for (const op of pending.flatMap(({ ops }) => ops)) {
    if (op.op !== 'add' || op.in === 'overrides') continue;
    const id = op.id ?? String(op.value['id']);
    taken.add(id);
    if (!isTaken(before, id) && isTaken(after, id) && !renamed.has(id)) renamed.set(id, '');
  }
  for (const id of renamed.keys()) {
    const fresh = newElementId(after, id.replace(/\d+$/, ''), [...taken, ...renamed.values()]);
    renamed.set(id, fresh);
  }
  return renamed;
}

/** The same operations with other ids, wherever an id stands. */
export function renameInOps(ops: readonly EditOp[], renamed: ReadonlyMap<string, string>): EditOp[] {
  if (renamed.size === 0) return [...ops];
  return ops.map((op): EditOp => {
    if (op.op === 'set') {
      if (op.in === 'network') return op;
      const values = REFERENCES.has(op.key) ? { ...rename('from', op.from), ...rename('to', op.to) } : {};
      return { ...op, id: newId(op.id), ...values };
    }
    if (op.op === 'remove') return { ...op, id: newId(op.id) };
    const value = Object.fromEntries(
      Object.entries(op.value).map(([key, held]) => [
        key,
        (key === 'id' || REFERENCES.has(key)) && typeof held === 'string' ? newId(held) : held,
      ]),
    );
    return { ...op, ...(op.id === undefined ? {} : { id: newId(op.id) }), value };
  });

  function newId(id: string): string {
    if (!id.includes('/')) return renamed.get(id) ?? id;
    const { caseId, nodeId } = splitOverrideId(id);
    return overrideId(renamed.get(caseId) ?? caseId, renamed.get(nodeId) ?? nodeId);
  }
  function rename(key: 'from' | 'to', held: unknown): Partial<Record<'from' | 'to', unknown>> {
    return typeof held === 'string' ? { [key]: newId(held) } : {};
  }
}

function isTaken(document: NetworkDocument, id: string): boolean {
  return COLLECTION_NAMES.some((collection) => document[collection].has(id));
}

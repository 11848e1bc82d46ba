import { COLLECTION_NAMES, inOrder, type EditOp, type NetworkDocument } from '@riseback/network';

/** Version 1 as a batch: what made the network out of nothing, so that the edits alone tell its whole history. */
export function creationOps(document: NetworkDocument): EditOp[] {
  const settings = (['name', 'site', 'method', 'limits'] as const).map((key): EditOp => ({
    op: 'set',
    in: 'network',
    key,
    to: document[key],
  }));
  const elements = COLLECTION_NAMES.flatMap((collection) =>
    inOrder<object>(document[collection]).map(([id, { ordinal, value }]): EditOp => ({
      op: 'add',
      in: collection,
      ...(collection === 'overrides' ? { id } : {}),
      ordinal,
      value: { ...value },
    })),
  );
  return [...settings, ...elements];
}

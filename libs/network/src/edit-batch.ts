import * as z from 'zod';
import { isPlainJson } from './json-value';
import { COLLECTION_NAMES } from './network-document';

/** z.json() recurses as deep as its input and can exhaust the stack; an element's value never needs that. */
const jsonValue = z.unknown().refine(isPlainJson, { error: 'A value is plain JSON, at most 16 deep' });

/** One step of an edit, on a whole top-level key of an element. An absent `from` or `to` means that the key is absent. */
export const AddOp = z.strictObject({
  op: z.literal('add'),
  in: z.enum(COLLECTION_NAMES),
  /** Only for overrides, whose value does not carry its case: `caseId/nodeId`. */
  id: z.string().max(129).optional(),
  ordinal: z.number().int().min(0).max(1e12),
  value: z.record(z.string().max(64), jsonValue),
});
export const RemoveOp = z.strictObject({
  op: z.literal('remove'),
  in: z.enum(COLLECTION_NAMES),
  id: z.string().max(129),
});
export const SetOp = z.strictObject({
  op: z.literal('set'),
  in: z.enum(COLLECTION_NAMES),
  id: z.string().max(129),
  key: z.string().min(1).max(64),
  from: jsonValue.optional(),
  to: jsonValue.optional(),
});
/** `name`, `site`, `method` and `limits` of the network itself. */
export const SetNetworkOp = z.strictObject({
  op: z.literal('set'),
  in: z.literal('network'),
  key: z.enum(['name', 'site', 'method', 'limits']),
  from: jsonValue.optional(),
  to: jsonValue.optional(),
});
export const EditOp = z.discriminatedUnion('op', [AddOp, RemoveOp, z.discriminatedUnion('in', [SetOp, SetNetworkOp])]);
export type AddOp = z.infer<typeof AddOp>;
export type RemoveOp = z.infer<typeof RemoveOp>;
export type SetOp = z.infer<typeof SetOp>;
export type SetNetworkOp = z.infer<typeof SetNetworkOp>;
export type EditOp = z.infer<typeof EditOp>;

/** A batch is accepted or refused as a whole and is one step of undo. */
export const EditBatch = z.strictObject({
  batchId: z.uuid(),
  label: z.string().trim().min(1).max(120),
  ops: z.array(EditOp).min(1).max(20_000),
});
export type EditBatch = z.infer<typeof EditBatch>;

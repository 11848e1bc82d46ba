import * as z from 'zod';
import {
  EditBatch,
  EditOp,
  Gauge,
  Limits,
  Method,
  NetworkNode,
  OperatingCase,
  Override,
  PipeRun,
  SiteConditions,
  TrapModel,
} from '@riseback/network';
import { Permission, Role } from './roles';

const placed = <T extends z.ZodType>(value: T) => z.array(z.object({ ordinal: z.number().int(), value }));

/** A network's document on the wire: elements with their ordinals, so that both sides number the same. */
export const StoredDocument = z.object({
  name: z.string(),
  site: SiteConditions,
  method: Method,
  limits: Limits,
  nodes: placed(NetworkNode),
  pipes: placed(PipeRun),
  trapModels: placed(TrapModel),
  cases: placed(OperatingCase),
  /** Overrides carry the case they belong to beside them. */
  overrides: z.array(z.object({ caseId: z.string(), ordinal: z.number().int(), value: Override })),
  gauges: placed(Gauge),
});
export type StoredDocument = z.infer<typeof StoredDocument>;

export const Network = z.object({
  id: z.string(),
  siteId: z.string(),
  siteName: z.string(),
  name: z.string(),
  version: z.number().int(),
  role: Role,
  permissions: z.array(Permission),
  solverHash: z.string(),
  document: StoredDocument,
});
export type Network = z.infer<typeof Network>;

/** Body of POST /api/networks/:networkId/edits, with `If-Match: "<version>"`. */
export const EditRequest = EditBatch;

export const EditAccepted = z.object({ version: z.number().int(), solverHash: z.string() });
export type EditAccepted = z.infer<typeof EditAccepted>;

/** A batch that was saved: in the answer 412 (`batches`), in GET /api/networks/:networkId/edits?since=N and as an event. */
export const SavedBatch = z.object({
  version: z.number().int(),
  batchId: z.string(),
  personId: z.string(),
  personName: z.string(),
  at: z.iso.datetime(),
  label: z.string(),
  ops: z.array(EditOp),
  /** Of the network after it. */
  solverHash: z.string(),
});
export type SavedBatch = z.infer<typeof SavedBatch>;

/** The members that problem type /problems/stale-version adds. */
export const StaleVersion = z.object({ currentVersion: z.number().int(), batches: z.array(SavedBatch) });
export type StaleVersion = z.infer<typeof StaleVersion>;

import * as z from 'zod';

/** One entry of the log, as an administrator of a site reads it. */
export const AuditRecord = z.object({
  seq: z.number().int(),
  at: z.iso.datetime(),
  /** Absent where nobody was signed in. */
  personId: z.string().optional(),
  personName: z.string().optional(),
  /** A verb of the project's own, such as `network.edit`. */
  action: z.string(),
  /** The id of what it was done to. */
  subject: z.string(),
  details: z.record(z.string(), z.unknown()),
});
export type AuditRecord = z.infer<typeof AuditRecord>;

const filters = {
  from: z.iso.datetime().optional(),
  /** Not included. */
  to: z.iso.datetime().optional(),
  personId: z.string().min(1).max(64).optional(),
  action: z.string().min(1).max(64).optional(),
  subject: z.string().min(1).max(64).optional(),
};

/** Which entries, the newest first. */
export const AuditQuery = z.strictObject({
  ...filters,
  /** Go on below this entry. */
  before: z.coerce.number().int().positive().optional(),
  limit: z.coerce.number().int().min(1).max(500).default(100),
});
export type AuditQuery = z.infer<typeof AuditQuery>;

export const AuditExportQuery = z.strictObject({ ...filters, format: z.enum(['csv', 'json']) });
export type AuditExportQuery = z.infer<typeof AuditExportQuery>;
export type AuditFilter = Omit<AuditExportQuery, 'format'>;

export const AuditPage = z.object({
  entries: z.array(AuditRecord),
  /** `before` of the next page; absent on the last. */
  nextBefore: z.number().int().optional(),
  /** What there is to filter by in this site's log; on the first page only. */
  choices: z
    .object({ actions: z.array(z.string()), people: z.array(z.object({ id: z.string(), name: z.string() })) })
    .optional(),
});
export type AuditPage = z.infer<typeof AuditPage>;

import * as z from 'zod';
import { Problem } from './problem';

export const REPORT_FORMATS = ['pdf', 'xlsx', 'csv', 'json'] as const;
export const ReportFormat = z.enum(REPORT_FORMATS);
export type ReportFormat = z.infer<typeof ReportFormat>;

export const REPORT_PAPERS = ['a4', 'letter'] as const;

/** Body of POST /api/networks/:networkId/reports: of a revision, or of the network as it stands. */
export const ReportRequest = z.strictObject({
  format: ReportFormat,
  revisionId: z.string().min(1).max(64).optional(),
  /** Traps whose ledgers are wanted beside the governing one of each header. */
  ledgersOf: z.array(z.string().min(1).max(64)).max(50).default([]),
  paper: z.enum(REPORT_PAPERS).default('a4'),
});
export type ReportRequest = z.infer<typeof ReportRequest>;

export const JOB_STATES = ['waiting', 'running', 'finished', 'failed', 'cancelled'] as const;
export const JobState = z.enum(JOB_STATES);
export type JobState = z.infer<typeof JobState>;

/** A report being made, or made. Also the data of the event `report` on GET …/reports/:jobId/events. */
export const ReportJob = z.object({
  id: z.string(),
  /** Of the file it makes. */
  name: z.string(),
  format: ReportFormat,
  revisionId: z.string().optional(),
  state: JobState,
  /** Share done, 0 to 1. */
  progress: z.number(),
  doing: z.string(),
  createdAt: z.iso.datetime(),
  finishedAt: z.iso.datetime().optional(),
  problem: Problem.optional(),
  sizeBytes: z.number().int().optional(),
  sha256: z.string().optional(),
});
export type ReportJob = z.infer<typeof ReportJob>;

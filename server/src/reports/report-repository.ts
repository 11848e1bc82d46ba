import { createHash } from 'node:crypto';
import { Problem, ReportRequest, type ReportJob } from '@riseback/contracts';
import { and, asc, desc, eq, inArray, lt, sql } from 'drizzle-orm';
import * as z from 'zod';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { jobs, reportFiles } from '../platform/db/schema';

/** What was asked for, and the name that the file will have. */
const JobInput = z.object({ ...ReportRequest.shape, name: z.string() });
export type JobInput = z.infer<typeof JobInput>;

/** One order as it is worked on. */
export interface ReportOrderRow {
  readonly id: string;
  readonly siteId: string;
  readonly networkId: string;
  readonly personId: string;
  readonly input: JobInput;
  readonly attempt: number;
}

export type NewOrder = Omit<ReportOrderRow, 'attempt'> & { readonly createdAt: string };

const UNFINISHED = ['waiting', 'running'] as const;

/** The orders for reports and the files made of them; what is being done at the moment is the runner's to say. */
export class ReportRepository {
  constructor(private readonly db: Queries) {}

  insert({ createdAt, ...order }: NewOrder): void {
    this.db
      .insert(jobs)
      .values({ ...order, kind: 'report', state: 'waiting', progress: 0, doing: 'Waiting', attempt: 0, createdAt })
      .run();
  }

  /** A person's own order at a network; nobody sees another's. */
  find(networkId: string, personId: string, jobId: string): ReportJob | undefined {
    const own = and(eq(jobs.id, jobId), eq(jobs.networkId, networkId), eq(jobs.personId, personId));
    const row = this.rows().where(own).get();
    return row === undefined ? undefined : jobOf(row);
  }

  /** A person's orders at a network, the newest first. */
  list(networkId: string, personId: string): ReportJob[] {
    return this.rows()
      .where(and(eq(jobs.networkId, networkId), eq(jobs.personId, personId)))
      .orderBy(desc(jobs.createdAt), desc(jobs.id))
      .all()
      .map(jobOf);
  }

  byId(jobId: string): ReportJob | undefined {
    const row = this.rows().where(eq(jobs.id, jobId)).get();
    return row === undefined ? undefined : jobOf(row);
  }

  /** Orders that wait or are worked on, the oldest first. */
  unfinished(): ReportOrderRow[] {
    return this.db
      .select()
      .from(jobs)
      .where(inArray(jobs.state, UNFINISHED))
      .orderBy(asc(jobs.createdAt), asc(jobs.id))
      .all()
      .map(({ id, siteId, networkId, personId, input, attempt }) => {
        return { id, siteId, networkId, personId, input: JobInput.parse(input), attempt };
      });
  }

  countUnfinished(personId: string): number {
    const own = and(eq(jobs.personId, personId), inArray(jobs.state, UNFINISHED));
    return this.db.select({ id: jobs.id }).from(jobs).where(own).all().length;
  }

  start(jobId: string, attempt: number, startedAt: string): void {
    this.db
      .update(jobs)
      .set({ state: 'running', attempt, startedAt })
      .where(and(eq(jobs.id, jobId), inArray(jobs.state, UNFINISHED)))
      .run();
  }

  /** Stores the file, ends the order and writes the log, or does none of it. @returns whether the order was still there to be ended */
  finish(jobId: string, content: Buffer, finishedAt: string, entryOf: (sha256: string) => AuditEntry): boolean {
    const sha256 = createHash('sha256').update(content).digest('hex');
    return this.db.transaction(
      (tx) => {
        const [ended] = tx
          .update(jobs)
          .set({ state: 'finished', progress: 1, doing: 'Finished', finishedAt })
          .where(and(eq(jobs.id, jobId), inArray(jobs.state, UNFINISHED)))
          .returning({ input: jobs.input })
          .all();
        if (ended === undefined) return false;
        const { name, format } = JobInput.parse(ended.input);
        tx.insert(reportFiles).values({ jobId, format, name, sha256, content, createdAt: finishedAt }).run();
        appendAudit(tx, entryOf(sha256));
        return true;
      },
      { behavior: 'immediate' },
    );
  }

  /** @returns whether there was anything to end */
  end(jobId: string, state: 'failed' | 'cancelled', finishedAt: string, problem?: Problem): boolean {
    const doing = state === 'failed' ? 'Failed' : 'Called off';
    const ended = this.db
      .update(jobs)
      .set({ state, doing, finishedAt, problem: problem ?? null })
      .where(and(eq(jobs.id, jobId), inArray(jobs.state, UNFINISHED)))
      .run();
    return ended.changes > 0;
  }

  content(jobId: string): Buffer | undefined {
    return this.db.select({ content: reportFiles.content }).from(reportFiles).where(eq(reportFiles.jobId, jobId)).get()
      ?.content;
  }

  /** Ended orders older than that, with their files: a report can be made again. */
  sweep(before: string): void {
    const old = this.db
      .select({ id: jobs.id })
      .from(jobs)
      .where(and(lt(jobs.finishedAt, before), eq(jobs.kind, 'report')))
      .all();
    this.delete(old.map(({ id }) => id));
  }

  /** Keeps the newest files of a person: nobody fills the disk with reports. */
  keepNewest(personId: string, most: number): void {
    const own = this.db
      .select({ id: jobs.id })
      .from(jobs)
      .innerJoin(reportFiles, eq(reportFiles.jobId, jobs.id))
      .where(eq(jobs.personId, personId))
      .orderBy(desc(jobs.createdAt), desc(jobs.id))
      .all();
    this.delete(own.slice(most).map(({ id }) => id));
  }

  private delete(ids: readonly string[]): void {
    if (ids.length === 0) return;
    this.db.delete(reportFiles).where(inArray(reportFiles.jobId, ids)).run();
    this.db.delete(jobs).where(inArray(jobs.id, ids)).run();
  }

  private rows() {
    return this.db
      .select({
        job: jobs,
        // octet_length reads no content
        sizeBytes: sql<number | null>`octet_length(${reportFiles.content})`,
        sha256: reportFiles.sha256,
      })
      .from(jobs)
      .leftJoin(reportFiles, eq(reportFiles.jobId, jobs.id))
      .$dynamic();
  }
}

interface JobRow {
  readonly job: typeof jobs.$inferSelect;
  readonly sizeBytes: number | null;
  readonly sha256: string | null;
}

function jobOf({ job, sizeBytes, sha256 }: JobRow): ReportJob {
  const { name, format, revisionId } = JobInput.parse(job.input);
  return {
    id: job.id,
    name,
    format,
    ...(revisionId === undefined ? {} : { revisionId }),
    state: job.state,
    progress: job.progress,
    doing: job.doing,
    createdAt: job.createdAt,
    ...(job.finishedAt === null ? {} : { finishedAt: job.finishedAt }),
    ...(job.problem === null ? {} : { problem: Problem.parse(job.problem) }),
    ...(sizeBytes === null ? {} : { sizeBytes }),
    ...(sha256 === null ? {} : { sha256 }),
  };
}

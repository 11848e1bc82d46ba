import { and, asc, eq, like, sql } from 'drizzle-orm';
import * as z from 'zod';
import type { Queries } from '../platform/db/database';
import { audit } from '../platform/db/schema';
import { parsedJson } from './parsed-json';
import { RevisionRepository } from './revision-repository';

/** What the log's entries of a revision say of it; an entry says one of these things. */
const Details = z.object({
  recordHash: z.string().optional(),
  eventSeq: z.number().int().optional(),
  eventHash: z.string().optional(),
  signatureSeq: z.number().int().optional(),
  statementHash: z.string().optional(),
});

export interface LogEntry extends z.infer<typeof Details> {
  readonly seq: number;
  readonly action: string;
}

/** Reads what is held together when a revision is verified. */
export class VerificationRepository {
  readonly revisions: RevisionRepository;

  constructor(private readonly db: Queries) {
    this.revisions = new RevisionRepository(db);
  }

  /** What the log holds of a revision, in the order in which it was written. */
  entriesOf(revisionId: string): LogEntry[] {
    return (
      this.db
        // as text: what was changed may be no JSON any more
        .select({ seq: audit.seq, action: audit.action, details: sql<string>`${audit.details}` })
        .from(audit)
        .where(and(eq(audit.subject, revisionId), like(audit.action, 'revision.%')))
        .orderBy(asc(audit.seq))
        .all()
        .map(({ seq, action, details }) => ({ seq, action, ...Details.safeParse(parsedJson(details)).data }))
    );
  }

  entryHash(seq: number): string | undefined {
    return this.db.select({ hash: audit.hash }).from(audit).where(eq(audit.seq, seq)).get()?.hash;
  }
}

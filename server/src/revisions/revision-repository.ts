import type { RevisionState } from '@riseback/contracts';
import type { EventRecord, RevisionRecord } from '@riseback/revisions';
import { and, asc, desc, eq, gt, isNull, lte, sql } from 'drizzle-orm';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import {
  audit,
  comments,
  edits,
  memberships,
  networks,
  people,
  revisionEvents,
  revisionResults,
  revisions,
  signatures,
} from '../platform/db/schema';

export type SignatureRow = typeof signatures.$inferSelect;
export type Named<T> = T & { readonly personName: string };
export type RevisionRow = RevisionRecord & { readonly createdByName: string };

export interface NewRevisionRow extends RevisionRecord {
  /** RFC 8785 text. */
  readonly file: string;
}

/** The outcome of a case as RFC 8785 text. */
export interface StoredOutcome {
  readonly caseId: string;
  readonly ordinal: number;
  readonly result: string;
}

export interface AuditHeadRow {
  readonly seq: number;
  readonly hash: string;
}

/** Joined from the left, '' where nobody has that id: a row that somebody has changed is to be found and named, not lost. */
const NAME = sql<string>`coalesce(${people.name}, '')`;

/** Everything of a revision but what it froze, which is large. */
const RECORD = {
  id: revisions.id,
  networkId: revisions.networkId,
  letter: revisions.letter,
  title: revisions.title,
  reason: revisions.reason,
  networkVersion: revisions.networkVersion,
  fileHash: revisions.fileHash,
  solverHash: revisions.solverHash,
  resultsHash: revisions.resultsHash,
  engineVersion: revisions.engineVersion,
  createdBy: revisions.createdBy,
  createdAt: revisions.createdAt,
  createdByName: NAME,
};

const EVENT = {
  revisionId: revisionEvents.revisionId,
  seq: revisionEvents.seq,
  state: revisionEvents.state,
  personId: revisionEvents.personId,
  at: revisionEvents.at,
  note: revisionEvents.note,
  personName: NAME,
};

/** Revisions, what became of them and their signatures: rows are added and never changed. */
export class RevisionRepository {
  constructor(private readonly db: Queries) {}

  /** @param change is handed the transaction too, for what other repositories write in it */
  transaction<T>(change: (revisions: RevisionRepository, tx: Queries) => T): T {
    return this.db.transaction((tx) => change(new RevisionRepository(tx), tx), { behavior: 'immediate' });
  }

  /** The revisions of a network in the order in which they were frozen. */
  list(networkId: string): RevisionRow[] {
    return this.db
      .select(RECORD)
      .from(revisions)
      .leftJoin(people, eq(people.id, revisions.createdBy))
      .where(eq(revisions.networkId, networkId))
      .orderBy(sql`length(${revisions.letter})`, asc(revisions.letter))
      .all();
  }

  find(id: string): RevisionRow | undefined {
    return this.db
      .select(RECORD)
      .from(revisions)
      .leftJoin(people, eq(people.id, revisions.createdBy))
      .where(eq(revisions.id, id))
      .get();
  }

  /** The frozen file, as RFC 8785 text. */
  fileText(id: string): string | undefined {
    return this.db.select({ file: revisions.file }).from(revisions).where(eq(revisions.id, id)).get()?.file;
  }

  outcomes(id: string): StoredOutcome[] {
    const { caseId, ordinal, result } = revisionResults;
    return this.db
      .select({ caseId, ordinal, result })
      .from(revisionResults)
      .where(eq(revisionResults.revisionId, id))
      .orderBy(asc(ordinal))
      .all();
  }

  lastLetter(networkId: string): string | undefined {
    return this.db
      .select({ letter: revisions.letter })
      .from(revisions)
      .where(eq(revisions.networkId, networkId))
      .orderBy(desc(sql`length(${revisions.letter})`), desc(revisions.letter))
      .limit(1)
      .get()?.letter;
  }

  insert({ file, ...record }: NewRevisionRow, outcomes: readonly StoredOutcome[]): void {
    this.db
      .insert(revisions)
      .values({ ...record, file })
      .run();
    for (const outcome of outcomes) {
      this.db
        .insert(revisionResults)
        .values({ revisionId: record.id, ...outcome })
        .run();
    }
  }

  events(id: string): Named<EventRecord>[] {
    return this.db
      .select(EVENT)
      .from(revisionEvents)
      .leftJoin(people, eq(people.id, revisionEvents.personId))
      .where(eq(revisionEvents.revisionId, id))
      .orderBy(asc(revisionEvents.seq))
      .all()
      .map(({ revisionId: _, ...event }) => event);
  }

  /** Of every revision of a network, oldest first. */
  eventsOfNetwork(networkId: string): Map<string, Named<EventRecord>[]> {
    const rows = this.db
      .select(EVENT)
      .from(revisionEvents)
      .leftJoin(people, eq(people.id, revisionEvents.personId))
      .innerJoin(revisions, eq(revisions.id, revisionEvents.revisionId))
      .where(eq(revisions.networkId, networkId))
      .orderBy(asc(revisionEvents.seq))
      .all();
    const byRevision = new Map<string, Named<EventRecord>[]>();
    for (const { revisionId, ...event } of rows) {
      byRevision.set(revisionId, [...(byRevision.get(revisionId) ?? []), event]);
    }
    return byRevision;
  }

  insertEvent(revisionId: string, event: EventRecord & { readonly state: RevisionState }): void {
    this.db
      .insert(revisionEvents)
      .values({ revisionId, ...event })
      .run();
  }

  signatures(id: string): Named<SignatureRow>[] {
    return this.db
      .select({ signature: signatures, personName: NAME })
      .from(signatures)
      .leftJoin(people, eq(people.id, signatures.personId))
      .where(eq(signatures.revisionId, id))
      .orderBy(asc(signatures.seq))
      .all()
      .map(({ signature, personName }) => ({ ...signature, personName }));
  }

  insertSignature(row: SignatureRow): void {
    this.db.insert(signatures).values(row).run();
  }

  /** Whether anything was ever signed. */
  hasSignatures(): boolean {
    return this.db.select({ seq: signatures.seq }).from(signatures).limit(1).get() !== undefined;
  }

  /** Everyone with an accepted edit after one version, up to another. */
  editors(networkId: string, after: number, upTo: number): { personId: string; personName: string }[] {
    return this.db
      .selectDistinct({ personId: people.id, personName: people.name })
      .from(edits)
      .innerJoin(people, eq(people.id, edits.personId))
      .where(and(eq(edits.networkId, networkId), gt(edits.version, after), lte(edits.version, upTo)))
      .orderBy(asc(people.name), asc(people.id))
      .all();
  }

  /** Threads that are not resolved, by revision. */
  openComments(networkId: string): Map<string, number> {
    const rows = this.db
      .select({ revisionId: comments.revisionId, open: sql<number>`count(*)` })
      .from(comments)
      .where(and(eq(comments.networkId, networkId), eq(comments.id, comments.threadId), isNull(comments.resolvedAt)))
      .groupBy(comments.revisionId)
      .all();
    return new Map(rows.map(({ revisionId, open }) => [revisionId ?? '', open]));
  }

  networkName(networkId: string): string | undefined {
    return this.db.select({ name: networks.name }).from(networks).where(eq(networks.id, networkId)).get()?.name;
  }

  /** People who have a role at a site and may sign in, with that role. */
  peopleOfSite(siteId: string): { id: string; role: (typeof memberships.$inferSelect)['role'] }[] {
    return this.db
      .select({ id: people.id, role: memberships.role })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(and(eq(memberships.siteId, siteId), isNull(people.disabledAt)))
      .orderBy(asc(people.id))
      .all();
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }

  /** The last entry of the log; a log without one has nothing that a signature could stand on. */
  auditHead(): AuditHeadRow | undefined {
    return this.db.select({ seq: audit.seq, hash: audit.hash }).from(audit).orderBy(desc(audit.seq)).limit(1).get();
  }
}

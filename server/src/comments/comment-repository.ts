import { CommentSubject } from '@riseback/contracts';
import { and, asc, eq, inArray, isNull, sql } from 'drizzle-orm';
import * as z from 'zod';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { comments, memberships, people } from '../platform/db/schema';

const Mentions = z.array(z.string());

/** A comment as it is stored; the first of a thread carries the thread's id as its own. */
export interface CommentRow {
  readonly id: string;
  readonly networkId: string;
  readonly revisionId: string | null;
  readonly threadId: string;
  readonly subject: CommentSubject;
  readonly personId: string;
  readonly at: string;
  readonly body: string;
  readonly mentions: readonly string[];
  readonly resolvedBy: string | null;
  readonly resolvedAt: string | null;
}

export class CommentRepository {
  constructor(private readonly db: Queries) {}

  /** @param change is handed the transaction too, for what others write in it */
  transaction<T>(change: (comments: CommentRepository, tx: Queries) => T): T {
    return this.db.transaction((tx) => change(new CommentRepository(tx), tx), { behavior: 'immediate' });
  }

  /**
   * The comments of a network, oldest first.
   * @param revisionId those on one revision; null: on the network as it stands; undefined: all
   */
  ofNetwork(networkId: string, revisionId?: string | null): CommentRow[] {
    const on = revisionId === null ? isNull(comments.revisionId) : eq(comments.revisionId, revisionId ?? '');
    const where = and(eq(comments.networkId, networkId), revisionId === undefined ? undefined : on);
    return this.select(where);
  }

  ofThread(networkId: string, threadId: string): CommentRow[] {
    return this.select(and(eq(comments.networkId, networkId), eq(comments.threadId, threadId)));
  }

  countOf(networkId: string): number {
    const count = this.db.select({ count: sql<number>`count(*)` }).from(comments);
    return count.where(eq(comments.networkId, networkId)).get()?.count ?? 0;
  }

  insert({ subject, mentions, ...row }: CommentRow): void {
    this.db
      .insert(comments)
      .values({ ...row, subject, mentions: [...mentions] })
      .run();
  }

  setResolved(threadId: string, resolved: { readonly by: string; readonly at: string } | undefined): void {
    this.db
      .update(comments)
      .set({ resolvedBy: resolved?.by ?? null, resolvedAt: resolved?.at ?? null })
      .where(eq(comments.id, threadId))
      .run();
  }

  names(ids: Iterable<string>): Map<string, string> {
    const rows = this.db
      .select({ id: people.id, name: people.name })
      .from(people)
      .where(inArray(people.id, [...new Set(ids)]))
      .all();
    return new Map(rows.map(({ id, name }) => [id, name]));
  }

  /** People who have a role at a site and may sign in. */
  peopleOfSite(siteId: string): Set<string> {
    const rows = this.db
      .select({ id: people.id })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(and(eq(memberships.siteId, siteId), isNull(people.disabledAt)))
      .all();
    return new Set(rows.map(({ id }) => id));
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }

  private select(where: ReturnType<typeof and>): CommentRow[] {
    return (
      this.db
        .select()
        .from(comments)
        .where(where)
        // rows are never deleted, so that their order of writing is theirs also within a millisecond
        .orderBy(asc(comments.at), asc(sql`rowid`))
        .all()
        .map((row) => ({
          ...row,
          subject: CommentSubject.parse(row.subject),
          mentions: Mentions.parse(row.mentions),
        }))
    );
  }
}

import { and, desc, eq, gt, isNull, sql } from 'drizzle-orm';
import { appendAudit, type AuditEntry } from '../db/audit';
import type { Database, Queries } from '../db/database';
import { people, sessions } from '../db/schema';
import type { SignedInPerson } from './access';

export type SessionRow = typeof sessions.$inferSelect;
export type SessionEnd = NonNullable<SessionRow['endedWhy']>;

/** A session that may be used, and whose it is. */
export interface LiveSession {
  readonly session: SessionRow;
  readonly person: SignedInPerson;
}

export class SessionRepository {
  private readonly live;

  constructor(private readonly db: Database) {
    // The password's time is compared too: a session older than it is dead even if nobody ended it by hand.
    this.live = db
      .select({ session: sessions, id: people.id, name: people.name, email: people.email })
      .from(sessions)
      .innerJoin(people, eq(people.id, sessions.personId))
      .where(
        and(
          eq(sessions.id, sql.placeholder('id')),
          isNull(sessions.endedAt),
          gt(sessions.idleUntil, sql.placeholder('now')),
          gt(sessions.endsAt, sql.placeholder('now')),
          isNull(people.disabledAt),
          sql`${people.passwordChangedAt} <= ${sessions.createdAt}`,
        ),
      )
      .prepare();
  }

  findLive(id: string, now: string): LiveSession | undefined {
    const row = this.live.get({ id, now });
    if (row === undefined) return undefined;
    return {
      session: row.session,
      person: { id: row.id, name: row.name, email: row.email, sessionId: row.session.id },
    };
  }

  start(row: SessionRow, audit: AuditEntry): void {
    this.db.transaction((tx) => {
      tx.insert(sessions).values(row).run();
      appendAudit(tx, audit);
    });
  }

  renew(id: string, seenAt: string, idleUntil: string): void {
    this.db.update(sessions).set({ seenAt, idleUntil }).where(eq(sessions.id, id)).run();
  }

  /** @returns whether there was such a session of that person, still alive */
  end(id: string, personId: string, endedWhy: SessionEnd, audit: AuditEntry): boolean {
    return this.db.transaction((tx) => {
      const mine = and(eq(sessions.id, id), eq(sessions.personId, personId), isNull(sessions.endedAt));
      const endedAt = audit.at.toISOString();
      const ended = tx.update(sessions).set({ endedAt, endedWhy }).where(mine).run().changes > 0;
      if (ended) appendAudit(tx, { ...audit, details: { why: endedWhy } });
      return ended;
    });
  }

  /** Sessions of a person that may still be used, the latest first. */
  listLive(personId: string, now: string): SessionRow[] {
    const alive = and(
      eq(sessions.personId, personId),
      isNull(sessions.endedAt),
      gt(sessions.idleUntil, now),
      gt(sessions.endsAt, now),
    );
    return this.db.select().from(sessions).where(alive).orderBy(desc(sessions.seenAt)).all();
  }
}

/** Part of whatever transaction changes a password or a role, or disables a person. */
export function endAllSessions(tx: Queries, personId: string, endedAt: string, endedWhy: SessionEnd): void {
  tx.update(sessions)
    .set({ endedAt, endedWhy })
    .where(and(eq(sessions.personId, personId), isNull(sessions.endedAt)))
    .run();
}

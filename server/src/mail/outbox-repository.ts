import type { DeclinableMail, MailPurpose } from '@riseback/contracts';
import { and, asc, desc, eq, lte, sql } from 'drizzle-orm';
import type { Database, Queries } from '../platform/db/database';
import { declinedMails, mails, memberships, people } from '../platform/db/schema';

export type MailRow = typeof mails.$inferSelect;

/** What is known of who gets a mail. */
export interface Recipient {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly units: 'us' | 'si';
  readonly timeZone: string;
  readonly disabledAt: string | null;
}

/** A mail of a site as its administrators see it: never what is in it. */
export interface ListedMail extends Omit<MailRow, 'data' | 'siteId' | 'recipientId'> {
  readonly recipientName: string | null;
}

export class OutboxRepository {
  constructor(private readonly db: Database) {}

  recipient(id: string, tx: Queries = this.db): Recipient | undefined {
    const { name, email, units, timeZone, disabledAt } = people;
    return tx
      .select({ id: people.id, name, email, units, timeZone, disabledAt })
      .from(people)
      .where(eq(people.id, id))
      .get();
  }

  declines(personId: string, purpose: MailPurpose, tx: Queries): boolean {
    const theirs = and(
      eq(declinedMails.personId, personId),
      // a purpose that cannot be declined has no row
      eq(declinedMails.purpose, purpose as DeclinableMail),
    );
    return tx.select().from(declinedMails).where(theirs).get() !== undefined;
  }

  hasRole(personId: string, siteId: string): boolean {
    const there = and(eq(memberships.personId, personId), eq(memberships.siteId, siteId));
    return this.db.select({ role: memberships.role }).from(memberships).where(there).get() !== undefined;
  }

  insert(row: MailRow, tx: Queries): void {
    tx.insert(mails).values(row).run();
  }

  /** The mail that has been due longest. */
  firstDue(at: string): MailRow | undefined {
    return this.db
      .select()
      .from(mails)
      .where(and(eq(mails.state, 'waiting'), lte(mails.nextTryAt, at)))
      .orderBy(asc(mails.nextTryAt), asc(mails.createdAt), asc(mails.id))
      .limit(1)
      .get();
  }

  /** When the next waiting mail is due, if there is one. */
  nextTryAt(): string | undefined {
    return this.db
      .select({ at: mails.nextTryAt })
      .from(mails)
      .where(eq(mails.state, 'waiting'))
      .orderBy(asc(mails.nextTryAt))
      .limit(1)
      .get()?.at;
  }

  markSent(id: string, sentAt: string): void {
    const tried = { state: 'sent' as const, attempts: sql`${mails.attempts} + 1`, sentAt, lastError: null };
    this.db.update(mails).set(tried).where(eq(mails.id, id)).run();
  }

  /** After a try that failed. */
  postpone(id: string, nextTryAt: string, lastError: string): void {
    const tried = { attempts: sql`${mails.attempts} + 1`, nextTryAt, lastError };
    this.db.update(mails).set(tried).where(eq(mails.id, id)).run();
  }

  /** @param tried whether a try that failed was the reason */
  giveUp(id: string, lastError: string, tried: boolean): void {
    const attempts = tried ? sql`${mails.attempts} + 1` : mails.attempts;
    this.db.update(mails).set({ state: 'givenUp', attempts, lastError }).where(eq(mails.id, id)).run();
  }

  /** The newest first. */
  ofSite(siteId: string, most: number): ListedMail[] {
    const { id, purpose, email, state, attempts, nextTryAt, createdAt, sentAt, lastError } = mails;
    return this.db
      .select({
        ...{ id, purpose, email, state, attempts, nextTryAt, createdAt, sentAt, lastError },
        recipientName: people.name,
      })
      .from(mails)
      .leftJoin(people, eq(people.id, mails.recipientId))
      .where(eq(mails.siteId, siteId))
      .orderBy(desc(mails.createdAt), desc(mails.id))
      .limit(most)
      .all();
  }
}

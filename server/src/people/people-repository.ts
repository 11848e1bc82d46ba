import type { DeclinableMail, Person, Role } from '@riseback/contracts';
import { and, asc, eq, sql } from 'drizzle-orm';
import { endAllSessions } from '../platform/auth/session-repository';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Database, Queries } from '../platform/db/database';
import { declinedMails, memberships, people } from '../platform/db/schema';

export type PersonRow = typeof people.$inferSelect;
type ProfileColumns = Partial<Pick<PersonRow, 'name' | 'units' | 'theme' | 'timeZone'>>;

export class PeopleRepository {
  constructor(private readonly db: Database) {}

  /** All that `work` writes, also through other repositories on this connection, or none of it. */
  inOneTransaction<T>(work: (tx: Queries) => T): T {
    return this.db.transaction((tx) => work(tx), { behavior: 'immediate' });
  }

  find(id: string): PersonRow | undefined {
    return this.db.select().from(people).where(eq(people.id, id)).get();
  }

  findByEmail(email: string): PersonRow | undefined {
    return this.db
      .select()
      .from(people)
      .where(sql`lower(${people.email}) = lower(${email})`)
      .get();
  }

  hasInstallationAdministrator(): boolean {
    return this.db.select().from(people).where(eq(people.administersInstallation, true)).get() !== undefined;
  }

  insert(row: PersonRow, audit: AuditEntry): void {
    this.db.transaction((tx) => {
      tx.insert(people).values(row).run();
      appendAudit(tx, audit);
    });
  }

  /** @param audit of what others see of the change, if anything */
  changeProfile(id: string, change: ProfileColumns, audit?: AuditEntry): PersonRow | undefined {
    if (Object.keys(change).length === 0) return this.find(id);
    return this.db.transaction((tx) => {
      if (audit !== undefined) appendAudit(tx, audit);
      return tx.update(people).set(change).where(eq(people.id, id)).returning().get();
    });
  }

  /** What a person sees of their own row. */
  profileOf({ id, name, email, units, theme, timeZone }: PersonRow): Person {
    const declined = this.db
      .select({ purpose: declinedMails.purpose })
      .from(declinedMails)
      .where(eq(declinedMails.personId, id))
      .orderBy(asc(declinedMails.purpose));
    return { id, name, email, units, theme, timeZone, unwantedMails: declined.all().map(({ purpose }) => purpose) };
  }

  setUnwantedMails(personId: string, purposes: readonly DeclinableMail[]): void {
    this.db.transaction((tx) => {
      tx.delete(declinedMails).where(eq(declinedMails.personId, personId)).run();
      for (const purpose of new Set(purposes)) tx.insert(declinedMails).values({ personId, purpose }).run();
    });
  }

  /**
   * A new password ends every session of the person, the one that asked for it too.
   * @param from the hash it takes the place of, where that was checked
   * @returns false when another password has taken its place meanwhile
   */
  changePassword(id: string, { from, to }: { from?: string; to: string }, audit: AuditEntry): boolean {
    const at = audit.at.toISOString();
    return this.db.transaction((tx) => {
      const unchanged = and(eq(people.id, id), from === undefined ? undefined : eq(people.passwordHash, from));
      const change = { passwordHash: to, passwordChangedAt: at };
      if (tx.update(people).set(change).where(unchanged).run().changes === 0) return false;
      endAllSessions(tx, id, at, 'passwordChanged');
      appendAudit(tx, audit);
      return true;
    });
  }

  disable(id: string, audit: AuditEntry): void {
    const at = audit.at.toISOString();
    this.db.transaction((tx) => {
      tx.update(people).set({ disabledAt: at }).where(eq(people.id, id)).run();
      endAllSessions(tx, id, at, 'disabled');
      appendAudit(tx, audit);
    });
  }

  enable(id: string, audit: AuditEntry): void {
    this.db.transaction((tx) => {
      tx.update(people).set({ disabledAt: null }).where(eq(people.id, id)).run();
      appendAudit(tx, audit);
    });
  }

  /** For the log alone, such as of a refused attempt, of which nothing else is kept. */
  note(audit: AuditEntry): void {
    this.db.transaction((tx) => appendAudit(tx, audit));
  }

  /** For when what a person signs in with was changed by somebody else. */
  endSessions(id: string, at: Date): void {
    this.db.transaction((tx) => endAllSessions(tx, id, at.toISOString(), 'passwordChanged'));
  }

  /** Gives a role at a site, or changes it; a changed one ends the person's sessions. */
  giveRole(personId: string, siteId: string, role: Role, grantedBy: string | null, audit: AuditEntry): void {
    const grantedAt = audit.at.toISOString();
    this.db.transaction((tx) => {
      const theirs = and(eq(memberships.personId, personId), eq(memberships.siteId, siteId));
      const before = tx.select().from(memberships).where(theirs).get();
      tx.insert(memberships)
        .values({ personId, siteId, role, grantedBy, grantedAt })
        .onConflictDoUpdate({ target: [memberships.personId, memberships.siteId], set: { role, grantedBy, grantedAt } })
        .run();
      if (before !== undefined && before.role !== role) endAllSessions(tx, personId, grantedAt, 'roleChanged');
      appendAudit(tx, audit);
    });
  }
}

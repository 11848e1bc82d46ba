import type { NamedPerson, Role } from '@riseback/contracts';
import { and, asc, count, eq, isNotNull, isNull, max, ne, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/sqlite-core';
import { endAllSessions } from '../platform/auth/session-repository';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Database } from '../platform/db/database';
import { memberships, oneTimeSecrets, people, sessions } from '../platform/db/schema';

/** A person with a role at a site, as its administrators see them. */
export interface SitePersonRow {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly role: Role;
  readonly grantedAt: string;
  readonly grantedByName: string | null;
  readonly disabledAt: string | null;
  readonly seenAt: string | null;
  readonly codesOn: boolean;
  /** Has no role at another site and does not administer the installation. */
  readonly onlyHere: boolean;
}

export class SitePeopleRepository {
  constructor(private readonly db: Database) {}

  /** Who can be named in a comment: everybody with a role who is not disabled. */
  names(siteId: string): NamedPerson[] {
    return this.db
      .select({ id: people.id, name: people.name, role: memberships.role })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(and(eq(memberships.siteId, siteId), isNull(people.disabledAt)))
      .orderBy(sql`${people.name} collate nocase`, people.id)
      .all();
  }

  list(siteId: string): SitePersonRow[] {
    return this.rows(siteId).all();
  }

  find(siteId: string, personId: string): SitePersonRow | undefined {
    return this.rows(siteId, personId).get();
  }

  /** Administrators of the site who can sign in, but for one person. */
  otherAdministrators(siteId: string, personId: string): number {
    const others = and(
      eq(memberships.siteId, siteId),
      eq(memberships.role, 'administrator'),
      ne(memberships.personId, personId),
      isNull(people.disabledAt),
    );
    const found = this.db
      .select({ others: count() })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(others)
      .get();
    return found?.others ?? 0;
  }

  /** The only site where a person has a role, if there is one such. */
  onlySiteOf(personId: string): string | undefined {
    const [first, second] = this.db
      .select({ siteId: memberships.siteId })
      .from(memberships)
      .where(eq(memberships.personId, personId))
      .limit(2)
      .all();
    return second === undefined ? first?.siteId : undefined;
  }

  /** Takes a role away; the person's sessions end. */
  takeRole(personId: string, siteId: string, audit: AuditEntry): void {
    this.db.transaction((tx) => {
      tx.delete(memberships)
        .where(and(eq(memberships.personId, personId), eq(memberships.siteId, siteId)))
        .run();
      endAllSessions(tx, personId, audit.at.toISOString(), 'roleChanged');
      appendAudit(tx, audit);
    });
  }

  private rows(siteId: string, personId?: string) {
    const granter = alias(people, 'granter');
    const roles = alias(memberships, 'roles');
    const elsewhere = this.db
      .select({ siteId: roles.siteId })
      .from(roles)
      .where(and(eq(roles.personId, people.id), ne(roles.siteId, siteId)));
    // by its index, not as a join: sessions are kept, and become many
    const seenAt = this.db
      .select({ at: max(sessions.seenAt) })
      .from(sessions)
      .where(eq(sessions.personId, people.id));
    const codes = and(eq(oneTimeSecrets.personId, people.id), isNotNull(oneTimeSecrets.confirmedAt));
    const here = and(
      eq(memberships.siteId, siteId),
      personId === undefined ? undefined : eq(memberships.personId, personId),
    );
    return this.db
      .select({
        id: people.id,
        name: people.name,
        email: people.email,
        role: memberships.role,
        grantedAt: memberships.grantedAt,
        grantedByName: granter.name,
        disabledAt: people.disabledAt,
        seenAt: sql<string | null>`${seenAt}`,
        codesOn: sql<boolean>`${oneTimeSecrets.personId} is not null`.mapWith(Boolean),
        onlyHere: sql<boolean>`not exists ${elsewhere} and not ${people.administersInstallation}`.mapWith(Boolean),
      })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .leftJoin(granter, eq(granter.id, memberships.grantedBy))
      .leftJoin(oneTimeSecrets, codes)
      .where(here)
      .orderBy(asc(sql`${people.name} collate nocase`), people.id);
  }
}

import { and, asc, count, eq, gt, gte, isNotNull, isNull, sql } from 'drizzle-orm';
import type { Database, Queries } from '../platform/db/database';
import { memberships, oneTimeLinks, people, sites } from '../platform/db/schema';

export type LinkRow = typeof oneTimeLinks.$inferSelect;

/** A link with the names that go with it. */
export interface NamedLink extends LinkRow {
  readonly siteName: string | null;
  readonly madeByName: string | null;
}

const unspent = and(isNull(oneTimeLinks.usedAt), isNull(oneTimeLinks.withdrawnAt));
const toAddress = (email: string) => sql`lower(${oneTimeLinks.email}) = lower(${email})`;

export class LinkRepository {
  constructor(private readonly db: Database) {}

  insert(row: LinkRow, tx: Queries = this.db): void {
    tx.insert(oneTimeLinks).values(row).run();
  }

  find(id: string): LinkRow | undefined {
    return this.db.select().from(oneTimeLinks).where(eq(oneTimeLinks.id, id)).get();
  }

  findByHash(tokenHash: string): NamedLink | undefined {
    return this.named().where(eq(oneTimeLinks.tokenHash, tokenHash)).get();
  }

  /** Of a site, neither accepted nor withdrawn, the earliest first. */
  invitations(siteId: string): NamedLink[] {
    return this.named()
      .where(and(eq(oneTimeLinks.siteId, siteId), isNotNull(oneTimeLinks.role), unspent))
      .orderBy(asc(oneTimeLinks.madeAt), asc(oneTimeLinks.id))
      .all();
  }

  /** @returns false when it was used or withdrawn before, or its time is over */
  use(id: string, at: string, tx: Queries = this.db): boolean {
    const usable = and(eq(oneTimeLinks.id, id), unspent, gt(oneTimeLinks.expiresAt, at));
    return tx.update(oneTimeLinks).set({ usedAt: at }).where(usable).run().changes > 0;
  }

  /** @returns false when it was used or withdrawn before */
  withdraw(id: string, at: string, tx: Queries = this.db): boolean {
    const open = and(eq(oneTimeLinks.id, id), unspent);
    return tx.update(oneTimeLinks).set({ withdrawnAt: at }).where(open).run().changes > 0;
  }

  withdrawResets(email: string, at: string, tx: Queries = this.db): void {
    const open = and(eq(oneTimeLinks.purpose, 'passwordReset'), toAddress(email), unspent);
    tx.update(oneTimeLinks).set({ withdrawnAt: at }).where(open).run();
  }

  resetsSince(email: string, since: string): number {
    const recent = and(eq(oneTimeLinks.purpose, 'passwordReset'), toAddress(email), gte(oneTimeLinks.madeAt, since));
    return this.db.select({ made: count() }).from(oneTimeLinks).where(recent).get()?.made ?? 0;
  }

  invitationsSince(siteId: string, since: string): number {
    const recent = and(eq(oneTimeLinks.siteId, siteId), gte(oneTimeLinks.madeAt, since));
    return this.db.select({ made: count() }).from(oneTimeLinks).where(recent).get()?.made ?? 0;
  }

  /** Whether a person may still be let in by an invitation of theirs: not disabled, and an administrator of the site. */
  mayInvite(personId: string, siteId: string): boolean {
    const administers = and(
      eq(memberships.personId, personId),
      eq(memberships.siteId, siteId),
      eq(memberships.role, 'administrator'),
      isNull(people.disabledAt),
    );
    const found = this.db
      .select({ id: people.id })
      .from(memberships)
      .innerJoin(people, eq(people.id, memberships.personId))
      .where(administers)
      .get();
    return found !== undefined;
  }

  siteName(siteId: string): string | undefined {
    return this.db.select({ name: sites.name }).from(sites).where(eq(sites.id, siteId)).get()?.name;
  }

  private named() {
    const row = {
      id: oneTimeLinks.id,
      tokenHash: oneTimeLinks.tokenHash,
      purpose: oneTimeLinks.purpose,
      email: oneTimeLinks.email,
      siteId: oneTimeLinks.siteId,
      role: oneTimeLinks.role,
      madeBy: oneTimeLinks.madeBy,
      madeAt: oneTimeLinks.madeAt,
      expiresAt: oneTimeLinks.expiresAt,
      usedAt: oneTimeLinks.usedAt,
      withdrawnAt: oneTimeLinks.withdrawnAt,
      siteName: sites.name,
      madeByName: people.name,
    };
    return this.db
      .select(row)
      .from(oneTimeLinks)
      .leftJoin(sites, eq(sites.id, oneTimeLinks.siteId))
      .leftJoin(people, eq(people.id, oneTimeLinks.madeBy));
  }
}

import type { AuditFilter } from '@riseback/contracts';
import { and, asc, desc, eq, gt, gte, inArray, isNotNull, isNull, lt, or, type SQL } from 'drizzle-orm';
import type { Queries } from '../platform/db/database';
import { audit, memberships, people } from '../platform/db/schema';

export interface AuditRowWithName {
  readonly entry: typeof audit.$inferSelect;
  readonly personName: string | null;
}

/** Reads the log; nothing but `appendAudit` writes it. */
export class AuditRepository {
  constructor(private readonly db: Queries) {}

  /** The newest first, below `before`. */
  newest(siteId: string, filter: AuditFilter, before: number | undefined, limit: number): AuditRowWithName[] {
    const below = before === undefined ? undefined : lt(audit.seq, before);
    return this.select(and(this.ofSite(siteId, filter), below))
      .orderBy(desc(audit.seq))
      .limit(limit)
      .all();
  }

  /** The oldest first, above `after`. */
  oldest(siteId: string, filter: AuditFilter, after: number, limit: number): AuditRowWithName[] {
    const where = and(this.ofSite(siteId, filter), gt(audit.seq, after));
    return this.select(where).orderBy(asc(audit.seq)).limit(limit).all();
  }

  actions(siteId: string): string[] {
    const found = this.db.selectDistinct({ action: audit.action }).from(audit).where(this.ofSite(siteId, {}));
    return found
      .orderBy(audit.action)
      .all()
      .map(({ action }) => action);
  }

  people(siteId: string): { id: string; name: string }[] {
    return this.db
      .selectDistinct({ id: people.id, name: people.name })
      .from(audit)
      .innerJoin(people, eq(people.id, audit.personId))
      .where(and(this.ofSite(siteId, {}), isNotNull(audit.personId)))
      .orderBy(people.name, people.id)
      .all();
  }

  private select(where: SQL | undefined) {
    return this.db
      .select({ entry: audit, personName: people.name })
      .from(audit)
      .leftJoin(people, eq(people.id, audit.personId))
      .where(where)
      .$dynamic();
  }

  /** What happened at the site, and what its people did that belongs to no site, such as signing in. */
  private ofSite(siteId: string, { from, to, personId, action, subject }: AuditFilter): SQL | undefined {
    const itsPeople = this.db
      .select({ id: memberships.personId })
      .from(memberships)
      .where(eq(memberships.siteId, siteId));
    return and(
      or(eq(audit.siteId, siteId), and(isNull(audit.siteId), inArray(audit.personId, itsPeople))),
      from === undefined ? undefined : gte(audit.at, from),
      to === undefined ? undefined : lt(audit.at, to),
      personId === undefined ? undefined : eq(audit.personId, personId),
      action === undefined ? undefined : eq(audit.action, action),
      subject === undefined ? undefined : eq(audit.subject, subject),
    );
  }
}

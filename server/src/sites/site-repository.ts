import { type Role, type SiteSettings, TagPatterns } from '@riseback/contracts';
import { Limits } from '@riseback/network';
import { and, count, eq, isNull, sql } from 'drizzle-orm';
import { appendAudit, type AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { onFirstUse } from '../platform/db/on-first-use';
import { memberships, networks, sites } from '../platform/db/schema';

/** A site as one of its people sees it. */
export interface SiteOfPerson {
  readonly id: string;
  readonly name: string;
  readonly role: Role;
  readonly atmosphericPressurePa: number;
  readonly ambientTemperatureK: number;
  readonly networkCount: number;
}

export interface NewSite {
  readonly id: string;
  readonly name: string;
  readonly atmosphericPressurePa: number;
  readonly ambientTemperatureK: number;
  readonly createdAt: string;
}

export class SiteRepository {
  private readonly ofPerson;

  constructor(private readonly db: Queries) {
    this.ofPerson = onFirstUse(() => prepareSitesOfPerson(db));
  }

  /** The sites where a person has a role, by name. */
  sitesOf(personId: string): SiteOfPerson[] {
    return this.ofPerson().all({ personId });
  }

  siteOf(personId: string, siteId: string): SiteOfPerson | undefined {
    return this.sitesOf(personId).find((site) => site.id === siteId);
  }

  transaction<T>(change: (sites: SiteRepository) => T): T {
    return this.db.transaction((tx) => change(new SiteRepository(tx)), { behavior: 'immediate' });
  }

  settingsOf(siteId: string): SiteSettings | undefined {
    const row = this.db.select().from(sites).where(eq(sites.id, siteId)).get();
    if (row === undefined) return undefined;
    const { atmosphericPressurePa, ambientTemperatureK, limits, tagPattern } = row;
    const tagPatterns = TagPatterns.parse(tagPattern === null ? {} : JSON.parse(tagPattern));
    return { atmosphericPressurePa, ambientTemperatureK, limits: Limits.parse(limits), tagPatterns };
  }

  saveSettings(siteId: string, { tagPatterns, ...settings }: SiteSettings): void {
    this.db
      .update(sites)
      .set({ ...settings, tagPattern: JSON.stringify(tagPatterns) })
      .where(eq(sites.id, siteId))
      .run();
  }

  audit(entry: AuditEntry): void {
    appendAudit(this.db, entry);
  }

  isEmpty(): boolean {
    return this.db.select({ id: sites.id }).from(sites).limit(1).get() === undefined;
  }

  insert(site: NewSite): void {
    this.db
      .insert(sites)
      .values({ ...site, limits: {}, tagPattern: null })
      .run();
  }
}

function prepareSitesOfPerson(db: Queries) {
  const networkCount = db
    .select({ siteId: networks.siteId, networkCount: count().as('network_count') })
    .from(networks)
    .where(isNull(networks.archivedAt))
    .groupBy(networks.siteId)
    .as('counted');
  const ownMembership = and(eq(memberships.siteId, sites.id), eq(memberships.personId, sql.placeholder('personId')));
  return db
    .select({
      id: sites.id,
      name: sites.name,
      role: memberships.role,
      atmosphericPressurePa: sites.atmosphericPressurePa,
      ambientTemperatureK: sites.ambientTemperatureK,
      networkCount: sql<number>`coalesce(${networkCount.networkCount}, 0)`,
    })
    .from(sites)
    .innerJoin(memberships, ownMembership)
    .leftJoin(networkCount, eq(networkCount.siteId, sites.id))
    .orderBy(sql`${sites.name} collate nocase`, sites.id)
    .prepare();
}

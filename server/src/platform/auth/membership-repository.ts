import type { Role } from '@riseback/contracts';
import { and, eq, sql } from 'drizzle-orm';
import type { Database } from '../db/database';
import { memberships, networks } from '../db/schema';
import type { MembershipLookup } from './access';

export class MembershipRepository implements MembershipLookup {
  private readonly role;
  private readonly site;

  constructor(db: Database) {
    this.role = db
      .select({ role: memberships.role })
      .from(memberships)
      .where(
        and(eq(memberships.personId, sql.placeholder('personId')), eq(memberships.siteId, sql.placeholder('siteId'))),
      )
      .prepare();
    this.site = db
      .select({ siteId: networks.siteId })
      .from(networks)
      .where(eq(networks.id, sql.placeholder('networkId')))
      .prepare();
  }

  roleAtSite(personId: string, siteId: string): Role | undefined {
    return this.role.get({ personId, siteId })?.role;
  }

  siteOfNetwork(networkId: string): string | undefined {
    return this.site.get({ networkId })?.siteId;
  }
}

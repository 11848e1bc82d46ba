import { permissionsOf, type Site } from '@riseback/contracts';
import type { PersonAccess, SiteAccess } from '../platform/auth/access';
import { notFound } from '../platform/problem';
import type { SiteOfPerson, SiteRepository } from './site-repository';

export class SiteService {
  constructor(private readonly sites: SiteRepository) {}

  /** The sites where the person has a role; no one sees any other. */
  list(access: PersonAccess): Site[] {
    return this.sites.sitesOf(access.person.id).map(toSite);
  }

  get(access: SiteAccess): Site {
    const site = this.sites.siteOf(access.person.id, access.siteId);
    if (site === undefined) throw notFound('There is no such site, or you have no role there.');
    return toSite(site);
  }
}

function toSite(site: SiteOfPerson): Site {
  return { ...site, permissions: [...permissionsOf(site.role)] };
}

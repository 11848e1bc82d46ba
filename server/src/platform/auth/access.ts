import type { Permission, Role } from '@riseback/contracts';
import { PERMISSIONS, ROLES, permissionsOf, roleMay } from '@riseback/contracts';
import { forbidden, notFound, notSignedIn } from '../problem';

/** The signed-in person, as the session's check at this request found them. */
export interface SignedInPerson {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly sessionId: string;
}

/** What the rules need to know; memberships are read at every request, so a changed role counts at once. */
export interface MembershipLookup {
  roleAtSite(personId: string, siteId: string): Role | undefined;
  /** The site of a network that exists (archived ones too, which people may still read). */
  siteOfNetwork(networkId: string): string | undefined;
}

/**
 * Proof that the rule of a route was checked. Services take one of these instead of bare ids; only `AccessRules` below
 * can make one (the classes leave this file as types), so a forgotten check does not compile.
 */
class PersonAccess {
  readonly #proof = true;

  constructor(readonly person: SignedInPerson) {}

  get proven(): boolean {
    return this.#proof;
  }
}

class SiteAccess extends PersonAccess {
  readonly permissions: readonly Permission[];

  constructor(
    person: SignedInPerson,
    readonly siteId: string,
    readonly role: Role,
  ) {
    super(person);
    this.permissions = permissionsOf(role);
  }

  may(permission: Permission): boolean {
    return this.permissions.includes(permission);
  }

  /** For what depends on the body, such as which collections a batch touches. @throws ProblemError 403 */
  require(permission: Permission): void {
    if (!this.may(permission)) throw lacking([permission], this.role);
  }
}

class NetworkAccess extends SiteAccess {
  constructor(
    person: SignedInPerson,
    siteId: string,
    role: Role,
    readonly networkId: string,
  ) {
    super(person, siteId, role);
  }
}

export type { NetworkAccess, PersonAccess, SiteAccess };

export class AccessRules {
  constructor(private readonly memberships: MembershipLookup) {}

  /** @throws ProblemError 401 when nobody is signed in */
  signedIn(person: SignedInPerson | undefined): PersonAccess {
    if (person === undefined) throw notSignedIn();
    return new PersonAccess(person);
  }

  /** @throws ProblemError 401 anonymous; 404 no such site or no role there, in the same words; 403 role too small */
  site(person: SignedInPerson | undefined, siteId: string, anyOf: readonly Permission[]): SiteAccess {
    if (person === undefined) throw notSignedIn();
    const role = this.memberships.roleAtSite(person.id, siteId);
    if (role === undefined) throw notFound('There is no such site, or you have no role there.');
    if (!anyOf.some((permission) => roleMay(role, permission))) throw lacking(anyOf, role);
    return new SiteAccess(person, siteId, role);
  }

  /** @throws as `site`, in words of its own */
  network(person: SignedInPerson | undefined, networkId: string, anyOf: readonly Permission[]): NetworkAccess {
    if (person === undefined) throw notSignedIn();
    const siteId = this.memberships.siteOfNetwork(networkId);
    const role = siteId === undefined ? undefined : this.memberships.roleAtSite(person.id, siteId);
    if (siteId === undefined || role === undefined) {
      throw notFound('There is no such network, or you have no role at its site.');
    }
    if (!anyOf.some((permission) => roleMay(role, permission))) throw lacking(anyOf, role);
    return new NetworkAccess(person, siteId, role, networkId);
  }
}

/** What each permission lets one do, as it stands in a refusal. */
const MEANING: Readonly<Record<Permission, string>> = {
  view: 'seeing this',
  draw: 'changing a network',
  readings: 'changing gauges and readings',
  comment: 'commenting',
  sign: 'returning or signing a revision',
  people: 'managing people',
};

function lacking(anyOf: readonly Permission[], role: Role): Error {
  const wanted = PERMISSIONS.filter((permission) => anyOf.includes(permission));
  const able = ROLES.filter((candidate) => wanted.some((permission) => roleMay(candidate, permission)));
  const deeds = wanted.map((permission) => MEANING[permission]).join(' or ');
  return forbidden(
    `Your role here is ${role}; ${deeds} needs the role ${able.join(' or ')}. Ask an administrator of the site.`,
  );
}

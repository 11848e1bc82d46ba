import type { NamedPerson, Role, SitePerson } from '@riseback/contracts';
import type { SiteAccess } from '../platform/auth/access';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { AuditEntry } from '../platform/db/audit';
import { conflict, notFound } from '../platform/problem';
import type { PasswordResetService } from './password-reset-service';
import type { PeopleRepository } from './people-repository';
import type { SitePeopleRepository, SitePersonRow } from './site-people-repository';

const NOBODY = 'There is no such person at this site.';
const OWN_ROLE = 'Nobody changes their own role. Another administrator of the site does.';
const OWN_ACCOUNT = 'Nobody disables their own account. Another administrator of the site does.';
const OWN_CODES = 'Your own codes are turned off on the page of your account.';
const LAST = 'The site would be without an administrator. Make somebody else an administrator first.';
const ELSEWHERE =
  'This person also has a role at another site, or administers the installation, so the account is not this site’s alone. Take the role here away instead.';
const IS_DISABLED = 'The account is disabled. Enable it first.';
const CODES_ARE_OFF = 'One-time codes are off already.';

/** What administrators of a site do about its people. */
export class SitePeopleService {
  constructor(
    private readonly sitePeople: SitePeopleRepository,
    private readonly people: PeopleRepository,
    private readonly codes: OneTimeCodes,
    private readonly resets: PasswordResetService,
    private readonly now: () => Date,
  ) {}

  names({ siteId }: SiteAccess): NamedPerson[] {
    return this.sitePeople.names(siteId);
  }

  list({ siteId }: SiteAccess): SitePerson[] {
    return this.sitePeople.list(siteId).map(shown);
  }

  /** The person's sessions end, for what they may do is another thing now. @throws ProblemError 404, 409 */
  changeRole(access: SiteAccess, personId: string, role: Role): SitePerson {
    return this.change(access, personId, (person) => {
      if (personId === access.person.id) throw conflict(OWN_ROLE);
      if (person.role === role) return;
      this.demandAnotherAdministrator(access, person);
      const audit = this.entry(access, 'role.change', personId, { from: person.role, to: role });
      this.people.giveRole(personId, access.siteId, role, access.person.id, audit);
    });
  }

  /** @throws ProblemError 404, 409 */
  takeRole(access: SiteAccess, personId: string): void {
    this.people.inOneTransaction(() => {
      const person = this.demand(access, personId);
      if (personId === access.person.id) throw conflict(OWN_ROLE);
      this.demandAnotherAdministrator(access, person);
      const audit = this.entry(access, 'role.take', personId, { role: person.role });
      this.sitePeople.takeRole(personId, access.siteId, audit);
    });
  }

  /** @throws ProblemError 404, 409 where the account is not this site's alone */
  disable(access: SiteAccess, personId: string): SitePerson {
    return this.change(access, personId, (person) => {
      if (personId === access.person.id) throw conflict(OWN_ACCOUNT);
      if (!person.onlyHere) throw conflict(ELSEWHERE);
      if (person.disabledAt !== null) return;
      this.demandAnotherAdministrator(access, person);
      this.people.disable(personId, this.entry(access, 'person.disable', personId));
    });
  }

  /** @throws ProblemError as disable */
  enable(access: SiteAccess, personId: string): SitePerson {
    return this.change(access, personId, (person) => {
      if (!person.onlyHere) throw conflict(ELSEWHERE);
      if (person.disabledAt === null) return;
      this.people.enable(personId, this.entry(access, 'person.enable', personId));
    });
  }

  /** @throws ProblemError 404, 409 while disabled, 429 when the person was sent several already */
  sendReset(access: SiteAccess, personId: string): void {
    this.people.inOneTransaction((tx) => {
      const person = this.demand(access, personId);
      if (person.disabledAt !== null) throw conflict(IS_DISABLED);
      this.resets.sendFor(access, person, tx);
    });
  }

  /**
   * For who has lost authenticator and recovery codes: from then on the password alone lets them in, so administrators
   * convince themselves first that it is them (docs/operations.md).
   * @throws ProblemError 404, 409 where the account is not this site's alone
   */
  turnCodesOff(access: SiteAccess, personId: string): SitePerson {
    return this.change(access, personId, (person) => {
      if (personId === access.person.id) throw conflict(OWN_CODES);
      if (!person.onlyHere) throw conflict(ELSEWHERE);
      if (!person.codesOn) throw conflict(CODES_ARE_OFF);
      const audit = this.entry(access, 'codes.off', personId, { byAdministrator: true });
      this.codes.turnOffFor(personId, audit);
      this.people.endSessions(personId, audit.at);
    });
  }

  private change(access: SiteAccess, personId: string, work: (person: SitePersonRow) => void): SitePerson {
    return this.people.inOneTransaction(() => {
      work(this.demand(access, personId));
      return shown(this.demand(access, personId));
    });
  }

  private demand({ siteId }: SiteAccess, personId: string): SitePersonRow {
    const person = this.sitePeople.find(siteId, personId);
    if (person === undefined) throw notFound(NOBODY);
    return person;
  }

  private demandAnotherAdministrator({ siteId }: SiteAccess, { id, role }: SitePersonRow): void {
    if (role === 'administrator' && this.sitePeople.otherAdministrators(siteId, id) === 0) throw conflict(LAST);
  }

  private entry(
    { person, siteId }: SiteAccess,
    action: string,
    subject: string,
    details: Readonly<Record<string, unknown>> = {},
  ): AuditEntry {
    return { at: this.now(), personId: person.id, sessionId: person.sessionId, siteId, action, subject, details };
  }
}

function shown(row: SitePersonRow): SitePerson {
  const { id, name, email, role, grantedAt, grantedByName, disabledAt, seenAt, codesOn, onlyHere } = row;
  return {
    ...{ id, name, email, role, grantedAt, codesOn, onlyHere },
    ...(grantedByName === null ? {} : { grantedByName }),
    ...(disabledAt === null ? {} : { disabledAt }),
    ...(seenAt === null ? {} : { seenAt }),
  };
}

import { passwordMistake, personalWords } from '@riseback/contracts';
import type { SiteRepository } from '../sites/site-repository';
import type { Passwords } from '../platform/auth/passwords';
import { badRequest, conflict } from '../platform/problem';
import type { PeopleRepository } from './people-repository';

export interface FirstAdministrator {
  readonly email: string;
  readonly name: string;
  readonly siteName: string;
  readonly password: string;
}

/** Sea level and a mild day; designers change both for their site. */
const NEW_SITE = { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 };

/** How an installation without people gets its first. Only a command on the machine reaches this, no route does. */
export class FirstAdministratorService {
  constructor(
    private readonly people: PeopleRepository,
    private readonly sites: SiteRepository,
    private readonly passwords: Passwords,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {}

  /** @throws ProblemError 409 when there is one already */
  demandNone(): void {
    if (this.people.hasInstallationAdministrator()) throw conflict('This installation has an administrator already.');
  }

  /** @throws ProblemError 400 for what cannot be used, 409 when there is one already */
  async make({ email, name, siteName, password }: FirstAdministrator): Promise<{ personId: string; siteId: string }> {
    if (!/^[^\s@]+@[^\s@]+$/.test(email) || email.length > 254)
      throw badRequest(`"${email}" is not an e-mail address.`);
    if (name.trim() === '') throw badRequest('The name is empty.');
    if (siteName.trim() === '') throw badRequest("The site's name is empty.");
    const weak = passwordMistake(password, personalWords({ name, email }));
    if (weak !== undefined) throw badRequest(weak);
    const passwordHash = await this.passwords.hash(password);

    const at = this.now();
    const createdAt = at.toISOString();
    const personId = this.newId();
    const siteId = this.newId();
    const person = {
      id: personId,
      email,
      name: name.trim(),
      passwordHash,
      passwordChangedAt: createdAt,
      units: 'us' as const,
      theme: 'system' as const,
      timeZone: 'UTC',
      administersInstallation: true,
      disabledAt: null,
      createdAt,
    };
    this.people.inOneTransaction(() => {
      this.demandNone();
      this.people.insert(person, { at, action: 'person.create', subject: personId, details: { byCommand: true } });
      this.sites.insert({ id: siteId, name: siteName.trim(), ...NEW_SITE, createdAt });
      const grant = { at, siteId, action: 'role.give', subject: personId, details: { role: 'administrator' } };
      this.people.giveRole(personId, siteId, 'administrator', null, grant);
    });
    return { personId, siteId };
  }
}

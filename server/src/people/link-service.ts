import { passwordMistake, personalWords } from '@riseback/contracts';
import type { InvitationAcceptance, LinkTold } from '@riseback/contracts';
import type { Passwords } from '../platform/auth/passwords';
import type { Queries } from '../platform/db/database';
import { badRequest, conflict, notFound } from '../platform/problem';
import type { CredentialCheck, SignInOrigin } from './credential-check';
import type { NamedLink } from './link-repository';
import type { OneTimeLinks } from './one-time-links';
import type { PeopleRepository, PersonRow } from './people-repository';
import type { SitePeopleRepository } from './site-people-repository';

const IS_HERE = 'You have a role at this site already.';
const HAS_ACCOUNT = 'There is an account under this address by now. Accept with its own password.';

export interface LinkParts {
  readonly links: OneTimeLinks;
  readonly people: PeopleRepository;
  readonly sitePeople: SitePeopleRepository;
  readonly passwords: Passwords;
  readonly credentials: CredentialCheck;
  readonly newId: () => string;
  readonly now: () => Date;
}

/** An invitation with all that one has. */
interface Invited {
  readonly link: NamedLink;
  readonly siteId: string;
  readonly role: NonNullable<NamedLink['role']>;
}

/** For who has a link from a mail. */
export class LinkService {
  constructor(private readonly parts: LinkParts) {}

  /** @throws ProblemError 404 for a link that does not count */
  tell(token: string): LinkTold {
    const link = this.parts.links.demand(token);
    const { purpose, email, expiresAt, madeByName } = link;
    if (purpose === 'passwordReset') {
      return { purpose, email, expiresAt, ...(madeByName === null ? {} : { fromName: madeByName }) };
    }
    const { role } = invitedBy(link);
    const hasAccount = this.parts.people.findByEmail(email) !== undefined;
    return { purpose, email, siteName: link.siteName ?? '', role, fromName: madeByName ?? '', hasAccount, expiresAt };
  }

  /**
   * Gives the role: to a new account, or to the one under the address, whose owner proves that it is them.
   * @throws ProblemError 404 for a link that does not count, 400 for a name or password that will not do, 401 as at a
   *   sign-in, 409 for who has a role at the site by now
   */
  async accept({ token, name, password, code }: InvitationAcceptance, from: SignInOrigin): Promise<void> {
    const { links, people, credentials } = this.parts;
    const { email } = links.demand(token, 'invitation');
    if (people.findByEmail(email) === undefined) {
      await this.acceptAnew(token, name, password);
      return;
    }
    const proof = { email, password, ...(code === undefined ? {} : { code }) };
    await credentials.prove(proof, from, (person, _details, tx) => this.admit(token, person, tx));
  }

  private async acceptAnew(token: string, name: string | undefined, password: string): Promise<void> {
    const { links, people, passwords } = this.parts;
    const { email } = links.demand(token, 'invitation');
    if (name === undefined) {
      throw badRequest('A new account needs a name.', [{ pointer: '/name', detail: 'give your name' }]);
    }
    const mistake = passwordMistake(password, personalWords({ name, email }));
    if (mistake !== undefined) {
      throw badRequest('The password will not do.', [{ pointer: '/password', detail: mistake }]);
    }
    const passwordHash = await passwords.hash(password);
    people.inOneTransaction((tx) => {
      if (people.findByEmail(email) !== undefined) throw conflict(HAS_ACCOUNT);
      this.admit(token, this.insert(token, name, passwordHash), tx);
    });
  }

  /** In the units and time zone of who invited them, until they choose their own. */
  private insert(token: string, name: string, passwordHash: string): PersonRow {
    const { links, people, newId, now } = this.parts;
    const { id: linkId, email, madeBy } = links.demand(token, 'invitation');
    const inviter = madeBy === null ? undefined : people.find(madeBy);
    const at = now();
    const person: PersonRow = {
      id: newId(),
      email,
      name,
      passwordHash,
      passwordChangedAt: at.toISOString(),
      units: inviter?.units ?? 'us',
      theme: 'system',
      timeZone: inviter?.timeZone ?? 'UTC',
      administersInstallation: false,
      disabledAt: null,
      createdAt: at.toISOString(),
    };
    people.insert(person, { at, action: 'person.create', subject: person.id, details: { invitation: linkId } });
    return person;
  }

  /** On the link as it is by now. */
  private admit(token: string, person: PersonRow, tx: Queries): void {
    const { links, people, sitePeople, now } = this.parts;
    const { link, siteId, role } = invitedBy(links.demand(token, 'invitation'));
    if (sitePeople.find(siteId, person.id) !== undefined) throw conflict(IS_HERE);
    links.use(link, tx);
    people.giveRole(person.id, siteId, role, link.madeBy, {
      at: now(),
      personId: person.id,
      siteId,
      action: 'invitation.accept',
      subject: link.id,
      details: { role },
    });
  }
}

function invitedBy(link: NamedLink): Invited {
  const { siteId, role } = link;
  if (siteId === null || role === null) throw notFound('This link invites to no site.');
  return { link, siteId, role };
}

import type { Invitation, NewInvitation } from '@riseback/contracts';
import type { MailQueue } from '../mail/mail-queue';
import type { SiteAccess } from '../platform/auth/access';
import type { AuditEntry } from '../platform/db/audit';
import type { Queries } from '../platform/db/database';
import { conflict, notFound, tooManyRequests } from '../platform/problem';
import type { LinkRepository, NamedLink } from './link-repository';
import type { OneTimeLinks } from './one-time-links';
import type { PeopleRepository } from './people-repository';
import type { SitePeopleRepository } from './site-people-repository';

const HOUR_MS = 60 * 60_000;
/** Of a site: mails go to addresses of strangers, whom nobody asked. */
const MOST_AN_HOUR = 50;

const NO_INVITATION = 'There is no such invitation; it may have been accepted or withdrawn.';
const IS_HERE = 'Somebody with this address has a role at the site already. Change the role in the list of people.';
const IS_INVITED = 'An invitation to this address is open. Send it again, or withdraw it first.';

export interface InvitationParts {
  readonly links: OneTimeLinks;
  readonly linkRows: LinkRepository;
  readonly people: PeopleRepository;
  readonly sitePeople: SitePeopleRepository;
  readonly mails: MailQueue;
  readonly now: () => Date;
}

/** Asking people to a site by mail. */
export class InvitationService {
  constructor(private readonly parts: InvitationParts) {}

  list({ siteId }: SiteAccess): Invitation[] {
    return this.parts.linkRows.invitations(siteId).map((link) => this.shown(link));
  }

  /** @throws ProblemError 409 for who has a role here or was invited, 429 for too many within the hour */
  invite(access: SiteAccess, input: NewInvitation): Invitation {
    return this.parts.people.inOneTransaction((tx) => {
      const known = this.parts.people.findByEmail(input.email);
      if (known !== undefined && this.parts.sitePeople.find(access.siteId, known.id) !== undefined)
        throw conflict(IS_HERE);
      if (this.openTo(access, input.email) !== undefined) throw conflict(IS_INVITED);
      return this.send(access, input, 'invitation.make', tx);
    });
  }

  /** A fresh link; the one before does not work any more. @throws ProblemError 404, 429 */
  sendAgain(access: SiteAccess, id: string): Invitation {
    return this.parts.people.inOneTransaction((tx) => {
      const { email, role } = this.demand(access, id);
      if (role === null) throw notFound(NO_INVITATION);
      this.parts.linkRows.withdraw(id, this.parts.now().toISOString(), tx);
      return this.send(access, { email, role }, 'invitation.sendAgain', tx);
    });
  }

  /** @throws ProblemError 404 */
  withdraw(access: SiteAccess, id: string): void {
    this.parts.people.inOneTransaction((tx) => {
      const { email, role } = this.demand(access, id);
      this.parts.linkRows.withdraw(id, this.parts.now().toISOString(), tx);
      this.parts.people.note(this.entry(access, 'invitation.withdraw', id, { email, role }));
    });
  }

  private send(access: SiteAccess, { email, role }: NewInvitation, action: string, tx: Queries): Invitation {
    const { siteId, person } = access;
    this.demandFew(siteId);
    const link = this.parts.links.make({ purpose: 'invitation', email, to: { siteId, role }, madeBy: person.id }, tx);
    const siteName = this.parts.linkRows.siteName(siteId) ?? '';
    const data = { linkId: link.id, siteName, role, byName: person.name, expiresAt: link.expiresAt };
    // Addressed alike whether there is an account or not: the outbox must not tell this site's administrators.
    this.parts.mails.enqueue(tx, { purpose: 'invitation', siteId, email, data });
    this.parts.people.note(this.entry(access, action, link.id, { email, role }));
    return this.shown({ ...link, siteName, madeByName: person.name });
  }

  private demandFew(siteId: string): void {
    const since = new Date(this.parts.now().getTime() - HOUR_MS).toISOString();
    if (this.parts.linkRows.invitationsSince(siteId, since) < MOST_AN_HOUR) return;
    throw tooManyRequests('This site has sent many invitations within the hour. Go on a little later.', 900);
  }

  private openTo({ siteId }: SiteAccess, email: string): NamedLink | undefined {
    const same = email.toLowerCase();
    return this.parts.linkRows.invitations(siteId).find((link) => link.email.toLowerCase() === same);
  }

  private demand({ siteId }: SiteAccess, id: string): NamedLink {
    const link = this.parts.linkRows.invitations(siteId).find((open) => open.id === id);
    if (link === undefined) throw notFound(NO_INVITATION);
    return link;
  }

  private shown({ id, email, role, madeByName, madeAt, expiresAt }: NamedLink): Invitation {
    const expired = expiresAt <= this.parts.now().toISOString();
    return { id, email, role: role ?? 'viewer', madeByName: madeByName ?? '', madeAt, expiresAt, expired };
  }

  private entry(
    { person, siteId }: SiteAccess,
    action: string,
    subject: string,
    details: Readonly<Record<string, unknown>>,
  ): AuditEntry {
    return { at: this.parts.now(), personId: person.id, sessionId: person.sessionId, siteId, action, subject, details };
  }
}

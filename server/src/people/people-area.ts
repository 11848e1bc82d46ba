import type { MailQueue } from '../mail/mail-queue';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import type { Passwords } from '../platform/auth/passwords';
import type { SessionGate } from '../platform/auth/session-gate';
import type { Sessions } from '../platform/auth/sessions';
import { SignInGuard } from '../platform/auth/sign-in-guard';
import type { Database } from '../platform/db/database';
import type { Route } from '../platform/routes/route-table';
import { accountRoutes } from './account-routes';
import { CredentialCheck } from './credential-check';
import type { IdentityCheck } from './identity-check';
import { InvitationService } from './invitation-service';
import { LinkRepository } from './link-repository';
import { linkRoutes } from './link-routes';
import { LinkService } from './link-service';
import { OneTimeLinks } from './one-time-links';
import { OwnAccountService } from './own-account-service';
import { OwnSecurityService } from './own-security-service';
import { PasswordResetService } from './password-reset-service';
import type { PeopleRepository } from './people-repository';
import { peopleRoutes } from './people-routes';
import { securityRoutes } from './security-routes';
import { SignInService } from './sign-in-service';
import { SitePeopleRepository } from './site-people-repository';
import { SitePeopleService } from './site-people-service';

export interface PeopleAreaParts {
  readonly db: Database;
  readonly secret: string;
  readonly people: PeopleRepository;
  readonly passwords: Passwords;
  readonly codes: OneTimeCodes;
  readonly guard: SignInGuard;
  readonly identity: IdentityCheck;
  readonly sessions: Sessions;
  readonly gate: SessionGate;
  readonly mails: MailQueue;
  readonly newId: () => string;
  readonly now: () => Date;
}

/** All about people: signing in, one's own account, the people of a site, and the links that they are sent. */
export function buildPeopleArea(parts: PeopleAreaParts): { routes: Route[]; links: OneTimeLinks } {
  const { db, secret, people, passwords, codes, guard, identity, sessions, gate, newId, now } = parts;
  const sitePeople = new SitePeopleRepository(db);
  const linkRows = new LinkRepository(db);
  const links = new OneTimeLinks(linkRows, people, secret, newId, now);
  const credentials = new CredentialCheck(people, passwords, codes, guard, now);
  const shared = { ...parts, sitePeople, linkRows, links, credentials };
  const resets = new PasswordResetService({ ...shared, guard: new SignInGuard(now) });
  const account = new OwnAccountService(people, sessions, now);
  const security = new OwnSecurityService(people, passwords, codes, identity, sessions, now);
  return {
    links,
    routes: [
      ...accountRoutes(new SignInService(credentials, people, sessions), account, gate),
      ...securityRoutes(security, gate),
      ...linkRoutes(new LinkService(shared), resets),
      ...peopleRoutes(new SitePeopleService(sitePeople, people, codes, resets, now), new InvitationService(shared)),
    ],
  };
}

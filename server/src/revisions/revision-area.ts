import type { MailQueue } from '../mail/mail-queue';
import type { NetworkService } from '../networks/network-service';
import type { IdentityCheck } from '../people/identity-check';
import type { PeopleRepository } from '../people/people-repository';
import type { OneTimeCodes } from '../platform/auth/one-time-codes';
import { auditHeadLogOf, readAuditHeads } from '../platform/db/audit-head-log';
import type { Database } from '../platform/db/database';
import type { Route } from '../platform/routes/route-table';
import type { LiveSolves } from '../solve/live-solves';
import type { SolvePort } from '../solve/solve-port';
import { RevisionMails } from './revision-mails';
import { RevisionRepository } from './revision-repository';
import { revisionRoutes } from './revision-routes';
import { RevisionService, type RevisionListener } from './revision-service';
import { passingKeys, type SignatureKeys } from './signature-keys';
import { signingRoutes } from './signing-routes';
import { SigningService } from './signing-service';
import { VerificationService } from './verification-service';

export interface RevisionAreaParts {
  readonly db: Database;
  /** Absent = one for as long as the process lives, as the database in memory that it signs in. */
  readonly keys: SignatureKeys | undefined;
  readonly networks: NetworkService;
  readonly live: LiveSolves;
  readonly solver: SolvePort;
  readonly engineVersion: string;
  readonly people: PeopleRepository;
  readonly identity: IdentityCheck;
  readonly codes: OneTimeCodes;
  readonly mailQueue: MailQueue;
  readonly listener: RevisionListener;
  readonly newId: () => string;
  readonly now: () => Date;
}

export interface RevisionArea {
  /** For comments, which are held against what was frozen. */
  readonly service: RevisionService;
  readonly routes: readonly Route[];
}

/** Builds all of revisions by hand, as app.ts does for the rest. */
export function buildRevisionArea(parts: RevisionAreaParts): RevisionArea {
  const { db, networks, live, solver, engineVersion, people, identity, codes, listener, newId, now } = parts;
  const { signingKey, verifyingKeys } = parts.keys ?? passingKeys();
  const revisions = new RevisionRepository(db);
  const mails = new RevisionMails(parts.mailQueue);
  const service = new RevisionService(revisions, networks, live, mails, listener, { engineVersion, newId, now });
  const signing = new SigningService({
    ...{ revisions, service, people, identity, codes, mails, listener, now },
    key: signingKey,
  });
  const heads = () => (db.$client.memory ? [] : readAuditHeads(auditHeadLogOf(db.$client.name)));
  const verification = new VerificationService(revisions, { db, keys: verifyingKeys, heads, solver, engineVersion });
  return { service, routes: [...revisionRoutes(service), ...signingRoutes(signing, verification, verifyingKeys)] };
}

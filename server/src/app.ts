import cookieParser from 'cookie-parser';
import { roleMay } from '@riseback/contracts';
import express, { type Express, type RequestHandler } from 'express';
import { eventRoutes } from './events/event-routes';
import { EventService } from './events/event-service';
import { NetworkStreams } from './events/network-streams';
import { AuditRepository } from './audit/audit-repository';
import { auditRoutes } from './audit/audit-routes';
import { AuditService } from './audit/audit-service';
import { CommentMails } from './comments/comment-mails';
import { CommentRepository } from './comments/comment-repository';
import { commentRoutes } from './comments/comment-routes';
import { CommentService } from './comments/comment-service';
import { LibraryRepository } from './library/library-repository';
import { libraryRoutes } from './library/library-routes';
import { LibraryService } from './library/library-service';
import { mailRoutes } from './mail/mail-routes';
import { MailService } from './mail/mail-service';
import { Outbox } from './mail/outbox';
import { OutboxRepository } from './mail/outbox-repository';
import type { ReceivedMails } from './mail/sink/received-mails';
import { NetworkRepository } from './networks/network-repository';
import { networkRoutes } from './networks/network-routes';
import { NetworkService } from './networks/network-service';
import { IdentityCheck } from './people/identity-check';
import type { OneTimeLinks } from './people/one-time-links';
import { buildPeopleArea } from './people/people-area';
import { PeopleRepository } from './people/people-repository';
import { AccessRules, type NetworkAccess } from './platform/auth/access';
import { MembershipRepository } from './platform/auth/membership-repository';
import { OneTimeCodes } from './platform/auth/one-time-codes';
import { OneTimeRepository } from './platform/auth/one-time-repository';
import { SecretSeal } from './platform/auth/one-time-secret';
import { Passwords, type Hasher } from './platform/auth/passwords';
import { SessionGate } from './platform/auth/session-gate';
import { SessionRepository } from './platform/auth/session-repository';
import { SessionTokens } from './platform/auth/session-token';
import { Sessions } from './platform/auth/sessions';
import { SignInGuard } from './platform/auth/sign-in-guard';
import type { Config } from './platform/config';
import type { Database } from './platform/db/database';
import { healthRoutes } from './platform/health/health-routes';
import { ReadinessCheck } from './platform/health/readiness';
import { solvesOnePipe } from './platform/health/one-pipe';
import { SolverProbe } from './platform/health/solver-probe';
import { problemHandler } from './platform/http/problem-handler';
import { apiRateLimit, RATE_LIMITED } from './platform/http/rate-limit';
import { requestLog } from './platform/http/request-log';
import { securityHeaders } from './platform/http/security-headers';
import { webApplication } from './platform/http/web-application';
import type { Log } from './platform/log';
import { notFound } from './platform/problem';
import { openApiRoute } from './platform/routes/openapi';
import { registerRoutes } from './platform/routes/register-routes';
import type { Route } from './platform/routes/route-table';
import { PlanRepository } from './plans/plan-repository';
import { planRoutes } from './plans/plan-routes';
import { PlanService } from './plans/plan-service';
import { buildReadingArea } from './readings/reading-area';
import { buildRevisionArea } from './revisions/revision-area';
import type { SignatureKeys } from './revisions/signature-keys';
import { buildReportArea } from './reports/report-area';
import type { ReportRunner } from './reports/report-runner';
import type { ReportPort } from './reports/report-threads';
import { SiteRepository } from './sites/site-repository';
import { siteRoutes } from './sites/site-routes';
import { SiteService } from './sites/site-service';
import { SiteSettingsService } from './sites/site-settings-service';
import { ENGINE_VERSION } from './solve/engine-version';
import { LiveSolves } from './solve/live-solves';
import { ResultService } from './solve/result-service';
import type { FileSolver, SolvePort } from './solve/solve-port';
import { SolveRepository } from './solve/solve-repository';
import { solveRoutes } from './solve/solve-routes';

/** What the application is made of; a test hands in a database in memory and a clock of its own. */
export interface AppParts {
  readonly db: Database;
  readonly config: Config;
  readonly log: Log;
  readonly newId: () => string;
  readonly now: () => Date;
  readonly solver: SolvePort & FileSolver;
  readonly reportPort: ReportPort;
  /** Absent = signatures are made with a key of this process alone. */
  readonly keys?: SignatureKeys;
  /** Absent = passwords are hashed in this thread. */
  readonly hasher?: Hasher;
  /** Where mails are kept in the place of being sent. */
  readonly receivedMails?: ReceivedMails | undefined;
  /** The browser build; undefined while developing, when the pages come from their own server. */
  readonly webFolder: string | undefined;
  /** Sees every request first; counts, for one. */
  readonly observe?: RequestHandler;
  /** Between two signs of life on an open stream; each also checks that its reader may still see the network. */
  readonly heartbeatMs?: number;
}

export interface App {
  readonly handler: Express;
  /** Everything that is registered, each with its access rule. */
  readonly routes: readonly Route[];
  /** For the demo, which makes its network without a request. */
  readonly networks: NetworkService;
  /** Makes the reports that were ordered, also those that an earlier server left behind. */
  readonly reports: Pick<ReportRunner, 'takeUp' | 'close'>;
  /** For what sends the mails. */
  readonly post: { readonly outbox: Outbox; readonly repository: OutboxRepository; readonly links: OneTimeLinks };
  /** Ends the open streams, which would otherwise keep a stopping server waiting. */
  readonly endStreams: () => void;
}

export function buildApp(parts: AppParts): App {
  const { db, config, log, newId, now, solver } = parts;

  const tokens = new SessionTokens(config.sessionSecret);
  const sessions = new Sessions(new SessionRepository(db), tokens, newId, now);
  const gate = new SessionGate(sessions, tokens, config.origin, now);
  const people = new PeopleRepository(db);
  const passwords = new Passwords(parts.hasher);
  const guard = new SignInGuard(now);
  const codes = new OneTimeCodes(new OneTimeRepository(db), new SecretSeal(config.sessionSecret), guard, now);
  const identity = new IdentityCheck(people, passwords, codes, guard, now);
  const auditLog = new AuditService(new AuditRepository(db));
  const sites = new SiteService(new SiteRepository(db));
  const library = new LibraryService(new LibraryRepository(db), newId, now);
  const report = (error: unknown) => log.error({ err: error }, 'solve failed');
  const memberships = new MembershipRepository(db);
  const stillAllowed = ({ person, siteId }: NetworkAccess): boolean => {
    const role = sessions.isLive(person.sessionId) ? memberships.roleAtSite(person.id, siteId) : undefined;
    return role !== undefined && roleMay(role, 'view');
  };
  const { heartbeatMs } = parts;
  const streams = new NetworkStreams({ stillAllowed, now, ...(heartbeatMs === undefined ? {} : { heartbeatMs }) });
  const live = new LiveSolves(new SolveRepository(db), solver, {
    engineVersion: ENGINE_VERSION,
    newId,
    now,
    ended: (networkId, solverHash, state) => streams.solveEnded(networkId, solverHash, state),
    report,
  });
  const networks = new NetworkService(new NetworkRepository(db), live, streams, newId, now);
  const mails = new OutboxRepository(db);
  const outbox = new Outbox(mails, newId, now);
  const peopleArea = buildPeopleArea({
    ...{ db, people, passwords, codes, guard, identity, sessions, gate, newId, now },
    secret: config.sessionSecret,
    mails: outbox,
  });
  const plans = new PlanService(new PlanRepository(db), streams, newId, now);
  const events = new EventService(
    {
      headOf: (access) => networks.headOf(access),
      editsSince: (access, version) => networks.editsSince(access, version),
      solveState: (networkId, solverHash) => live.state(networkId, solverHash),
    },
    streams,
  );
  const reportArea = buildReportArea({
    ...{ db, live, people, memberships, stillAllowed, newId, now },
    port: parts.reportPort,
    engineVersion: ENGINE_VERSION,
    report: (error) => log.error({ err: error }, 'report failed'),
    ...(heartbeatMs === undefined ? {} : { heartbeatMs }),
  });
  const results = new ResultService(networks, live, solver, { engineVersion: ENGINE_VERSION, newId });
  const revisionArea = buildRevisionArea({
    ...{ db, networks, live, solver, people, identity, codes, newId, now },
    keys: parts.keys,
    engineVersion: ENGINE_VERSION,
    mailQueue: outbox,
    listener: streams,
  });
  const comments = new CommentService(new CommentRepository(db), {
    ...{ networks, newId, now },
    revisions: revisionArea.service,
    mails: new CommentMails(outbox),
    listener: streams,
  });
  const readingArea = buildReadingArea({ db, networks, listener: streams, now });
  const readiness = new ReadinessCheck(db, new SolverProbe(() => solvesOnePipe(solver), now));

  const routes: readonly Route[] = [
    ...healthRoutes(readiness),
    openApiRoute(() => routes),
    ...peopleArea.routes,
    ...mailRoutes(new MailService(mails, parts.receivedMails)),
    ...siteRoutes(sites, new SiteSettingsService(new SiteRepository(db), now)),
    ...auditRoutes(auditLog),
    ...libraryRoutes(library),
    ...networkRoutes(networks),
    ...planRoutes(plans),
    ...solveRoutes(results),
    ...revisionArea.routes,
    ...commentRoutes(comments),
    ...readingArea.routes,
    ...eventRoutes(events),
    ...reportArea.routes,
  ];

  const app = express();
  app.disable('x-powered-by');
  app.set('etag', false);
  app.set('trust proxy', config.trustProxy);
  app.set('query parser', 'simple');
  if (parts.observe !== undefined) app.use(parts.observe);
  app.use(requestLog(log, (req) => gate.identified(req)?.id));
  app.use(securityHeaders(config.origin?.protocol === 'https:'));
  app.use(cookieParser());
  app.use('/api', (_req, res, next) => {
    res.set('Cache-Control', 'no-store');
    next();
  });
  app.use(RATE_LIMITED, apiRateLimit(config.requestsPerMinute, gate));
  app.use(registerRoutes(routes, gate, new AccessRules(memberships)));
  app.use('/api', () => {
    throw notFound('There is nothing at this address of the API; /api/openapi.json lists what there is.');
  });
  if (parts.webFolder !== undefined) app.use(webApplication(parts.webFolder));
  app.use(() => {
    throw notFound('There is nothing at this address.');
  });
  app.use(problemHandler(log));
  const endStreams = () => {
    streams.close();
    reportArea.endStreams();
  };
  const post = { outbox, repository: mails, links: peopleArea.links };
  return { handler: app, routes, networks, reports: reportArea.runner, post, endStreams };
}

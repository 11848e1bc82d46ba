import { randomBytes, randomUUID } from 'node:crypto';
import { Writable } from 'node:stream';
import { ROLES, type Role } from '@riseback/contracts';
import type { RequestHandler } from 'express';
import request from 'supertest';
import { buildApp, type App } from '../../server/src/app';
import type { ReceivedMails } from '../../server/src/mail/sink/received-mails';
import type { Hasher } from '../../server/src/platform/auth/passwords';
import { SessionRepository } from '../../server/src/platform/auth/session-repository';
import { SessionTokens } from '../../server/src/platform/auth/session-token';
import { Sessions, type IssuedSession } from '../../server/src/platform/auth/sessions';
import { readConfig, type Config } from '../../server/src/platform/config';
import { openDatabase, type Database } from '../../server/src/platform/db/database';
import { memberships, people, sites } from '../../server/src/platform/db/schema';
import { createLog } from '../../server/src/platform/log';
import { makeReport } from '../../server/src/reports/report-material';
import type { ReportPort } from '../../server/src/reports/report-threads';
import type { SignatureKeys } from '../../server/src/revisions/signature-keys';
import { solveCases } from '../../server/src/solve/solve-cases';
import type { FileSolver, SolvePort } from '../../server/src/solve/solve-port';
import { solveText } from '../../server/src/solve/solve-text';

export type HttpMethod = 'get' | 'post' | 'put' | 'patch' | 'delete';
/** A person with each role at the site, one with a role elsewhere, and one with none anywhere. */
export type Who = Role | 'stranger' | 'outsider';

export const HOST = 'localhost:4310';
const START = new Date('2026-03-02T08:00:00.000Z');

/** Solves in the test's own thread. */
const inThread: SolvePort & FileSolver = {
  solve: (_key, job) => Promise.resolve({ end: 'finished', outcomes: solveCases(job), solveMs: 1 }),
  solveText: (_key, job) => Promise.resolve({ end: 'answered', answer: solveText(job) }),
};

export interface TestServerOptions {
  readonly config?: Partial<Config>;
  readonly solver?: SolvePort;
  readonly fileSolver?: FileSolver;
  readonly reportPort?: ReportPort;
  readonly hasher?: Hasher;
  readonly webFolder?: string;
  readonly heartbeatMs?: number;
  readonly receivedMails?: ReceivedMails;
  /** Kept in a file, where that matters. */
  readonly keys?: SignatureKeys;
  /** One on a disk, where that matters. */
  readonly db?: Database;
  readonly observe?: RequestHandler;
}

/** The application on a database in memory, with a clock that the test moves and everything it logs. */
export class TestServer {
  readonly db: Database;
  readonly config: Config;
  readonly app: App;
  readonly sessions: Sessions;
  readonly tokens: SessionTokens;
  readonly log: string[] = [];
  readonly siteId = 'site-a';
  readonly otherSiteId = 'site-b';
  private time = START.getTime();

  constructor(options: TestServerOptions = {}) {
    this.db = options.db ?? openDatabase(':memory:');
    const secret = randomBytes(48).toString('base64');
    const env = { NODE_ENV: 'test', RISEBACK_DB: ':memory:', RISEBACK_SESSION_SECRET: secret };
    this.config = { ...readConfig(env), ...options.config };
    const now = () => this.now();
    const sink = new Writable({
      write: (chunk: Buffer, _encoding, done) => {
        this.log.push(chunk.toString());
        done();
      },
    });
    this.app = buildApp({
      db: this.db,
      config: this.config,
      log: createLog(this.config, sink),
      newId: randomUUID,
      now,
      solver: solverOf(options),
      reportPort: options.reportPort ?? { make: makeReport },
      ...(options.hasher === undefined ? {} : { hasher: options.hasher }),
      ...(options.keys === undefined ? {} : { keys: options.keys }),
      receivedMails: options.receivedMails,
      webFolder: options.webFolder,
      ...(options.observe === undefined ? {} : { observe: options.observe }),
      ...(options.heartbeatMs === undefined ? {} : { heartbeatMs: options.heartbeatMs }),
    });
    this.tokens = new SessionTokens(this.config.sessionSecret);
    this.sessions = new Sessions(new SessionRepository(this.db), this.tokens, randomUUID, now);
    this.addPeople();
  }

  now(): Date {
    return new Date(this.time);
  }

  pass(ms: number): void {
    this.time += ms;
  }

  /** A session made in the database, without the cost of a password. */
  session(personId: string): IssuedSession {
    return this.sessions.start(personId, 'test');
  }

  /** A client with a session of that person, or without one; it proves where it comes from unless told not to. */
  as(who: Who | 'anonymous'): Client {
    return new Client(this, who === 'anonymous' ? undefined : this.session(who));
  }

  close(): void {
    this.app.reports.close();
    this.db.$client.close();
  }

  addPerson(id: string, passwordHash = '-'): void {
    const at = START.toISOString();
    this.db
      .insert(people)
      .values({
        id,
        email: `${id}@ternquay.example`,
        name: id,
        passwordHash,
        passwordChangedAt: at,
        units: 'us',
        theme: 'system',
        timeZone: 'UTC',
        createdAt: at,
      })
      .run();
  }

  private addPeople(): void {
    const at = START.toISOString();
    for (const id of [this.siteId, this.otherSiteId]) {
      const site = {
        id,
        name: id,
        atmosphericPressurePa: 101_325,
        ambientTemperatureK: 293.15,
        limits: {},
        createdAt: at,
      };
      this.db.insert(sites).values(site).run();
    }
    for (const id of [...ROLES, 'stranger', 'outsider']) this.addPerson(id);
    const grant = (personId: string, siteId: string, role: Role) =>
      this.db.insert(memberships).values({ personId, siteId, role, grantedAt: at }).run();
    for (const role of ROLES) grant(role, this.siteId, role);
    grant('outsider', this.otherSiteId, 'administrator');
  }
}

function solverOf({ solver = inThread, fileSolver = inThread }: TestServerOptions): SolvePort & FileSolver {
  return {
    solve: (key, job) => solver.solve(key, job),
    solveText: (key, job) => fileSolver.solveText(key, job),
  };
}

export class Client {
  readonly cookie: string | undefined;
  readonly proof: string | undefined;

  constructor(
    private readonly server: TestServer,
    readonly issued: IssuedSession | undefined,
  ) {
    this.cookie = issued === undefined ? undefined : `riseback-session=${issued.token}`;
    this.proof = issued === undefined ? undefined : server.tokens.forgeryProof(issued.sessionId);
  }

  send(method: HttpMethod, path: string): request.Test {
    const test = request(this.server.app.handler)[method](path).set('Host', HOST);
    if (this.cookie !== undefined) void test.set('Cookie', this.cookie);
    if (this.proof !== undefined && method !== 'get') void test.set('X-XSRF-TOKEN', this.proof);
    return test;
  }

  get(path: string): request.Test {
    return this.send('get', path);
  }

  post(path: string, body: object): request.Test {
    return this.send('post', path).send(body);
  }
}

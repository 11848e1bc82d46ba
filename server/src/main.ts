import { randomUUID } from 'node:crypto';
import { existsSync, mkdirSync } from 'node:fs';
import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '../demo/demo-people';
import { seedDemo } from '../demo/seed-demo';
import { buildApp } from './app';
import type { MailEnd } from './mail/mail-sender';
import { openPost, type Post } from './mail/open-post';
import { ReceivedMails } from './mail/sink/received-mails';
import { PeopleRepository } from './people/people-repository';
import { PasswordThreads } from './platform/auth/password-threads';
import { HASHES_AT_ONCE, Passwords } from './platform/auth/passwords';
import { keepBackups } from './platform/backup/keep-backups';
import { ConfigError, readConfig, type Config } from './platform/config';
import { openDatabase, type Database, UnusableDatabaseError } from './platform/db/database';
import { DatabaseInUseError, holdExclusively } from './platform/exclusive-use';
import { exitOnUncaught, shutDownGracefully } from './platform/graceful-shutdown';
import { createLog, logDestination, logFileOf } from './platform/log';
import { boundedServer } from './platform/http/http-server';
import { Metrics } from './platform/metrics/metrics';
import { serveMetrics } from './platform/metrics/metrics-server';
import { ReportThreads } from './reports/report-threads';
import { RevisionRepository } from './revisions/revision-repository';
import { passingKeys, type SignatureKeys } from './revisions/signature-keys';
import { openSigningKey } from './revisions/signing-key-file';
import { SolveThreads } from './solve/solve-threads';

/** For the person at the terminal; the log has its own place and form. */
function say(line: string): void {
  process.stdout.write(`${line}\n`);
}

async function start(): Promise<void> {
  // eslint-disable-next-line no-restricted-syntax -- read here once; everything else is handed its settings
  const config = readConfig(process.env);
  const logFile = logFileOf(config);
  const log = createLog(config, logDestination(logFile));
  exitOnUncaught(log);

  // The database holds password hashes, the log who did what: both are this account's alone.
  process.umask(0o077);
  say('Opening the database …');
  if (config.databasePath !== ':memory:') mkdirSync(dirname(config.databasePath), { recursive: true, mode: 0o700 });
  const hold = holdExclusively(config.databasePath);
  const report = (error: unknown) => log.error({ err: error }, 'database');
  const db = openDatabase(config.databasePath, { report });
  const metrics = new Metrics(config.databasePath);
  const threads = new SolveThreads({ report: (error) => log.error({ err: error }, 'solver') });
  const solver = { ...metrics.timed(threads), ...metrics.timedFiles(threads) };
  const hasher = new PasswordThreads({
    count: HASHES_AT_ONCE,
    report: (error) => log.error({ err: error }, 'hashing'),
  });
  const now = () => new Date();
  const observe = metrics.requestTimer();
  const reportPort = new ReportThreads();
  const receivedMails = config.mail.kind === 'sink' ? new ReceivedMails(config.mail.folder) : undefined;
  const keys = openKeys(config, db);
  const parts = { db, config, keys, log, newId: randomUUID, now, solver, reportPort, hasher, observe, receivedMails };
  const app = buildApp({ ...parts, webFolder: builtPages() });
  const people = new PeopleRepository(db);
  if (config.production) {
    refuseDemoPeople(people);
  } else {
    const hashPassword = (password: string) => new Passwords(hasher).hash(password);
    const seeded = await seedDemo({ db, solver, key: keys.signingKey, hashPassword, newId: randomUUID, now });
    if (seeded) say('The database is new: the demo site is in it.');
  }

  const ended = (madeAt: Date | undefined) => metrics.backupEnded(madeAt);
  const keeper = await keepBackups({ config, source: db.$client, now, log, ended });
  const server = boundedServer(app.handler);
  let post: Post | undefined;
  shutDownGracefully(server, log, app.endStreams, async () => {
    app.reports.close();
    await post?.close();
    await Promise.all([threads.close(), hasher.close(), reportPort.close(), keeper.stop()]);
    db.$client.close();
    hold.release();
  });
  await listen(server, config);
  app.reports.takeUp();
  if (config.metrics !== undefined) sayMetrics(await serveMetrics(metrics, config.metrics, log));
  const address = addressOf(server, config);
  const mailEnded = (end: MailEnd) => metrics.mailEnded(end);
  post = await openPost({ config, address, post: app.post, received: receivedMails, now, log, ended: mailEnded });
  log.info({ address, production: config.production }, 'listening');
  if (logFile !== undefined) say(`Requests are logged in ${logFile}`);
  if (config.production && config.backups === undefined)
    say('No backups are taken: name a folder in RISEBACK_BACKUP_FOLDER.');
  if (config.mail.kind === 'none')
    say('No mail is sent: name a mail server in RISEBACK_SMTP_URL. Until then mails wait in the outbox.');
  if (config.mail.kind === 'sink') say('Mails stay on this machine: administrators of a site read them there.');
  if (config.production) sayFirstAdministrator(people);
  else saySignIns(people);
  say(`Riseback: ${address}`);
}

/** In production a missing key is not made anew once something was signed: whoever lost it is to know. */
function openKeys({ signingKeyFile, production }: Config, db: Database): SignatureKeys {
  if (signingKeyFile === undefined) return passingKeys();
  const opened = openSigningKey(signingKeyFile, !production || !new RevisionRepository(db).hasSignatures());
  if (opened.isNew) {
    say(`A key to sign revisions with was made: ${signingKeyFile}. Keep a copy of it, apart from the database.`);
  }
  return opened;
}

/** Their password is printed in the documentation. */
function refuseDemoPeople(people: PeopleRepository): void {
  const demo = DEMO_PEOPLE.find(({ email }) => people.findByEmail(email) !== undefined);
  if (demo === undefined) return;
  throw new UnusableDatabaseError(
    'The database holds the demo people, whose password everybody knows; it cannot serve in production. Name another in RISEBACK_DB.',
  );
}

function sayFirstAdministrator(people: PeopleRepository): void {
  if (people.hasInstallationAdministrator()) return;
  say('Nobody can sign in yet. Make the first administrator, who is asked for a password:');
  say('  npm run first-administrator -- EMAIL "NAME" "SITE"');
}

function saySignIns(people: PeopleRepository): void {
  const known = DEMO_PEOPLE.filter(({ email }) => people.findByEmail(email) !== undefined);
  if (known.length === 0) return;
  say(`Sign in with the password ${DEMO_PASSWORD} as`);
  for (const { email, role } of known) say(`  ${email.padEnd(32)} ${role ?? 'no role at any site'}`);
}

function sayMetrics(server: Server): void {
  const { address, port } = server.address() as AddressInfo;
  say(`Figures for Prometheus: http://${address}:${String(port)}/metrics`);
}

/** Beside the bundle once built; while developing, the pages come from the web's own server. */
function builtPages(): string | undefined {
  const folder = fileURLToPath(new URL('../web/browser', import.meta.url));
  return existsSync(`${folder}/index.html`) ? folder : undefined;
}

function listen(server: Server, config: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(config.port, config.host, () => {
      server.off('error', reject);
      resolve();
    });
  });
}

function addressOf(server: Server, config: Config): string {
  if (config.origin !== undefined) return config.origin.origin;
  return `http://localhost:${String((server.address() as AddressInfo).port)}`;
}

/** What a person can mend: said in one line, without a stack. */
function isMendable(error: unknown): error is Error {
  const portTaken = error instanceof Error && 'syscall' in error && error.syscall === 'listen';
  return (
    error instanceof ConfigError ||
    error instanceof UnusableDatabaseError ||
    error instanceof DatabaseInUseError ||
    portTaken
  );
}

try {
  await start();
} catch (error) {
  if (!isMendable(error)) throw error;
  process.stderr.write(`Riseback cannot start. ${error.message}\n`);
  process.exit(1);
}

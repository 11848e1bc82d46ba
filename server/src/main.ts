import { randomUUID } from 'node:crypto';
import { existsSync, mkdirSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildApp } from './app';
import { PeopleRepository } from './people/people-repository';
import { ConfigError, readConfig, type Config } from './platform/config';
import { openDatabase, UnusableDatabaseError } from './platform/db/database';
import { DatabaseInUseError, holdExclusively } from './platform/exclusive-use';
import { exitOnUncaught, shutDownGracefully } from './platform/graceful-shutdown';
import { createLog, logDestination, logFileOf } from './platform/log';
import { SolveThread } from './solve/solve-thread';

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

  say('Opening the database …');
  if (config.databasePath !== ':memory:') mkdirSync(dirname(config.databasePath), { recursive: true, mode: 0o700 });
  const hold = holdExclusively(config.databasePath);
  const db = openDatabase(config.databasePath);
  const solver = new SolveThread({ report: (error) => log.error({ err: error }, 'solver') });
  const app = buildApp({ db, config, log, newId: randomUUID, now: () => new Date(), solver, webFolder: builtPages() });

  const server = createServer(app.handler);
  shutDownGracefully(server, log, async () => {
    await solver.close();
    db.$client.close();
    hold.release();
  });
  await listen(server, config);
  const address = addressOf(server, config);
  log.info({ address, production: config.production }, 'listening');
  if (logFile !== undefined) say(`Requests are logged in ${logFile}`);
  if (config.production && !new PeopleRepository(db).hasInstallationAdministrator()) {
    say('Nobody can sign in yet. Make the first administrator, who is asked for a password:');
    say('  npm run first-administrator -- EMAIL "NAME" "SITE"');
  }
  say(`Riseback: ${address}`);
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

import { randomUUID } from 'node:crypto';
import { createInterface } from 'node:readline/promises';
import { Writable } from 'node:stream';
import { PeopleRepository } from '../src/people/people-repository';
import { FirstAdministratorService } from '../src/people/first-administrator-service';
import { Passwords } from '../src/platform/auth/passwords';
import { openDatabase, type Database } from '../src/platform/db/database';
import { DatabaseInUseError, holdExclusively } from '../src/platform/exclusive-use';
import { ProblemError } from '../src/platform/problem';
import { SiteRepository } from '../src/sites/site-repository';
import { databasePath } from './command-line';

const USAGE = `Makes the person who administers this installation, and their first site.
  npm run first-administrator -- EMAIL "NAME" "SITE"
The password is asked for, or read from standard input when that is not a terminal.
`;

/** @returns the exit code: 0 made, 1 refused, 2 called wrongly */
async function firstAdministrator([email, name, siteName, ...rest]: readonly string[]): Promise<number> {
  if (email === undefined || name === undefined || siteName === undefined || rest.length > 0) {
    process.stderr.write(USAGE);
    return 2;
  }
  const db = openBesideServer(databasePath());
  try {
    const service = new FirstAdministratorService(
      new PeopleRepository(db),
      new SiteRepository(db),
      new Passwords(),
      randomUUID,
      () => new Date(),
    );
    service.demandNone();
    const { siteId } = await service.make({ email, name, siteName, password: await readPassword() });
    process.stdout.write(`${email} administers this installation and the site "${siteName}" (${siteId}).\n`);
    return 0;
  } catch (error) {
    if (!(error instanceof ProblemError)) throw error;
    process.stderr.write(`${error.message}\n`);
    return 1;
  } finally {
    db.$client.close();
  }
}

/** A server may be running, and be an older program than this command: then its database is not migrated under it. */
function openBesideServer(path: string): Database {
  try {
    const hold = holdExclusively(path);
    try {
      return openDatabase(path);
    } finally {
      hold.release();
    }
  } catch (error) {
    if (!(error instanceof DatabaseInUseError)) throw error;
    return openDatabase(path, { mayMigrate: false });
  }
}

/** One line; at a terminal it is not shown while it is typed. */
async function readPassword(): Promise<string> {
  const atTerminal = process.stdin.isTTY;
  if (atTerminal) process.stderr.write('Password: ');
  const unseen = new Writable({ write: (_chunk, _encoding, done) => done() });
  const lines = createInterface({ input: process.stdin, output: unseen, terminal: atTerminal });
  for await (const line of lines) {
    lines.close();
    if (atTerminal) process.stderr.write('\n');
    return line;
  }
  return '';
}

process.exitCode = await firstAdministrator(process.argv.slice(2));

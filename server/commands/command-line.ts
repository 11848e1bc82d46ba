import { resolve } from 'node:path';
import { ConfigError, databasePathOf, signingKeyFileOf } from '../src/platform/config';
import { BackupRefusedError } from '../src/platform/backup/backup-control';
import { UnusableBackupError } from '../src/platform/backup/sealed-copy';
import { UnusableDatabaseError } from '../src/platform/db/unusable-database';
import { DatabaseInUseError } from '../src/platform/exclusive-use';

/** What a person can mend: told in one line, without a stack. */
const MENDABLE = [ConfigError, BackupRefusedError, UnusableBackupError, UnusableDatabaseError, DatabaseInUseError];

/** The database that the settings name, as for the server. */
export function databasePath(): string {
  // eslint-disable-next-line no-restricted-syntax -- read here for every command, as main.ts does for the server
  return databasePathOf(process.env);
}

/** The signing key's place, as for the server; undefined beside a database in memory. */
export function signingKeyFile(): string | undefined {
  // eslint-disable-next-line no-restricted-syntax -- as above
  return signingKeyFileOf(process.env);
}

/** npm runs its scripts in the project's folder; a file is named from where the person stands. */
export function fileFromHere(name: string): string {
  // eslint-disable-next-line no-restricted-syntax -- npm's own word on where it was called
  return resolve(process.env['INIT_CWD'] ?? process.cwd(), name);
}

/** Runs a command to its exit code: 0 done, 1 refused, 2 called wrongly (undefined from `work`). */
export async function runCommand(
  usage: string,
  work: () => number | undefined | Promise<number | undefined>,
): Promise<void> {
  // what a command writes holds password hashes, as the database does
  process.umask(0o077);
  try {
    const code = await work();
    if (code === undefined) process.stderr.write(usage);
    process.exitCode = code ?? 2;
  } catch (error) {
    if (!isMendable(error)) throw error;
    process.stderr.write(`${error.message}\n`);
    process.exitCode = 1;
  }
}

function isMendable(error: unknown): error is Error {
  const ofSystem = error instanceof Error && 'code' in error && typeof error.code === 'string';
  return ofSystem || MENDABLE.some((kind) => error instanceof kind);
}

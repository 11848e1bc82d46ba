import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import Sqlite, { type RunResult } from 'better-sqlite3';
import { drizzle, type BetterSQLite3Database } from 'drizzle-orm/better-sqlite3';
import { migrate } from 'drizzle-orm/better-sqlite3/migrator';
import { readMigrationFiles } from 'drizzle-orm/migrator';
import type { BaseSQLiteDatabase } from 'drizzle-orm/sqlite-core';
import * as schema from './schema';

/** The one writing connection. */
export type Database = BetterSQLite3Database<typeof schema> & { $client: Sqlite.Database };
/** The connection or a transaction on it: what a repository's statements need. */
export type Queries = BaseSQLiteDatabase<'sync', RunResult, typeof schema>;

/** The database cannot be used as it is; the message says why and what to do. It stops the start. */
export class UnusableDatabaseError extends Error {
  override readonly name = 'UnusableDatabaseError';
}

const FULL = 2;

/** How long a statement waits for another process (a backup, a shell) before it gives up. */
const BUSY_TIMEOUT_MS = 5_000;

/**
 * Opens and, where needed, creates and migrates the database. Every accepted write is on the disk when its transaction
 * returns: write-ahead log with `synchronous = FULL`.
 * @param path a file, or ':memory:'
 * @throws UnusableDatabaseError when the file is damaged or was made by a newer program
 */
export function openDatabase(path: string): Database {
  const sqlite = new Sqlite(path, { timeout: BUSY_TIMEOUT_MS });
  try {
    refuseDamaged(sqlite, path);
    sqlite.pragma('journal_mode = WAL');
    const db = drizzle(sqlite, { schema });
    migrateWithoutForeignKeys(db, path);
    sqlite.pragma('foreign_keys = ON');
    demandFullSynchronous(sqlite);
    return db;
  } catch (error) {
    sqlite.close();
    throw error;
  }
}

function refuseDamaged(sqlite: Sqlite.Database, path: string): void {
  const damage = damageOf(sqlite);
  if (damage === undefined) return;
  throw new UnusableDatabaseError(`The database ${path} is damaged (${damage}): put back its last backup`);
}

/** What is wrong with the file, by SQLite's own words; a head that is none of SQLite's makes even the check throw. */
function damageOf(sqlite: Sqlite.Database): string | undefined {
  try {
    const answer: unknown = sqlite.pragma('quick_check(1)', { simple: true });
    return answer === 'ok' ? undefined : String(answer);
  } catch (error) {
    if (error instanceof Sqlite.SqliteError && ['SQLITE_NOTADB', 'SQLITE_CORRUPT'].includes(error.code))
      return error.message;
    throw error;
  }
}

/**
 * With foreign keys on, a migration that rebuilds a table would empty its cascading children without a word, so they are
 * off meanwhile and every reference is checked before they go on again. All migrations run in one transaction.
 */
function migrateWithoutForeignKeys(db: Database, path: string): void {
  const migrationsFolder = findMigrations();
  refuseNewer(
    db.$client,
    new Set(readMigrationFiles({ migrationsFolder }).map((migration) => migration.folderMillis)),
    path,
  );
  db.$client.pragma('foreign_keys = OFF');
  migrate(db, { migrationsFolder });
  const broken = db.$client.pragma('foreign_key_check') as unknown[];
  if (broken.length > 0) {
    throw new UnusableDatabaseError(
      `After its migration ${broken.length} rows of ${path} point at nothing: put back the last backup`,
    );
  }
}

function refuseNewer(sqlite: Sqlite.Database, known: ReadonlySet<number>, path: string): void {
  const table = sqlite.prepare("select 1 from sqlite_master where name = '__drizzle_migrations'").get();
  if (table === undefined) return;
  const applied = sqlite.prepare('select created_at from __drizzle_migrations').pluck().all();
  if (applied.some((at) => !known.has(Number(at)))) {
    throw new UnusableDatabaseError(
      `The database ${path} was made by a newer Riseback: start that one, or put back an older backup`,
    );
  }
}

/** Beside the sources while developing, beside `dist` when bundled: the nearest `drizzle` folder above this module. */
function findMigrations(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, 'drizzle', 'meta', '_journal.json'))) {
    const above = dirname(folder);
    if (above === folder)
      throw new UnusableDatabaseError('The folder "drizzle" with the migrations is missing beside the program');
    folder = above;
  }
  return join(folder, 'drizzle');
}

/** Under WAL the driver's build falls back to NORMAL at the connection's first write, so FULL is set after one and proved by another. */
function demandFullSynchronous(sqlite: Sqlite.Database): void {
  const write = (): unknown => sqlite.pragma('user_version = 1');
  write();
  sqlite.pragma('synchronous = FULL');
  write();
  const level: unknown = sqlite.pragma('synchronous', { simple: true });
  if (level !== FULL)
    throw new UnusableDatabaseError(`SQLite does not keep synchronous = FULL (it says ${String(level)})`);
}

import Sqlite, { type RunResult } from 'better-sqlite3';
import { drizzle, type BetterSQLite3Database } from 'drizzle-orm/better-sqlite3';
import type { BaseSQLiteDatabase } from 'drizzle-orm/sqlite-core';
import { backUpBeforeMigration } from '../backup/migration-backup';
import { keepAuditHeads } from './audit-head-log';
import { applyMigrations, findMigrations, pendingMigrations, readMigrations } from './migrations';
import * as schema from './schema';
import { damageOf, hasTable, orphanCount } from './sqlite-checks';
import { UnusableDatabaseError } from './unusable-database';

export { UnusableDatabaseError };

/** The one writing connection. */
export type Database = BetterSQLite3Database<typeof schema> & { $client: Sqlite.Database };
/** The connection or a transaction on it: what a repository's statements need. */
export type Queries = BaseSQLiteDatabase<'sync', RunResult, typeof schema>;

export interface OpenOptions {
  /** Told of what does not stop the opening but wants a person's eye. */
  readonly report?: (error: unknown) => void;
  /** False for a command beside a running server, whose program may be an older one. */
  readonly mayMigrate?: boolean;
  readonly migrationsFolder?: string;
}

const FULL = 2;

/** How long a statement waits for another process (a command, a shell) before it gives up. */
const BUSY_TIMEOUT_MS = 5_000;

/**
 * Opens and, where needed, creates and migrates the database. Every accepted write is on the disk when its transaction
 * returns: write-ahead log with `synchronous = FULL`. Before a migration a verified backup is laid beside it.
 * @param path a file, or ':memory:'
 * @throws UnusableDatabaseError when the file is damaged or was made by a newer program
 */
export function openDatabase(path: string, options: OpenOptions = {}): Database {
  const sqlite = new Sqlite(path, { timeout: BUSY_TIMEOUT_MS });
  try {
    refuseDamaged(sqlite);
    const isNew = !hasTable(sqlite);
    sqlite.pragma('journal_mode = WAL');
    sqlite.pragma('foreign_keys = OFF');
    migrate(sqlite, isNew, options);
    refuseOrphans(sqlite);
    sqlite.pragma('foreign_keys = ON');
    demandFullSynchronous(sqlite);
    const db = drizzle(sqlite, { schema });
    if (!sqlite.memory) keepAuditHeads(db, { isNew, report: options.report ?? (() => undefined) });
    return db;
  } catch (error) {
    sqlite.close();
    throw error;
  }
}

function refuseDamaged(sqlite: Sqlite.Database): void {
  const damage = damageOf(sqlite, 'quick_check');
  if (damage === undefined) return;
  throw new UnusableDatabaseError(`The database ${sqlite.name} is damaged (${damage}): put back its last backup`);
}

function migrate(sqlite: Sqlite.Database, isNew: boolean, { mayMigrate = true, migrationsFolder }: OpenOptions): void {
  const pending = pendingMigrations(sqlite, readMigrations(migrationsFolder ?? findMigrations()));
  const [first] = pending;
  if (first === undefined) return;
  if (!mayMigrate) {
    throw new UnusableDatabaseError(
      `The database ${sqlite.name} is older than this program, and a server is using it: stop that server, and start it again as the new program`,
    );
  }
  if (!isNew) backUpBeforeMigration(sqlite, first.tag);
  applyMigrations(sqlite, pending);
}

function refuseOrphans(sqlite: Sqlite.Database): void {
  const orphans = orphanCount(sqlite);
  if (orphans > 0)
    throw new UnusableDatabaseError(`${orphans} rows of ${sqlite.name} point at nothing: put back the last backup`);
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

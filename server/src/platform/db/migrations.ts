import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type Sqlite from 'better-sqlite3';
import { readMigrationFiles } from 'drizzle-orm/migrator';
import * as z from 'zod';
import { hasTable, orphanCount } from './sqlite-checks';
import { UnusableDatabaseError } from './unusable-database';

export interface Migration {
  /** Such as `0001_append-only`. */
  readonly tag: string;
  /** When it was generated; what a database remembers it by. */
  readonly when: number;
  readonly hash: string;
  readonly statements: readonly string[];
}

const Journal = z.object({ entries: z.array(z.object({ when: z.number(), tag: z.string() })) });

/** Beside the sources while developing, beside `dist` when bundled: the nearest `drizzle` folder above this module. */
export function findMigrations(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, 'drizzle', 'meta', '_journal.json'))) {
    const above = dirname(folder);
    if (above === folder)
      throw new UnusableDatabaseError('The folder "drizzle" with the migrations is missing beside the program');
    folder = above;
  }
  return join(folder, 'drizzle');
}

/** In the order in which they are to be applied. */
export function readMigrations(migrationsFolder: string): Migration[] {
  const { entries } = Journal.parse(JSON.parse(readFileSync(join(migrationsFolder, 'meta', '_journal.json'), 'utf8')));
  const tags = new Map(entries.map(({ when, tag }) => [when, tag]));
  return readMigrationFiles({ migrationsFolder }).map(({ folderMillis, hash, sql }) => {
    return { tag: tags.get(folderMillis) ?? String(folderMillis), when: folderMillis, hash, statements: sql };
  });
}

/** Those that a database still lacks. @throws UnusableDatabaseError when it has one that this program does not know */
export function pendingMigrations(sqlite: Sqlite.Database, migrations: readonly Migration[]): Migration[] {
  const applied = new Set(appliedMigrations(sqlite));
  const known = new Set(migrations.map(({ when }) => when));
  if ([...applied].some((when) => !known.has(when))) {
    throw new UnusableDatabaseError(
      `The database ${sqlite.name} was made by a newer Riseback: start that one, or put back an older backup`,
    );
  }
  return migrations.filter(({ when }) => !applied.has(when));
}

function appliedMigrations(sqlite: Sqlite.Database): number[] {
  if (!hasTable(sqlite, '__drizzle_migrations')) return [];
  return sqlite.prepare('select created_at from __drizzle_migrations').pluck().all().map(Number);
}

/**
 * Applies migrations and checks every reference, all in one transaction: a process killed meanwhile, a statement that
 * fails or a row left pointing at nothing leaves the old schema. The list of migrations has the form that drizzle's own
 * migrator gives it; that migrator commits before the references can be checked. Foreign keys must be off: with them on,
 * a rebuilt table would empty its cascading children without a word.
 * @throws UnusableDatabaseError when rows would point at nothing
 */
export function applyMigrations(sqlite: Sqlite.Database, pending: readonly Migration[]): void {
  const apply = sqlite.transaction(() => {
    sqlite.exec(
      'CREATE TABLE IF NOT EXISTS `__drizzle_migrations` (id SERIAL PRIMARY KEY, hash text NOT NULL, created_at numeric)',
    );
    const remember = sqlite.prepare('insert into __drizzle_migrations (hash, created_at) values (?, ?)');
    for (const { hash, when, statements } of pending) {
      for (const statement of statements) sqlite.exec(statement);
      remember.run(hash, when);
    }
    const orphans = orphanCount(sqlite);
    if (orphans > 0) {
      throw new UnusableDatabaseError(
        `${orphans} rows of ${sqlite.name} would point at nothing after its migration, which was not made: put back the last backup`,
      );
    }
  });
  apply.immediate();
}

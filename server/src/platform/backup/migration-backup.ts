import { rmSync } from 'node:fs';
import type Sqlite from 'better-sqlite3';
import { publish, sealCopy } from './sealed-copy';

/**
 * Copies a database as it is before a migration and checks the copy. Nobody else writes at that moment, so that
 * `VACUUM INTO`, which needs no event loop, takes the place of the backup from the running server.
 * @param tag of the first migration that will be made
 * @returns the backup's path; one left by an earlier try is replaced
 */
export function backUpBeforeMigration(sqlite: Sqlite.Database, tag: string): string {
  const path = `${sqlite.name}-before-${tag}`;
  const part = `${path}.part`;
  rmSync(part, { force: true });
  try {
    sqlite.prepare('vacuum into ?').run(part);
    sealCopy(part, new Date().toISOString());
    publish(part, path);
  } finally {
    rmSync(part, { force: true });
  }
  return path;
}

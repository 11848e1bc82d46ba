import { spawn } from 'node:child_process';
import { copyFileSync, cpSync, existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { verifyBackup } from '../../server/src/platform/backup/sealed-copy';
import { openDatabase } from '../../server/src/platform/db/database';
import { findMigrations } from '../../server/src/platform/db/migrations';
import { FULL, randomFrom, seedOfRun } from './test-form';

const ROUNDS = FULL ? 40 : 5;
const ROWS = 60_000;
const NEXT = '0099_next';
/** Long enough to be met half-way: a table of many rows, filled in two statements and indexed. */
const SLOW = `CREATE TABLE grown (id integer PRIMARY KEY, word text NOT NULL) STRICT;
--> statement-breakpoint
WITH RECURSIVE n(i) AS (SELECT 1 UNION ALL SELECT i + 1 FROM n WHERE i < ${ROWS}) INSERT INTO grown SELECT i, hex(randomblob(40)) FROM n;
--> statement-breakpoint
CREATE INDEX grown_word ON grown (word);
--> statement-breakpoint
UPDATE grown SET word = lower(word);`;

let folder = '';
let original = '';
let migrationsFolder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-migration-'));
  original = join(folder, 'original.db');
  const sqlite = new Sqlite(original);
  sqlite.exec(readFileSync(join(import.meta.dirname, '../fixtures/schemas/0001_append-only.sql'), 'utf8'));
  sqlite.close();
  openDatabase(original).$client.close();
  migrationsFolder = join(folder, 'drizzle');
  cpSync(findMigrations(), migrationsFolder, { recursive: true });
  const journalFile = join(migrationsFolder, 'meta/_journal.json');
  const journal = JSON.parse(readFileSync(journalFile, 'utf8')) as { entries: object[] };
  journal.entries.push({ idx: 99, version: '6', when: 9_000_000_000_000, tag: NEXT, breakpoints: true });
  writeFileSync(journalFile, JSON.stringify(journal));
  writeFileSync(join(migrationsFolder, `${NEXT}.sql`), SLOW);
});
afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

/** @returns how long the opening lasted, in ms; it was killed if that was asked for and it was still going on */
async function migrate(path: string, killAfterMs?: number): Promise<number> {
  const child = spawn(process.execPath, [
    '--import',
    'tsx',
    'tests/faults/migrating-process.ts',
    path,
    migrationsFolder,
  ]);
  const ended = new Promise<void>((resolve) => child.once('close', () => resolve()));
  let openedAt = 0;
  let lastedMs = Infinity;
  let errors = '';
  child.stderr.on('data', (chunk: Buffer) => (errors += chunk.toString()));
  child.stdout.on('data', (chunk: Buffer) => {
    const said = chunk.toString();
    if (said.includes('opening')) {
      openedAt = performance.now();
      if (killAfterMs !== undefined) setTimeout(() => child.kill('SIGKILL'), killAfterMs);
    }
    if (said.includes('open\n')) lastedMs = performance.now() - openedAt;
  });
  await ended;
  expect(errors).toBe('');
  return lastedMs;
}

it('leaves the old database or the new one when it is killed, and a backup that is whole or none', async () => {
  const random = randomFrom(seedOfRun('killed migrations'));
  const whole = join(folder, 'whole.db');
  copyFileSync(original, whole);
  const lastsMs = await migrate(whole);
  let old = 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    const path = join(folder, `round-${round}.db`);
    copyFileSync(original, path);
    await migrate(path, random() * lastsMs);

    const sqlite = new Sqlite(path);
    expect(sqlite.pragma('integrity_check', { simple: true })).toBe('ok');
    const isNew = sqlite
      .prepare('select count(*) from __drizzle_migrations where created_at = 9000000000000')
      .pluck()
      .get();
    const tables = sqlite.prepare("select count(*) from sqlite_schema where name glob 'grown*'").pluck().get();
    expect(tables).toBe(isNew === 1 ? 2 : 0);
    if (isNew === 1) expect(sqlite.prepare('select count(*) from grown').pluck().get()).toBe(ROWS);
    else old += 1;
    sqlite.close();
    if (existsSync(`${path}-before-${NEXT}`)) verifyBackup(`${path}-before-${NEXT}`);
    else expect(isNew).toBe(0);

    // the next start finishes what the killed one began
    const db = openDatabase(path, { migrationsFolder });
    expect(db.$client.prepare('select count(*) from grown').pluck().get()).toBe(ROWS);
    db.$client.close();
  }
  // or the kills came too late to mean anything
  expect(old).toBeGreaterThan(0);
}, 600_000);

import { cpSync, existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { basename, join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { toFile } from '@riseback/network';
import { solverHashOf } from '../../server/src/networks/network-hashes';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { verifyBackup } from '../../server/src/platform/backup/sealed-copy';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { contentHash } from '../../server/src/platform/db/content-hash';
import { openDatabase, UnusableDatabaseError } from '../../server/src/platform/db/database';
import { findMigrations, readMigrations } from '../../server/src/platform/db/migrations';

const FIXTURES = join(import.meta.dirname, '../fixtures/schemas');
const released = readdirSync(FIXTURES).filter((name) => name.endsWith('.sql'));
const newest = readMigrations(findMigrations()).at(-1)?.tag;

let folder = '';
let path = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-upgrade-'));
  path = join(folder, 'riseback.db');
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

function load(fixture: string): Map<string, number> {
  const sqlite = new Sqlite(path);
  sqlite.exec(readFileSync(join(FIXTURES, fixture), 'utf8'));
  const counts = countsOf(sqlite);
  sqlite.close();
  return counts;
}

function countsOf(sqlite: Sqlite.Database): Map<string, number> {
  const names = sqlite
    .prepare("select name from sqlite_schema where type = 'table' and name not glob 'sqlite_*' and name <> ?")
    .pluck()
    .all('__drizzle_migrations')
    .map(String);
  const count = (name: string) => Number(sqlite.prepare(`select count(*) from "${name}"`).pluck().get());
  return new Map(names.map((name) => [name, count(name)]));
}

describe('every schema that was released', () => {
  it('has its fixture; after a new migration run tests/fixtures/schemas/write-fixture.ts', () => {
    expect(released.map((name) => basename(name, '.sql'))).toContain(newest);
  });

  it.each(released)('%s comes to the present schema with all that it held', (fixture) => {
    const before = load(fixture);
    for (const [table, count] of before) expect(count, table).toBeGreaterThan(0);
    const db = openDatabase(path);
    const after = countsOf(db.$client);
    for (const [table, count] of before) expect(after.get(table), table).toBe(count);
    expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok');
    expect(db.$client.pragma('foreign_key_check')).toEqual([]);
    expect(firstBrokenAuditRow(db)).toBeUndefined();
    const networks = new NetworkRepository(db);
    const ids = db.$client.prepare('select id from networks').pluck().all().map(String);
    for (const id of ids) {
      const document = networks.document(id);
      if (document === undefined) throw new Error(`${id} cannot be read`);
      expect(toFile(document).nodes.length).toBeGreaterThan(0);
      expect(solverHashOf(document)).toBe(networks.head(id)?.solverHash);
    }
    db.$client.close();
  });
});

describe('a migration', () => {
  const NEXT = '0099_next';

  /** The released migrations and one more. */
  function withNext(sql: string): string {
    const migrationsFolder = join(folder, 'drizzle');
    cpSync(findMigrations(), migrationsFolder, { recursive: true });
    const journalFile = join(migrationsFolder, 'meta/_journal.json');
    const journal = JSON.parse(readFileSync(journalFile, 'utf8')) as { entries: object[] };
    journal.entries.push({ idx: 99, version: '6', when: 9_000_000_000_000, tag: NEXT, breakpoints: true });
    writeFileSync(journalFile, JSON.stringify(journal));
    writeFileSync(join(migrationsFolder, `${NEXT}.sql`), sql);
    return migrationsFolder;
  }

  /** How drizzle-kit changes a column: a new table, filled from the old one, in its place. */
  const REBUILD = `CREATE TABLE __new_sites (id text PRIMARY KEY NOT NULL, name text NOT NULL, atmospheric_pressure_pa real NOT NULL,
      ambient_temperature_k real NOT NULL, limits text NOT NULL, tag_pattern text, created_at text NOT NULL, region text) STRICT;
    --> statement-breakpoint
    INSERT INTO __new_sites SELECT id, name, atmospheric_pressure_pa, ambient_temperature_k, limits, tag_pattern, created_at, 'north' FROM sites;
    --> statement-breakpoint
    DROP TABLE sites;
    --> statement-breakpoint
    ALTER TABLE __new_sites RENAME TO sites;`;

  function oldHash(): string {
    load(`${newest}.sql`);
    const sqlite = new Sqlite(path);
    const hash = contentHash(sqlite);
    sqlite.close();
    return hash;
  }

  it('that rebuilds a table keeps what points at it, and lays a verified backup beside the database first', () => {
    const hash = oldHash();
    const db = openDatabase(path, { migrationsFolder: withNext(REBUILD) });
    expect(db.$client.prepare('select distinct region from sites').pluck().all()).toEqual(['north']);
    expect(db.$client.prepare('select count(*) from memberships').pluck().get()).toBeGreaterThan(4);
    expect(db.$client.pragma('foreign_keys', { simple: true })).toBe(1);
    db.$client.close();
    expect(verifyBackup(`${path}-before-${NEXT}`).contentHash).toBe(hash);
  });

  it.each([
    [
      'fails half-way',
      `${REBUILD}\n--> statement-breakpoint\nINSERT INTO nowhere VALUES (1);`,
      /no such table: nowhere/,
    ],
    ['leaves rows that point at nothing', 'DELETE FROM sites;', /would point at nothing after its migration/],
  ])('that %s leaves the old database', (_name, sql, message) => {
    const hash = oldHash();
    const migrationsFolder = withNext(sql);
    expect(() => openDatabase(path, { migrationsFolder })).toThrow(message);
    const db = openDatabase(path);
    expect(contentHash(db.$client)).toBe(hash);
    db.$client.close();
  });

  it('is not begun when the backup before it fails', () => {
    const hash = oldHash();
    const migrationsFolder = withNext(REBUILD);
    // a folder of the backup's name: it cannot take its place
    cpSync(FIXTURES, `${path}-before-${NEXT}`, { recursive: true });
    expect(() => openDatabase(path, { migrationsFolder })).toThrow();
    const db = openDatabase(path);
    expect(contentHash(db.$client)).toBe(hash);
    db.$client.close();
  });

  it('is not made under a running server by a command', () => {
    oldHash();
    const migrationsFolder = withNext(REBUILD);
    expect(() => openDatabase(path, { migrationsFolder, mayMigrate: false })).toThrow(UnusableDatabaseError);
    expect(existsSync(`${path}-before-${NEXT}`)).toBe(false);
  });

  it('is made once, and never for a new database with a backup', () => {
    const migrationsFolder = withNext(REBUILD);
    openDatabase(path, { migrationsFolder }).$client.close();
    openDatabase(path, { migrationsFolder }).$client.close();
    expect(existsSync(`${path}-before-${NEXT}`)).toBe(false);
    expect(() => openDatabase(path)).toThrow(/newer Riseback/);
  });
});

import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { appendAudit } from '../../server/src/platform/db/audit';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { openDatabase, UnusableDatabaseError } from '../../server/src/platform/db/database';
import { makeNetwork } from './network-samples';
import { TestServer } from './test-server';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-'));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

describe('the tables', () => {
  const { $client: sqlite } = openDatabase(':memory:');
  const tables = sqlite
    .prepare(
      "select name, strict from pragma_table_list where schema = 'main' and type = 'table' and name not glob 'sqlite_*'",
    )
    .all() as { name: string; strict: number }[];

  it('are all STRICT, but for the list of migrations, which the migrator makes', () => {
    expect(tables.filter(({ strict }) => strict === 0).map(({ name }) => name)).toEqual(['__drizzle_migrations']);
    expect(tables.length).toBeGreaterThan(16);
  });

  it('hold JSON only where it is JSON', () => {
    const insert = sqlite.prepare(
      "insert into sites (id, name, atmospheric_pressure_pa, ambient_temperature_k, limits, created_at) values ('s', 'S', 1.0, 2.0, ?, '')",
    );
    expect(() => insert.run('{"a":')).toThrow(/CHECK constraint failed: sites_limits/);
    expect(() => insert.run('{}')).not.toThrow();
  });

  it('hold numbers only where numbers belong, and names only from their lists', () => {
    expect(() => sqlite.exec("update sites set ambient_temperature_k = 'warm'")).toThrow(
      /cannot store TEXT value in REAL/,
    );
    const insert = sqlite.prepare(
      "insert into people (id, email, name, password_hash, password_changed_at, units, theme, time_zone, created_at) values (?, ?, 'n', 'h', '', ?, 'dark', 'UTC', '')",
    );
    expect(() => insert.run('p', 'a@b.example', 'imperial')).toThrow(/CHECK constraint failed: people_units/);
    insert.run('p', 'a@b.example', 'us');
    expect(() => insert.run('q', 'A@B.example', 'us')).toThrow(/UNIQUE constraint failed/);
  });

  it('refer only to what is there', () => {
    expect(sqlite.pragma('foreign_keys', { simple: true })).toBe(1);
    expect(() => sqlite.exec("insert into memberships values ('p', 'nowhere', 'viewer', null, '')")).toThrow(
      /FOREIGN KEY/,
    );
  });
});

describe('elements', () => {
  it('cannot refer to those of another network', async () => {
    const server = new TestServer();
    const [a, b] = [
      await makeNetwork(server.as('designer'), server.siteId),
      await makeNetwork(server.as('designer'), server.siteId),
    ];
    server.db.$client.exec(
      `insert into nodes (network_id, id, kind, elevation_m, ordinal, changed_in, properties) values ('${a}', 'X1', 'junction', 0, 9, 1, '{}')`,
    );
    const pipe = (networkId: string) =>
      `insert into pipes (network_id, id, from_node, to_node, length_m, ordinal, changed_in, properties) values ('${networkId}', 'X', 'X1', 'J1', 1, 9, 1, '{}')`;
    expect(() => server.db.$client.exec(pipe(b))).toThrow(/FOREIGN KEY/);
    expect(() => server.db.$client.exec(pipe(a))).not.toThrow();
    server.close();
  });

  it('and their edits stay as they were accepted', async () => {
    const server = new TestServer();
    await makeNetwork(server.as('designer'), server.siteId);
    expect(() => server.db.$client.exec("update edits set label = 'x'")).toThrow(/accepted edits are never changed/);
    expect(() => server.db.$client.exec('delete from edits')).toThrow(/accepted edits are never deleted/);
    server.close();
  });
});

describe('the log', () => {
  function withLog() {
    const db = openDatabase(':memory:');
    for (let i = 0; i < 5; i += 1) appendAudit(db, { at: new Date(i), action: 'a', subject: `s${i}`, details: { i } });
    return db;
  }

  it('refuses to be changed or emptied', () => {
    const { $client: sqlite } = withLog();
    expect(() => sqlite.exec("update audit set action = 'b'")).toThrow(/never changed/);
    expect(() => sqlite.exec('delete from audit')).toThrow(/never deleted/);
  });

  it.each([
    { name: 'untouched', tamper: 'select 1', broken: undefined },
    { name: 'a changed row', tamper: "update audit set subject = 'x' where seq = 3", broken: 3 },
    { name: 'changed details', tamper: `update audit set details = '{"i":9}' where seq = 2`, broken: 2 },
    { name: 'a row with a hash of its own', tamper: "update audit set hash = 'ff' where seq = 4", broken: 4 },
    { name: 'a removed row', tamper: 'delete from audit where seq = 2', broken: 2 },
    { name: 'a removed first row', tamper: 'delete from audit where seq = 1', broken: 1 },
    {
      name: 'two rows changed about',
      tamper:
        'update audit set seq = 9 where seq = 2; update audit set seq = 2 where seq = 3; update audit set seq = 3 where seq = 9',
      broken: 2,
    },
  ])('shows what was done to it behind its triggers: $name', ({ tamper, broken }) => {
    const db = withLog();
    db.$client.exec(`drop trigger audit_no_update; drop trigger audit_no_delete; ${tamper}`);
    expect(firstBrokenAuditRow(db)).toBe(broken);
  });

  it('is stored only with what it records', () => {
    const db = openDatabase(':memory:');
    const failing = () =>
      db.transaction((tx) => {
        appendAudit(tx, { at: new Date(0), action: 'a', subject: 's' });
        throw new Error('the change fails');
      });
    expect(failing).toThrow('the change fails');
    expect(db.$client.prepare('select count(*) from audit').pluck().get()).toBe(0);
  });
});

describe('opening', () => {
  it('makes every accepted write durable: write-ahead log, synchronous FULL after the first write too', () => {
    const path = join(folder, 'full.db');
    for (let i = 0; i < 2; i += 1) {
      const { $client: sqlite } = openDatabase(path);
      sqlite.exec(`insert into sites values ('s${i}', 'S', 1.0, 2.0, '{}', null, '')`);
      expect(sqlite.pragma('journal_mode', { simple: true })).toBe('wal');
      expect(sqlite.pragma('synchronous', { simple: true })).toBe(2);
      sqlite.close();
    }
  });

  it('refuses a database of a newer program, and leaves it as it is', () => {
    const path = join(folder, 'newer.db');
    const { $client: sqlite } = openDatabase(path);
    sqlite.exec("insert into __drizzle_migrations (hash, created_at) values ('x', 9999999999999)");
    sqlite.close();
    expect(() => openDatabase(path)).toThrow(UnusableDatabaseError);
    expect(() => openDatabase(path)).toThrow(/newer Riseback/);
  });

  it('refuses a damaged file', () => {
    const path = join(folder, 'damaged.db');
    writeFileSync(path, 'this is no database, though it is long enough to be taken for the head of one'.repeat(100));
    expect(() => openDatabase(path)).toThrow(UnusableDatabaseError);
  });

  it('refuses a database whose rows point at nothing', () => {
    const path = join(folder, 'orphans.db');
    openDatabase(path).$client.close();
    const sqlite = new Sqlite(path);
    sqlite.pragma('foreign_keys = off');
    sqlite.exec("insert into memberships values ('nobody', 'nowhere', 'viewer', null, '')");
    sqlite.close();
    expect(() => openDatabase(path)).toThrow(/point at nothing/);
  });
});

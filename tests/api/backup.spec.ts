import { copyFileSync, existsSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import {
  BackupRefusedError,
  listenForBackupOrders,
  orderBackup,
} from '../../server/src/platform/backup/backup-control';
import { BackupSchedule } from '../../server/src/platform/backup/backup-schedule';
import { Backups } from '../../server/src/platform/backup/backups';
import { drillRestore, restoreBackup } from '../../server/src/platform/backup/restore';
import { sealAside } from '../../server/src/platform/backup/seal-aside';
import { sealCopy, UnusableBackupError, verifyBackup } from '../../server/src/platform/backup/sealed-copy';
import { appendAudit } from '../../server/src/platform/db/audit';
import { checkAudit } from '../../server/src/platform/db/audit-check';
import { auditHeadLogOf, readAuditHeads } from '../../server/src/platform/db/audit-head-log';
import { contentHash } from '../../server/src/platform/db/content-hash';
import { openDatabase, UnusableDatabaseError, type Database } from '../../server/src/platform/db/database';
import { sites } from '../../server/src/platform/db/schema';
import { DatabaseInUseError, holdExclusively } from '../../server/src/platform/exclusive-use';

let folder = '';
let path = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-backup-'));
  path = join(folder, 'riseback.db');
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

const now = () => new Date('2026-03-02T08:00:00.000Z');
const backupsOf = (db: Database) => new Backups({ source: db.$client, seal: sealCopy, now });
const inFolder = (name: string) => join(folder, name);

/** One transaction that writes a site and the row of the log that tells of it. */
function addSite(db: Database, id: string): void {
  const site = { id, name: `Site ${id}`, atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15, limits: {} };
  db.transaction((tx) => {
    tx.insert(sites)
      .values({ ...site, createdAt: '' })
      .run();
    appendAudit(tx, { at: now(), siteId: id, action: 'site.create', subject: id });
  });
}

function databaseWithSites(count: number): Database {
  const db = openDatabase(path);
  // in one transaction: each has its own only where that is what is tested
  db.transaction(() => {
    for (let i = 0; i < count; i += 1) addSite(db, `s${i}`);
  });
  return db;
}

function counts(file: string): { sites: number; entries: number } {
  const sqlite = new Sqlite(file, { readonly: true });
  const count = (table: string) => Number(sqlite.prepare(`select count(*) from ${table}`).pluck().get());
  const found = { sites: count('sites'), entries: count('audit') };
  sqlite.close();
  return found;
}

describe('the content hash', () => {
  const of = (...statements: string[]) => {
    const sqlite = new Sqlite(':memory:');
    sqlite.exec('create table t (id text primary key, v)');
    for (const statement of statements) sqlite.exec(statement);
    return contentHash(sqlite);
  };
  const base = of("insert into t values ('a', 1), ('b', 'x')");

  it('is the same for the same content, whatever the order and the pages', () => {
    expect(of("insert into t values ('b', 'x')", "insert into t values ('a', 1)")).toBe(base);
    expect(of("insert into t values ('a', 1), ('b', 'x'), ('c', 3)", "delete from t where id = 'c'", 'vacuum')).toBe(
      base,
    );
  });

  it.each([
    ['another value', "insert into t values ('a', 2), ('b', 'x')"],
    ['a number of another type', "insert into t values ('a', 1.0), ('b', 'x')"],
    ['a text in the place of a number', "insert into t values ('a', '1'), ('b', 'x')"],
    ['a NULL', "insert into t values ('a', null), ('b', 'x')"],
    ['a row less', "insert into t values ('a', 1)"],
    ['a row more', "insert into t values ('a', 1), ('b', 'x'), ('c', null)"],
    ['the same words cut otherwise', "insert into t values ('a', 1), ('bs1', 'x')"],
  ])('tells %s', (_name, statement) => {
    expect(of(statement)).not.toBe(base);
  });

  it('tells another schema', () => {
    expect(of("insert into t values ('a', 1), ('b', 'x')", 'create index i on t (v)')).not.toBe(base);
  });
});

describe('a backup', () => {
  it('holds whole transactions while writing goes on, and names its own content', async () => {
    const db = databaseWithSites(3_000);
    let written = 3_000;
    const writing = setInterval(() => {
      for (let i = 0; i < 20; i += 1) addSite(db, `s${written++}`);
    }, 0);
    const { contentHash: hash } = await backupsOf(db).make(inFolder('b.db'));
    clearInterval(writing);
    const held = counts(inFolder('b.db'));
    expect(held.sites).toBe(held.entries);
    // what was written while it was copied is in it: the copy is of its end, not of its beginning
    expect(held.sites).toBeGreaterThan(3_000);
    expect(verifyBackup(inFolder('b.db')).contentHash).toBe(hash);
    db.$client.close();
  });

  it('is one file, and leaves nothing else behind', async () => {
    const db = databaseWithSites(1);
    await backupsOf(db).make(inFolder('b.db'));
    expect(readdirSync(folder).filter((name) => name.startsWith('b.db'))).toEqual(['b.db']);
    db.$client.close();
  });

  it('has the content hash of the database', async () => {
    const db = databaseWithSites(5);
    const made = await backupsOf(db).make(inFolder('b.db'));
    expect(made.contentHash).toBe(contentHash(db.$client));
    db.$client.close();
  });

  it('is checked in a thread of its own by a running server', async () => {
    const db = databaseWithSites(5);
    const made = await new Backups({ source: db.$client, seal: sealAside, now }).make(inFolder('b.db'));
    expect(made.contentHash).toBe(contentHash(db.$client));
    await expect(sealAside(inFolder('none.db'), '')).rejects.toThrow();
    db.$client.close();
  });

  it('replaces an older one, but no file that is not a backup', async () => {
    const db = databaseWithSites(1);
    const first = await backupsOf(db).make(inFolder('b.db'));
    addSite(db, 'later');
    const second = await backupsOf(db).make(inFolder('b.db'));
    expect(second.contentHash).not.toBe(first.contentHash);
    expect(verifyBackup(inFolder('b.db'))).toEqual(second);
    writeFileSync(inFolder('notes.txt'), 'mine');
    await expect(backupsOf(db).make(inFolder('notes.txt'))).rejects.toThrow(UnusableBackupError);
    await expect(backupsOf(db).make(path)).rejects.toThrow(/no backup: it is left as it is/);
    db.$client.close();
  });

  it('that fails leaves the older one whole and no part behind', async () => {
    const db = databaseWithSites(1);
    const first = await backupsOf(db).make(inFolder('b.db'));
    const failing = new Backups({
      source: db.$client,
      seal: () => {
        throw new Error('no room');
      },
      now,
    });
    await expect(failing.make(inFolder('b.db'))).rejects.toThrow('no room');
    expect(verifyBackup(inFolder('b.db'))).toEqual(first);
    expect(existsSync(inFolder('b.db.part'))).toBe(false);
    // and does not stand in the way of the next
    await backupsOf(db).make(inFolder('b.db'));
    db.$client.close();
  });

  it('is given up when the server stops', async () => {
    const db = databaseWithSites(2_000);
    const backups = backupsOf(db);
    const making = expect(backups.make(inFolder('b.db'))).rejects.toThrow('stopping');
    await new Promise((resolve) => setImmediate(resolve));
    await backups.stop();
    await making;
    db.$client.close();
  });

  it.each([
    ['a changed row', "update sites set name = 'x' where id = 's1'"],
    ['a removed row', "delete from sites where id = 's1'; delete from audit"],
    ['a row that points at nothing', "insert into memberships values ('p', 'nowhere', 'viewer', null, '')"],
  ])('with %s is refused', async (_name, tamper) => {
    const db = databaseWithSites(2);
    await backupsOf(db).make(inFolder('b.db'));
    db.$client.close();
    const sqlite = new Sqlite(inFolder('b.db'));
    sqlite.pragma('foreign_keys = off');
    sqlite.exec(`drop trigger audit_no_delete; ${tamper}`);
    sqlite.close();
    expect(() => drillRestore(inFolder('b.db'), path)).toThrow(UnusableBackupError);
  });

  it('that is damaged, missing or something else is refused by name', () => {
    writeFileSync(inFolder('torn.db'), 'x'.repeat(9_000));
    expect(() => verifyBackup(inFolder('torn.db'))).toThrow(/torn\.db is damaged/);
    expect(() => verifyBackup(inFolder('none.db'))).toThrow(/none\.db cannot be opened/);
    openDatabase(path).$client.close();
    expect(() => verifyBackup(path)).toThrow(/is no backup/);
  });
});

describe('restoring', () => {
  async function backedUp(): Promise<{ db: Database; hash: string }> {
    const db = databaseWithSites(3);
    const { contentHash: hash } = await backupsOf(db).make(inFolder('b.db'));
    return { db, hash };
  }

  it('brings back the content to the bit, and keeps what was there', async () => {
    const { db, hash } = await backedUp();
    addSite(db, 'later');
    db.$client.close();
    const { before } = restoreBackup(inFolder('b.db'), path, now());
    const restored = openDatabase(path);
    expect(contentHash(restored.$client)).toBe(hash);
    expect(counts(String(before)).sites).toBe(4);
    restored.$client.close();
    expect(readdirSync(folder).filter((name) => name.startsWith('restoring-'))).toEqual([]);
  });

  it('works where the database is gone or damaged', async () => {
    const { db, hash } = await backedUp();
    db.$client.close();
    rmSync(path);
    expect(restoreBackup(inFolder('b.db'), path, now()).before).toBeUndefined();
    writeFileSync(path, 'damaged'.repeat(5_000));
    restoreBackup(inFolder('b.db'), path, now());
    const restored = openDatabase(path);
    expect(contentHash(restored.$client)).toBe(hash);
    restored.$client.close();
  });

  it('is noted, so that the log that ends earlier is not taken for one cut short', async () => {
    const { db } = await backedUp();
    addSite(db, 'later');
    db.$client.close();
    restoreBackup(inFolder('b.db'), path, now());
    const restored = openDatabase(path);
    addSite(restored, 'new');
    const check = checkAudit(restored, readAuditHeads(auditHeadLogOf(path)));
    expect(check.mismatch).toBeUndefined();
    expect(check.notes.join()).toContain(
      'a backup that ends at entry 3 was put back; entries up to 4 had been written',
    );
    restored.$client.close();
  });

  it('is refused while a server holds the database; a drill is not', async () => {
    const { db, hash } = await backedUp();
    const hold = holdExclusively(path);
    expect(() => restoreBackup(inFolder('b.db'), path, now())).toThrow(DatabaseInUseError);
    expect(drillRestore(inFolder('b.db'), path).contentHash).toBe(hash);
    hold.release();
    db.$client.close();
    expect(readdirSync(folder).filter((name) => name.startsWith('restoring-'))).toEqual([]);
  });

  it('is refused for a backup of a newer program, and leaves the database', async () => {
    const { db } = await backedUp();
    db.$client.exec("insert into __drizzle_migrations (hash, created_at) values ('x', 9999999999999)");
    await backupsOf(db).make(inFolder('newer.db'));
    db.$client.exec("delete from __drizzle_migrations where hash = 'x'");
    const hash = contentHash(db.$client);
    db.$client.close();
    expect(() => restoreBackup(inFolder('newer.db'), path, now())).toThrow(UnusableDatabaseError);
    const same = openDatabase(path);
    expect(contentHash(same.$client)).toBe(hash);
    same.$client.close();
  });
});

describe('the schedule', () => {
  const log = { info: () => undefined, error: () => undefined };
  const HOUR_MS = 3_600_000;

  function scheduleAt(time: { ms: number }, keep: number) {
    const made: string[] = [];
    const make = (file: string) => {
      made.push(file);
      writeFileSync(file, '');
      return Promise.resolve({ contentHash: '', madeAt: '' });
    };
    const settings = { folder: inFolder('backups'), everyHours: 24, keep };
    const schedule = new BackupSchedule({ make }, settings, path, () => new Date(time.ms), log);
    return { schedule, made };
  }

  it('keeps the newest of its own and touches no other file', async () => {
    const time = { ms: now().getTime() };
    const { schedule } = scheduleAt(time, 2);
    for (let i = 0; i < 4; i += 1) {
      await schedule.takeOne();
      writeFileSync(join(folder, 'backups', 'riseback-before-the-move.db'), '');
      time.ms += 24 * HOUR_MS;
    }
    expect(readdirSync(inFolder('backups')).sort()).toEqual([
      'riseback-20260304T080000Z.db',
      'riseback-20260305T080000Z.db',
      'riseback-before-the-move.db',
    ]);
  });

  it('makes up at its start for what fell due meanwhile, and for no more', async () => {
    const time = { ms: now().getTime() };
    const { schedule, made } = scheduleAt(time, 2);
    await schedule.takeOne();
    const startAgain = async () => {
      schedule.start();
      await new Promise((resolve) => setTimeout(resolve, 30));
      schedule.stop();
    };
    time.ms += 23 * HOUR_MS;
    await startAgain();
    expect(made.length).toBe(1);
    time.ms += 2 * HOUR_MS;
    await startAgain();
    expect(made.length).toBe(2);
  });
});

describe('the order of a backup', () => {
  it('reaches the server that holds the connection, and brings back its refusals', async () => {
    const db = databaseWithSites(2);
    const server = await listenForBackupOrders(path, backupsOf(db));
    const made = await orderBackup(path, inFolder('b.db'));
    expect(made).toEqual(verifyBackup(inFolder('b.db')));
    await expect(orderBackup(path, path)).rejects.toThrow(BackupRefusedError);
    await expect(orderBackup(path, 'relative.db')).rejects.toThrow(BackupRefusedError);
    await expect(orderBackup(path, join(folder, 'no-such-folder', 'b.db'))).rejects.toThrow(/directory does not exist/);
    server.close();
    expect(await orderBackup(path, inFolder('b.db'))).toBeUndefined();
    db.$client.close();
  });

  it('finds no server behind the socket of a killed one', async () => {
    copyFileSync(import.meta.filename, `${path}-control`);
    expect(await orderBackup(path, inFolder('b.db'))).toBeUndefined();
    const db = databaseWithSites(1);
    const server = await listenForBackupOrders(path, backupsOf(db));
    expect(await orderBackup(path, inFolder('b.db'))).toBeDefined();
    server.close();
    db.$client.close();
  });
});

import { appendFileSync, mkdirSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { appendAudit, auditHash, type AuditRow } from '../../server/src/platform/db/audit';
import { checkAudit } from '../../server/src/platform/db/audit-check';
import { auditHeadLogOf, GENESIS_HASH, readAuditHeads } from '../../server/src/platform/db/audit-head-log';
import { openDatabase, type Database } from '../../server/src/platform/db/database';
import { runCommand } from '../faults/server-process';

let folder = '';
let path = '';
let headLog = '';
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-audit-'));
  path = join(folder, 'riseback.db');
  headLog = auditHeadLogOf(path);
  const db = openDatabase(path);
  for (let i = 1; i <= 6; i += 1) add(db, `s${i}`);
  db.$client.close();
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

function add(db: Database, subject: string): void {
  db.transaction((tx) => appendAudit(tx, { at: new Date(0), action: 'a', subject, details: { subject } }));
}

/** What somebody does who can write into the file and knows how the chain is made. */
function tamper(work: (sqlite: Sqlite.Database) => void): void {
  const sqlite = new Sqlite(path);
  sqlite.exec('drop trigger audit_no_update; drop trigger audit_no_delete');
  work(sqlite);
  sqlite.close();
}

function check(): ReturnType<typeof checkAudit> {
  const heads = readAuditHeads(headLog);
  const db = openDatabase(path);
  try {
    return checkAudit(db, heads);
  } finally {
    db.$client.close();
  }
}

/** Makes every hash from `seq` on anew, so that the chain holds in itself. */
function chainAnew(sqlite: Sqlite.Database, from: number): void {
  let previousHash = String(
    sqlite
      .prepare('select hash from audit where seq = ?')
      .pluck()
      .get(from - 1) ?? GENESIS_HASH,
  );
  const rows = sqlite.prepare('select * from audit where seq >= ? order by seq').all(from) as Record<string, string>[];
  for (const row of rows) {
    const anew: Omit<AuditRow, 'hash'> = {
      seq: Number(row['seq']),
      at: String(row['at']),
      personId: null,
      sessionId: null,
      siteId: null,
      action: String(row['action']),
      subject: String(row['subject']),
      details: JSON.parse(String(row['details'])) as unknown,
      previousHash,
    };
    const hash = auditHash(anew);
    sqlite.prepare('update audit set previous_hash = ?, hash = ? where seq = ?').run(previousHash, hash, anew.seq);
    previousHash = hash;
  }
}

describe('the heads beside the database', () => {
  it('follow each transaction that wrote into the log, for the owner only', () => {
    const heads = readAuditHeads(headLog);
    expect(heads.map(({ seq, why }) => [seq, why])).toEqual([
      [0, 'created'],
      ...[1, 2, 3, 4, 5, 6].map((seq) => [seq, undefined]),
    ]);
    expect(statSync(headLog).mode & 0o077).toBe(0);
  });

  it('do not tell of a transaction that was rolled back', () => {
    const db = openDatabase(path);
    expect(() =>
      db.transaction((tx) => {
        appendAudit(tx, { at: new Date(0), action: 'a', subject: 'never' });
        throw new Error('no');
      }),
    ).toThrow('no');
    db.transaction(() => undefined);
    db.$client.close();
    expect(readAuditHeads(headLog).at(-1)?.seq).toBe(6);
  });

  it('catch up where a process was killed between its commit and its line', () => {
    const lines = readFileSync(headLog, 'utf8').split('\n');
    writeFileSync(headLog, `${lines.slice(0, -2).join('\n')}\n{"seq":6,"ha`);
    openDatabase(path).$client.close();
    expect(readAuditHeads(headLog).at(-1)?.seq).toBe(6);
    expect(check().mismatch).toBeUndefined();
  });

  it('that cannot be written stop nothing, and are reported', () => {
    const errors: unknown[] = [];
    const db = openDatabase(path, { report: (error) => errors.push(error) });
    rmSync(headLog);
    mkdirSync(headLog);
    add(db, 'later');
    expect(errors.length).toBe(1);
    db.$client.close();
  });
});

describe('checking the log', () => {
  it('finds nothing where nothing was done', () => {
    expect(check()).toMatchObject({ entries: 6, notes: [] });
    expect(check().mismatch).toBeUndefined();
  });

  it.each([
    {
      name: 'an edited entry',
      sql: "update audit set subject = 'x' where seq = 3",
      seq: 3,
      what: 'changed afterwards',
    },
    { name: 'a deleted entry', sql: 'delete from audit where seq = 3', seq: 3, what: 'Entry 3 is missing' },
    {
      name: 'a deleted entry with the later ones moved up',
      sql: 'delete from audit where seq = 3; update audit set seq = seq - 1 where seq > 3',
      seq: 3,
      what: 'inserted, removed, moved or replaced',
    },
    {
      name: 'an inserted entry',
      sql: `update audit set seq = seq + 100 where seq > 3; update audit set seq = seq - 99 where seq > 100;
        insert into audit select 4, at, person_id, session_id, site_id, action, 'x', details, previous_hash, hash from audit where seq = 3`,
      seq: 4,
      what: 'inserted, removed, moved or replaced',
    },
    {
      name: 'two entries changed about',
      sql: 'update audit set seq = 99 where seq = 3; update audit set seq = 3 where seq = 4; update audit set seq = 4 where seq = 99',
      seq: 3,
      what: 'inserted, removed, moved or replaced',
    },
    { name: 'a tail cut off', sql: 'delete from audit where seq > 4', seq: 5, what: 'had reached entry 6' },
    { name: 'an emptied log', sql: 'delete from audit', seq: 1, what: 'had reached entry 6' },
    {
      name: 'an entry before the first',
      sql: 'insert into audit select 0, at, null, null, null, action, subject, details, previous_hash, hash from audit where seq = 1',
      seq: 1,
      what: 'Entry 1',
    },
  ])('names $name', ({ sql, seq, what }) => {
    tamper((sqlite) => sqlite.exec(sql));
    const { mismatch } = check();
    expect(mismatch?.seq).toBe(seq);
    expect(mismatch?.what).toContain(what);
  });

  it('finds a chain that was made anew by its heads alone', () => {
    tamper((sqlite) => {
      sqlite.exec("update audit set subject = 'x' where seq = 3");
      chainAnew(sqlite, 3);
    });
    const db = openDatabase(path);
    expect(checkAudit(db, []).mismatch).toBeUndefined();
    db.$client.close();
    expect(check().mismatch).toMatchObject({ seq: 3, what: expect.stringContaining('written anew') as string });
  });

  it('finds an entry put in the place of a tail that was cut off', () => {
    tamper((sqlite) => {
      sqlite.exec("delete from audit where seq = 6; update audit set subject = 'y' where seq = 5");
      chainAnew(sqlite, 5);
    });
    expect(check().mismatch?.seq).toBe(5);
  });

  it('says when the database was begun anew', () => {
    rmSync(path);
    const db = openDatabase(path);
    add(db, 'first');
    db.$client.close();
    expect(check().mismatch).toBeUndefined();
    expect(check().notes.join()).toContain('a new database was begun here; the one before had 6 entries');
  });
});

describe('npm run verify-audit', () => {
  it('ends with 0 where all is well, with 1 and the first mismatch where not, and takes heads kept elsewhere', async () => {
    const well = await runCommand(path, 'verify-audit');
    expect(well.code, well.output).toBe(0);
    expect(well.output).toContain('6 entries follow one from another');
    const elsewhere = join(folder, 'kept-heads.log');
    writeFileSync(elsewhere, readFileSync(headLog));
    tamper((sqlite) => sqlite.exec('delete from audit where seq > 4'));
    writeFileSync(headLog, '');
    const cut = await runCommand(path, 'verify-audit', [elsewhere]);
    expect(cut.code).toBe(1);
    expect(cut.output).toContain('had reached entry 6');
    appendFileSync(headLog, 'no line of ours\n');
    expect((await runCommand(path, 'verify-audit', ['a', 'b'])).code).toBe(2);
  });
});

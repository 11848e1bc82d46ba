import { generateKeyPairSync, sign as signWith } from 'node:crypto';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Revision, Verification } from '@riseback/contracts';
import { canonicalText } from '@riseback/network';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { audit } from '../../server/src/platform/db/schema';
import { auditHash } from '../../server/src/platform/db/audit';
import { auditHeadLogOf, GENESIS_HASH, readAuditHeads } from '../../server/src/platform/db/audit-head-log';
import { openDatabase, type Database } from '../../server/src/platform/db/database';
import { sha256 } from '../../server/src/revisions/hashes';
import { openSigningKey, publicKeyFileOf, type OpenedKeys } from '../../server/src/revisions/signing-key-file';
import { verifyRevision } from '../../server/src/revisions/verification';
import { VerifyingKeys } from '../../server/src/revisions/verifying-keys';
import { ENGINE_VERSION } from '../../server/src/solve/engine-version';
import type { SolvePort } from '../../server/src/solve/solve-port';
import { runCommand } from '../faults/server-process';
import { RevisionBench } from './revision-samples';

/** What is tried here is not the solver. */
const noSolver: SolvePort = { solve: () => Promise.resolve({ end: 'failed', detail: 'not tried' }) };

let folder = '';
let path = '';
let keyFile = '';
let db: Database;
let keys: OpenedKeys;
/** Reviewed, then approved: two signatures, three steps. */
let signed: Revision;
/** Under review, on a later version. */
let open: Revision;

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-verify-'));
  path = join(folder, 'riseback.db');
  keyFile = join(folder, 'signing-key.pem');
  db = openDatabase(path);
  keys = openSigningKey(keyFile, true);
  const bench = new RevisionBench({ db, keys });
  await bench.begin();
  const revision = await bench.submitted();
  await bench.sign(revision, 'reviewed');
  signed = await bench.sign(revision);
  await bench.edit(1, 0, 1);
  open = await bench.submitted(2);
  db.$client.pragma('ignore_check_constraints = on');
  db.$client.pragma('foreign_keys = off');
  const triggers = db.$client.prepare("select name from sqlite_schema where type = 'trigger'").pluck().all();
  for (const name of triggers.map(String)) db.$client.exec(`drop trigger "${name}"`);
});
afterAll(() => {
  db.$client.close();
  rmSync(folder, { recursive: true, force: true });
});

async function verify(
  id = signed.id,
  verifyingKeys = keys.verifyingKeys,
  heads = () => readAuditHeads(auditHeadLogOf(path)),
): Promise<Verification> {
  const parts = { db, keys: verifyingKeys, heads, solver: noSolver, engineVersion: ENGINE_VERSION };
  const verification = await verifyRevision(id, parts);
  if (verification === undefined) throw new Error('there is such a revision');
  return verification;
}

const brokenSteps = ({ steps }: Verification) =>
  steps.filter(({ outcome }) => outcome === 'broken').map(({ name }) => name);

/** Verifies with a change that is taken back afterwards. */
async function verifyAfter(change: () => void, id = signed.id): Promise<Verification> {
  db.$client.exec('savepoint before');
  try {
    change();
    return await verify(id);
  } finally {
    db.$client.exec('rollback to before; release before');
  }
}
const afterSql = (sql: string, id = signed.id) => verifyAfter(() => db.$client.exec(sql), id);

/** One bit of one character in another way round: of a text its middle by default, a number far off. */
function flipped(value: unknown, place = 0.5): unknown {
  if (typeof value === 'number') return value + 100;
  if (typeof value !== 'string' || value === '') return 'x';
  const at = Math.min(value.length - 1, Math.floor(value.length * place));
  return `${value.slice(0, at)}${String.fromCharCode(value.charCodeAt(at) ^ 1)}${value.slice(at + 1)}`;
}

interface Cell {
  readonly table: string;
  readonly column: string;
  readonly rowid: number;
  readonly value: unknown;
}

function cellsOf(table: string, where: string): Cell[] {
  const rows = db.$client.prepare(`select rowid as r, * from ${table} where ${where}`).all() as Record<
    string,
    unknown
  >[];
  return rows.flatMap(({ r, ...columns }) =>
    Object.entries(columns).map(([column, value]) => ({ table, column, rowid: Number(r), value })),
  );
}

function set({ table, column, rowid }: Cell, value: unknown): void {
  db.$client.prepare(`update ${table} set "${column}" = ? where rowid = ?`).run(value, rowid);
}

describe('a revision that nobody touched', () => {
  it('is sound, step by step', async () => {
    const { steps, sound, firstBroken, publicKey } = await verify();
    expect(steps.map(({ name, outcome }) => `${name} ${outcome}`)).toEqual([
      'inputs matches',
      'results matches',
      'record matches',
      'events matches',
      'signature 1 matches',
      'signature 2 matches',
      'log matches',
    ]);
    expect([sound, firstBroken]).toEqual([true, undefined]);
    expect(publicKey).toBe(keys.signingKey.publicPem);
    expect((await verify(open.id)).steps.map(({ name, outcome }) => `${name} ${outcome}`)).toContain(
      'signatures notThere',
    );
  });
});

describe('one byte changed', () => {
  /** Which step names it, by column; the rest of the table's by ''. */
  const NAMED: Readonly<Record<string, Readonly<Record<string, string>>>> = {
    revisions: { '': 'record', file: 'inputs', file_hash: 'inputs', results_hash: 'results' },
    revision_results: { '': 'results' },
    revision_events: { '': 'events' },
  };

  it.each(Object.keys(NAMED))('anywhere in a row of %s is named', async (table) => {
    const key = table === 'revisions' ? 'id' : 'revision_id';
    const cells = cellsOf(table, `${key} = '${signed.id}'`).filter(({ column }) => column !== 'id');
    expect(cells.length).toBeGreaterThan(3);
    for (const cell of cells) {
      const verification = await verifyAfter(() => set(cell, flipped(cell.value)));
      expect(verification.sound, cell.column).toBe(false);
      expect(verification.firstBroken, cell.column).toBe(NAMED[table]?.[cell.column] ?? NAMED[table]?.['']);
    }
  });

  it('at any place of the frozen inputs and results is named', async () => {
    for (let i = 0; i < 25; i += 1) {
      for (const [table, column, name] of [
        ['revisions', 'file', 'inputs'],
        ['revision_results', 'result', 'results'],
      ] as const) {
        const key = table === 'revisions' ? 'id' : 'revision_id';
        const [cell] = cellsOf(table, `${key} = '${signed.id}'`).filter((each) => each.column === column);
        if (cell === undefined) throw new Error('it is there');
        const verification = await verifyAfter(() => set(cell, flipped(cell.value, i / 25)));
        expect(verification.firstBroken, `${column} ${i}`).toBe(name);
      }
    }
  });

  it('anywhere in a signature is named, also one that leaves its bytes as they are', async () => {
    const cells = cellsOf('signatures', `revision_id = '${signed.id}'`);
    const numberOf = (cell: Cell) => cells.find(({ rowid, column }) => rowid === cell.rowid && column === 'seq')?.value;
    for (const cell of cells) {
      for (const place of typeof cell.value === 'string' ? [0, 0.3, 0.7, 1] : [0]) {
        const { firstBroken, steps } = await verifyAfter(() => set(cell, flipped(cell.value, place)));
        const what = `${cell.column} ${place}`;
        if (numberOf(cell) === 1) expect(firstBroken, what).toBe('signature 1');
        // without the approval that was signed the step that made it approved has nothing to stand on
        else expect(firstBroken, what).toMatch(/^(events|signature 2)$/);
        if (cell.column !== 'statement_hash') continue;
        expect(steps.find(({ name }) => name === firstBroken)?.detail).toContain('hash of the statement');
      }
    }
    const text = cells.find(({ column }) => column === 'signature');
    if (text === undefined) throw new Error('it is there');
    // 64 bytes leave four bits of the last sextet unused
    const alias = String(text.value).replace(/(.)==$/, (_, last: string) => `${nextSextet(last)}==`);
    expect(Buffer.from(alias, 'base64')).toEqual(Buffer.from(String(text.value), 'base64'));
    expect((await verifyAfter(() => set(text, alias))).firstBroken).toBe('signature 1');
  });

  it('anywhere in the log is named, whatever else it breaks', async () => {
    const all = cellsOf('audit', 'true');
    expect(all.length).toBeGreaterThan(80);
    for (const cell of all.filter((_, i) => i % 3 === 0)) {
      const verification = await verifyAfter(() => set(cell, flipped(cell.value)));
      expect(verification.sound).toBe(false);
      expect(brokenSteps(verification), `${cell.column} ${cell.rowid}`).toContain('log');
    }
  });
});

describe('the log', () => {
  const last = () => Number(db.$client.prepare('select max(seq) from audit').pluck().get());
  /** A sign-in, which belongs to nothing else that is verified. */
  const other = 3;

  it.each([
    { name: 'a deleted entry', sql: () => `delete from audit where seq = ${other}`, what: `Entry ${other} is missing` },
    {
      name: 'two entries changed about',
      sql: () =>
        `update audit set seq = 999 where seq = 2; update audit set seq = 2 where seq = 3; update audit set seq = 3 where seq = 999`,
      what: 'inserted, removed, moved or replaced',
    },
    {
      name: 'an inserted entry',
      sql: () =>
        `insert into audit select ${last() + 1}, at, person_id, session_id, site_id, 'x', subject, details, previous_hash, hash from audit where seq = 2`,
      what: 'inserted, removed, moved or replaced',
    },
    { name: 'a tail cut off', sql: () => `delete from audit where seq = ${last()}`, what: 'its tail was cut off' },
  ])('names $name', async ({ sql, what }) => {
    const verification = await afterSql(sql());
    expect(verification.firstBroken).toBe('log');
    expect(verification.steps.at(-1)?.detail).toContain(what);
  });

  it('cut off before a signature breaks that signature first', async () => {
    const entry = "select seq from audit where action = 'revision.sign' order by seq limit 1";
    const verification = await afterSql(`delete from audit where seq >= (${entry})`);
    expect(verification.firstBroken).toBe('events');
    expect(brokenSteps(verification)).toEqual(['events', 'signature 1', 'signature 2', 'log']);
  });
});

/** Every hash from the first entry on, as somebody would who knows how the chain is made. */
function chainAnew(): void {
  let previousHash = GENESIS_HASH;
  for (const { hash: _, ...row } of db.select().from(audit).orderBy(audit.seq).all()) {
    const hash = auditHash({ ...row, previousHash });
    db.$client.prepare('update audit set previous_hash = ?, hash = ? where seq = ?').run(previousHash, hash, row.seq);
    previousHash = hash;
  }
}

describe('a log that was written anew, where no head was kept elsewhere', () => {
  it('holds in itself and shows against the signatures, which name their place in it', async () => {
    db.$client.exec('savepoint anew');
    db.$client.exec("update audit set subject = 'somebody' where seq = 2");
    chainAnew();
    const verification = await verify(signed.id, keys.verifyingKeys, () => []);
    db.$client.exec('rollback to anew; release anew');
    expect(brokenSteps(verification)).toEqual(['signature 1', 'signature 2']);
    expect(verification.steps.find(({ name }) => name === 'signature 1')?.detail).toContain(
      'is not the one that was signed',
    );
  });
});

describe('a row', () => {
  it.each([
    { name: 'of the results taken away', sql: () => 'delete from revision_results', broken: 'results' },
    { name: 'of the last step taken away', sql: () => 'delete from revision_events where seq = 3', broken: 'events' },
    {
      name: 'of a step slipped in',
      sql: () =>
        `insert into revision_events values ('${signed.id}', 4, 'withdrawn', 'designer', '2026-03-02T08:00:00.000Z', '')`,
      broken: 'events',
    },
    { name: 'of the last signature taken away', sql: () => 'delete from signatures where seq = 2', broken: 'events' },
    {
      name: 'of the first signature taken away',
      sql: () => 'delete from signatures where seq = 1',
      broken: 'signature 1',
    },
    {
      name: 'of a signature copied',
      sql: () =>
        'insert into signatures select revision_id, 3, person_id, meaning, statement, statement_hash, audit_head, signature, key_id from signatures where seq = 1',
      broken: 'signature 3',
    },
    {
      name: 'of what a revision is, its hashes made anew',
      sql: () => `update revisions set file = '{}', file_hash = '${sha256('{}')}'`,
      broken: 'record',
    },
  ])('$name is named', async ({ sql, broken }) => {
    expect((await afterSql(sql())).firstBroken).toBe(broken);
  });

  it('that says approved where nobody signed is named', async () => {
    const event = { seq: 3, state: 'approved', personId: 'reviewer', at: '2026-03-02T08:00:00.000Z', note: '' };
    const verification = await afterSql(
      `insert into revision_events values ('${open.id}', 3, 'approved', 'reviewer', '${event.at}', '')`,
      open.id,
    );
    expect(verification.firstBroken).toBe('events');
  });
});

describe('who can write the database and has no key', () => {
  it('makes no signature that verifies, however well the rest fits', async () => {
    const other = generateKeyPairSync('ed25519');
    const verification = await verifyAfter(() => {
      const row = db.$client.prepare('select statement from signatures where seq = 2').get() as { statement: string };
      const statement = canonicalText({
        ...(JSON.parse(row.statement) as object),
        person: { id: 'designer', name: 'designer', role: 'reviewer' },
      });
      const signature = signWith(null, Buffer.from(statement), other.privateKey).toString('base64');
      db.$client
        .prepare('update signatures set statement = ?, statement_hash = ?, signature = ?, person_id = ? where seq = 2')
        .run(statement, sha256(statement), signature, 'designer');
    });
    const step = verification.steps.find(({ name }) => name === 'signature 2');
    expect(step).toMatchObject({ outcome: 'broken', detail: expect.stringContaining('another key') as string });
  });

  it('cannot bring a key of their own: it is none of those that are verified with', async () => {
    const other = new VerifyingKeys([generateKeyPairSync('ed25519').publicKey]);
    expect((await verify(signed.id, other)).firstBroken).toBe('signature 1');
    expect((await afterSql(`update signatures set key_id = '${sha256('x')}' where seq = 2`)).firstBroken).toBe(
      'signature 2',
    );
  });

  it('cannot put a signature of one revision on another', async () => {
    const verification = await afterSql(
      `insert into signatures select '${open.id}', 1, person_id, 'reviewed', statement, statement_hash, audit_head, signature, key_id from signatures where seq = 1`,
      open.id,
    );
    expect(verification.firstBroken).toBe('signature 1');
    expect(verification.steps.find(({ name }) => name === 'signature 1')?.detail).toContain('is not this revision');
  });
});

describe('npm run verify-revision', () => {
  const run = (args: readonly string[]) => runCommand(path, 'verify-revision', args);

  it('ends with 0 where all is sound, by the public key alone, and says what the present engine makes of it', async () => {
    const copy = join(folder, 'kept-elsewhere.pem');
    writeFileSync(copy, readFileSync(publicKeyFileOf(keyFile)));
    const { code, output } = await run([signed.id, '--public-key', copy]);
    expect(code, output).toBe(0);
    expect(output).toContain('Sound: everything is as it was frozen and signed.');
    expect(output).toContain('largest difference of a back pressure 0 Pa, verdicts changed: 0.');
  });

  it('ends with 1 and the first thing that does not match, and with 2 for what it does not know', async () => {
    const results = await Promise.all([run(['no-such-revision']), run([]), run([signed.id, '--public-key'])]);
    expect(results.map(({ code }) => code)).toEqual([2, 2, 2]);
    db.$client.exec(`update revisions set title = 'Another' where id = '${signed.id}'`);
    const { code, output } = await run([signed.id]);
    db.$client.exec(`update revisions set title = 'For construction' where id = '${signed.id}'`);
    expect(code, output).toBe(1);
    expect(output).toContain('the first thing that does not match is: record.');
  });
});

/** The character whose sextet is one more; the last of a signature's is never the last of sixteen that mean the same. */
function nextSextet(character: string): string {
  const alphabet = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
  return alphabet.charAt(alphabet.indexOf(character) ^ 1);
}

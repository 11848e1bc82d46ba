import { closeSync, copyFileSync, ftruncateSync, mkdtempSync, openSync, rmSync, statSync, writeSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { solverHashOf } from '../../server/src/networks/network-hashes';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { openDatabase } from '../../server/src/platform/db/database';
import { batchOf, EVERY_KEY, makeNetwork, raise } from '../api/network-samples';
import { TestServer } from '../api/test-server';
import { FULL, randomFrom, seedOfRun } from './test-form';

const CUTS = FULL ? 1_000 : 60;
const EDITS = 120;

let folder = '';
let path = '';
let networkId = '';
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-cut-'));
  path = join(folder, 'riseback.db');
  const db = openDatabase(path);
  // so that every transaction of the test stays in the log
  db.$client.pragma('wal_autocheckpoint = 0');
  const server = new TestServer({ db });
  const designer = server.as('designer');
  networkId = await makeNetwork(designer, server.siteId, EVERY_KEY);
  // what comes before is in the file itself, so that every cut leaves a network to look at
  db.$client.pragma('wal_checkpoint(TRUNCATE)');
  for (let i = 0; i < EDITS; i += 1) {
    const batch = batchOf([raise(1.2 + (i + 1) / 100, i === 0 ? 1.2 : 1.2 + i / 100)]);
    await designer
      .post(`/api/networks/${networkId}/edits`, batch)
      .set('If-Match', `"${i + 1}"`)
      .expect(200);
  }
  // copied while it is open, as a power cut would leave it: closing would fold the log into the file
  copyFileSync(path, join(folder, 'file'));
  copyFileSync(`${path}-wal`, join(folder, 'log'));
  db.$client.close();
}, 120_000);
afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

/** The database with its log damaged from `offset` on; @returns the network's version in it */
function versionAfter(damage: (log: number) => void): number {
  const cut = join(folder, 'cut.db');
  for (const ending of ['', '-wal', '-shm']) rmSync(cut + ending, { force: true });
  copyFileSync(join(folder, 'file'), cut);
  copyFileSync(join(folder, 'log'), `${cut}-wal`);
  const log = openSync(`${cut}-wal`, 'r+');
  damage(log);
  closeSync(log);

  const db = openDatabase(cut);
  try {
    expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok');
    expect(firstBrokenAuditRow(db)).toBeUndefined();
    const networks = new NetworkRepository(db);
    const head = networks.head(networkId);
    const document = networks.document(networkId);
    if (head === undefined || document === undefined) throw new Error('the network is there');
    // the network's row, its elements, its edits and the log were written together, and are there together
    expect(solverHashOf(document)).toBe(head.solverHash);
    expect(networks.editsSince(networkId, 0).length).toBe(head.version);
    const audited = db.$client.prepare("select count(*) from audit where action = 'network.edit'").pluck().get();
    expect(audited).toBe(head.version - 1);
    return head.version;
  } finally {
    db.$client.close();
  }
}

it('opens as a prefix of whole transactions wherever its log is cut', () => {
  const random = randomFrom(seedOfRun('cut logs'));
  const size = statSync(join(folder, 'log')).size;
  expect(versionAfter(() => undefined)).toBe(EDITS + 1);
  const cuts = Array.from({ length: CUTS }, () => Math.floor(random() * size)).sort((a, b) => a - b);
  let last = 1;
  for (const offset of [0, 1, 31, 32, ...cuts]) {
    const version = versionAfter((log) => ftruncateSync(log, offset));
    // the more of the log is left, the more edits are there
    expect(version).toBeGreaterThanOrEqual(last);
    last = version;
  }
  expect(last).toBeGreaterThan(EDITS / 2);
}, 600_000);

it('opens as a prefix of whole transactions when a sector of its log is garbage', () => {
  const random = randomFrom(seedOfRun('garbled logs'));
  const size = statSync(join(folder, 'log')).size;
  for (let i = 0; i < CUTS / 4; i += 1) {
    const garbage = Buffer.from(Array.from({ length: 512 }, () => Math.floor(random() * 256)));
    const offset = Math.floor((random() * size) / 512) * 512;
    const version = versionAfter((log) => writeSync(log, garbage, 0, Math.min(512, size - offset), offset));
    expect(version).toBeLessThanOrEqual(EDITS + 1);
  }
}, 600_000);

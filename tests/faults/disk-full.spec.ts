import { mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { verifyBackup } from '../../server/src/platform/backup/sealed-copy';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { openDatabase } from '../../server/src/platform/db/database';
import { batchOf } from '../api/network-samples';
import { demoNetwork, runCommand, signIn, startServer, type ServerProcess } from './server-process';

let folder = '';
let path = '';
let server: ServerProcess | undefined;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-full-'));
  path = join(folder, 'riseback.db');
});
afterAll(() => {
  server?.child.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

async function stop(running: ServerProcess): Promise<void> {
  running.child.kill('SIGTERM');
  await running.ended();
}

it('refuses to write on a full disk, goes on reading, and loses nothing of what it had said was saved', async () => {
  server = await startServer(path);
  await stop(server);

  server = await startServer(path, { largestFileBytes: 2 * 1024 * 1024 });
  const { address } = server;
  const headers = await signIn(address);
  const network = await demoNetwork(address, headers);
  const acknowledged: string[] = [];
  let note: string | undefined;
  let refused: Response | undefined;
  while (refused === undefined && acknowledged.length < 2_000) {
    const to = `note ${acknowledged.length} `.repeat(20);
    const batch = batchOf([
      { op: 'set', in: 'nodes', id: 'TR1', key: 'note', ...(note === undefined ? {} : { from: note }), to },
    ]);
    const answer = await fetch(`${address}/api/networks/${network.id}/edits`, {
      method: 'POST',
      headers: { ...headers, 'If-Match': `"${network.version + acknowledged.length}"` },
      body: JSON.stringify(batch),
    });
    if (answer.status !== 200) {
      refused = answer;
      break;
    }
    await answer.text();
    acknowledged.push(batch.batchId);
    note = to;
  }
  expect(refused?.status).toBe(503);
  expect(await refused?.json()).toMatchObject({
    type: '/problems/unavailable',
    detail: expect.stringContaining('was not stored') as string,
  });
  expect(acknowledged.length).toBeGreaterThan(10);
  expect((await fetch(`${address}/api/networks/${network.id}`, { headers })).status).toBe(200);
  expect((await fetch(`${address}/healthz`)).status).toBe(200);
  await stop(server);

  const db = openDatabase(path);
  expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok');
  expect(firstBrokenAuditRow(db)).toBeUndefined();
  const networks = new NetworkRepository(db);
  for (const batchId of acknowledged) expect(networks.editByBatch(batchId)).toBeDefined();
  expect(networks.head(network.id)?.version).toBe(network.version + acknowledged.length);
  db.$client.close();
}, 120_000);

it('keeps the old backup whole when the disk is too full for a new one', async () => {
  const backup = join(folder, 'kept.db');
  const taken = await runCommand(path, 'backup', [backup]);
  expect(taken.code, taken.output).toBe(0);
  const before = verifyBackup(backup);

  const db = openDatabase(path);
  db.$client.exec("update people set name = name || ' changed'");
  db.$client.close();
  server = await startServer(path, { largestFileBytes: statSync(backup).size / 2 });
  const failed = await runCommand(path, 'backup', [backup]);
  expect(failed.code).toBe(1);
  expect(verifyBackup(backup)).toEqual(before);
  expect(statSync(`${backup}.part`, { throwIfNoEntry: false })).toBeUndefined();
  await stop(server);

  const room = await runCommand(path, 'backup', [backup]);
  expect(room.code, room.output).toBe(0);
  expect(verifyBackup(backup).contentHash).not.toBe(before.contentHash);
}, 120_000);

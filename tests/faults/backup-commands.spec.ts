import { mkdtempSync, readdirSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { verifyBackup } from '../../server/src/platform/backup/sealed-copy';
import { contentHash } from '../../server/src/platform/db/content-hash';
import { openDatabase } from '../../server/src/platform/db/database';
import { batchOf, raise, SMALL } from '../api/network-samples';
import { demoNetwork, runCommand, signIn, startServer, type ServerProcess } from './server-process';

let folder = '';
let server: ServerProcess | undefined;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-commands-'));
});
afterAll(() => {
  server?.child.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

it('backs up while edits go on, refuses to restore under a running server, and brings back the same content', async () => {
  const path = join(folder, 'riseback.db');
  const scheduled = join(folder, 'scheduled');
  const backup = join(folder, 'by-command.db');
  server = await startServer(path, { env: { RISEBACK_BACKUP_FOLDER: scheduled } });
  const { address } = server;
  const headers = await signIn(address);
  const { siteId } = await demoNetwork(address, headers);
  const post = (url: string, body: object, more: object = {}) =>
    fetch(address + url, { method: 'POST', headers: { ...headers, ...more }, body: JSON.stringify(body) });
  const { id } = (await (await post(`/api/sites/${siteId}/networks`, SMALL)).json()) as { id: string };

  let version = 1;
  const ordering = new AbortController();
  const editing = (async () => {
    while (!ordering.signal.aborted) {
      const answer = await post(`/api/networks/${id}/edits`, batchOf([raise(version, version - 1)]), {
        'If-Match': `"${version}"`,
      });
      expect(answer.status, await answer.text()).toBe(200);
      version += 1;
    }
  })();
  const taken = await runCommand(path, 'backup', [backup]);
  ordering.abort();
  await editing;
  expect(taken.code, taken.output).toBe(0);
  const { contentHash: hash } = verifyBackup(backup);
  expect(taken.output).toContain(hash);
  // for the owner alone: there are password hashes in it
  expect(statSync(backup).mode & 0o077).toBe(0);

  const refused = await runCommand(path, 'restore', [backup]);
  expect(refused.code).toBe(1);
  expect(refused.output).toContain('Another Riseback serves the database');
  const drilled = await runCommand(path, 'restore', [backup, '--drill']);
  expect(drilled.code, drilled.output).toBe(0);
  expect(drilled.output).toContain(hash);
  expect((await fetch(`${address}/healthz`)).status).toBe(200);

  // the schedule took one at the start, since there was none
  const names = readdirSync(scheduled);
  expect(names.length).toBe(1);
  verifyBackup(join(scheduled, names[0] ?? ''));

  server.child.kill('SIGTERM');
  expect(await server.ended()).toBe(0);
  const restored = await runCommand(path, 'restore', [backup]);
  expect(restored.code, restored.output).toBe(0);
  expect(restored.output).toContain(hash);
  expect((await runCommand(path, 'verify-audit')).code).toBe(0);
  const db = openDatabase(path);
  expect(contentHash(db.$client)).toBe(hash);
  const networks = new NetworkRepository(db);
  const head = networks.head(id)?.version ?? 0;
  expect(head).toBeGreaterThan(1);
  expect(head).toBeLessThanOrEqual(version);
  expect(networks.editsSince(id, 0).length).toBe(head);
  db.$client.close();
}, 120_000);

import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { DEMO_PASSWORD } from '../../server/demo/demo-people';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { openDatabase } from '../../server/src/platform/db/database';
import { batchOf, raise, SMALL } from '../api/network-samples';
import { demoNetwork, signIn, startServer, type ServerProcess } from './server-process';
import { FULL, randomFrom, seedOfRun } from './test-form';

const ROUNDS = FULL ? 20 : 2;
const WRITERS = 6;
const READERS = 6;
/**
 * Each waits for its turn at the password hash, so that some are still waiting when the server is told to stop. On a busy
 * machine fewer of them take as long, and more would take longer than a stop may.
 */
const SLOW = { most: 4, togetherMs: 3_000 };

let folder = '';
let server: ServerProcess | undefined;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-stop-'));
});
afterAll(() => {
  server?.child.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

interface Outcome {
  readonly acknowledged: string[];
  /** Sent, and never answered: they must not have been done. */
  readonly unanswered: string[];
  /** Answers that began and broke off. */
  cut: number;
}

it('answers all that it took on when told to stop under load, and ends within 10 s', async () => {
  const random = randomFrom(seedOfRun('stops under load'));
  for (let round = 0; round < ROUNDS; round += 1) {
    const path = join(folder, `round-${round}.db`);
    server = await startServer(path);
    const { address, child } = server;
    const askedAt = performance.now();
    const headers = await signIn(address);
    const signInMs = performance.now() - askedAt;
    const network = await demoNetwork(address, headers);
    const outcome: Outcome = { acknowledged: [], unanswered: [], cut: 0 };
    const networks = await Promise.all(
      Array.from({ length: WRITERS }, async () => {
        const made = await fetch(`${address}/api/sites/${network.siteId}/networks`, {
          method: 'POST',
          headers,
          body: JSON.stringify(SMALL),
        });
        return ((await made.json()) as { id: string }).id;
      }),
    );
    const load = [
      ...networks.map((id) => write(address, headers, id, outcome)),
      ...Array.from({ length: READERS }, () => read(`${address}/api/networks/${network.id}/file`, headers, outcome)),
    ];
    await new Promise((resolve) => setTimeout(resolve, 300 + random() * 300));
    const slowCount = Math.max(1, Math.min(SLOW.most, Math.floor(SLOW.togetherMs / signInMs)));
    const slow = Array.from({ length: slowCount }, () => signInSlowly(address));
    // connections are taken on in turn: once one made after them is answered, the server has them
    await (await fetch(`${address}/healthz`, { headers: { Connection: 'close' } })).text();

    const toldAt = performance.now();
    child.kill('SIGTERM');
    expect(await Promise.all(slow)).toEqual(slow.map(() => 200));
    await Promise.all(load);
    expect(await server.ended()).toBe(0);
    const lastedMs = performance.now() - toldAt;
    process.stdout.write(
      `stopped in ${(lastedMs / 1_000).toFixed(1)} s, ${outcome.acknowledged.length} edits answered\n`,
    );
    expect(lastedMs).toBeLessThan(10_000);

    expect(outcome.cut).toBe(0);
    const db = openDatabase(path);
    const stored = new NetworkRepository(db);
    expect(outcome.acknowledged.length).toBeGreaterThan(WRITERS);
    for (const batchId of outcome.acknowledged) expect(stored.editByBatch(batchId)).toBeDefined();
    for (const batchId of outcome.unanswered) expect(stored.editByBatch(batchId)).toBeUndefined();
    expect(firstBrokenAuditRow(db)).toBeUndefined();
    db.$client.close();
  }
}, 600_000);

/** One edit after the other until the server takes no more. */
async function write(address: string, headers: Record<string, string>, id: string, outcome: Outcome): Promise<void> {
  for (let version = 1; ; version += 1) {
    const batch = batchOf([raise(version, version - 1)]);
    let answer: Response;
    try {
      answer = await fetch(`${address}/api/networks/${id}/edits`, {
        method: 'POST',
        headers: { ...headers, 'If-Match': `"${version}"` },
        body: JSON.stringify(batch),
      });
    } catch {
      outcome.unanswered.push(batch.batchId);
      return;
    }
    expect(answer.status).toBe(200);
    if (await endsWell(answer)) outcome.acknowledged.push(batch.batchId);
    else outcome.cut += 1;
  }
}

async function read(url: string, headers: Record<string, string>, outcome: Outcome): Promise<void> {
  for (;;) {
    let answer: Response;
    try {
      answer = await fetch(url, { headers });
    } catch {
      return;
    }
    expect(answer.status).toBe(200);
    if (!(await endsWell(answer))) outcome.cut += 1;
  }
}

async function endsWell(answer: Response): Promise<boolean> {
  return answer.json().then(
    () => true,
    () => false,
  );
}

async function signInSlowly(address: string): Promise<number> {
  const answer = await fetch(`${address}/api/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email: 'viewer@ternquay.example', password: DEMO_PASSWORD }),
  });
  return answer.status;
}

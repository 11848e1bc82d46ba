import { spawn, type ChildProcess } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { applyBatch, type EditOp } from '@riseback/network';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { DEMO_PASSWORD } from '../../server/demo/demo-people';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { solverHashOf } from '../../server/src/networks/network-hashes';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { openDatabase } from '../../server/src/platform/db/database';
import { batchOf } from '../api/network-samples';

/** A round ends so many acknowledged edits and so many milliseconds after its start, each time at another point of a write. */
const ROUNDS = [
  { edits: 12, thenMs: 1 },
  { edits: 25, thenMs: 4 },
  { edits: 40, thenMs: 9 },
];

let folder = '';
let child: ChildProcess | undefined;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-kill-'));
});
afterAll(() => {
  child?.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

/** @returns the server's address, once it listens */
function startServer(path: string): Promise<string> {
  const started = spawn(process.execPath, ['--import', 'tsx', 'server/src/main.ts'], {
    env: { PATH: process.env['PATH'] ?? '', RISEBACK_DB: path, PORT: '0', RISEBACK_REQUESTS_PER_MINUTE: '100000' },
  });
  child = started;
  return new Promise((resolve, reject) => {
    let output = '';
    const take = (chunk: Buffer): void => {
      output += chunk.toString();
      const address = /^Riseback: (http\S+)$/m.exec(output)?.[1];
      if (address !== undefined) resolve(address);
    };
    started.stdout.on('data', take);
    started.stderr.on('data', take);
    started.once('exit', () => {
      reject(new Error(`the server ended: ${output}`));
    });
  });
}

async function signIn(address: string): Promise<Record<string, string>> {
  const answer = await fetch(`${address}/api/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email: 'designer@ternquay.example', password: DEMO_PASSWORD }),
  });
  expect(answer.status).toBeLessThan(300);
  const cookies = answer.headers.getSetCookie().map((cookie) => cookie.split(';')[0] ?? '');
  const proof = cookies.find((cookie) => cookie.startsWith('XSRF-TOKEN='))?.slice('XSRF-TOKEN='.length) ?? '';
  return { Cookie: cookies.join('; '), 'X-XSRF-TOKEN': decodeURIComponent(proof), 'Content-Type': 'application/json' };
}

/**
 * Even versions add a trap with its pipe to the hall header; odd ones take it away again and leave their number in a note.
 * @param note what the last odd version left
 */
function opsFor(version: number, note: string | undefined): EditOp[] {
  const id = `K${Math.floor(version / 2)}`;
  const trap = { id, kind: 'trap', elevationM: version / 100, inletPressurePa: 6e5, loadKgS: 0.01 };
  const pipe = { id: `${id}-L`, from: id, to: 'LH1', lengthM: 5, insideDiameterM: 0.02 };
  if (version % 2 === 0) {
    return [
      { op: 'add', in: 'pipes', ordinal: 900, value: pipe },
      { op: 'add', in: 'nodes', ordinal: 900, value: trap },
    ];
  }
  const from = note === undefined ? {} : { from: note };
  const write: EditOp = { op: 'set', in: 'nodes', id: 'TR1', key: 'note', ...from, to: noteOf(version) };
  if (version === 1) return [write];
  return [write, { op: 'remove', in: 'nodes', id }, { op: 'remove', in: 'pipes', id: pipe.id }];
}

function noteOf(version: number): string {
  return `version ${version}`;
}

it('keeps every acknowledged edit through kill -9, and never half a one', async () => {
  const path = join(folder, 'riseback.db');
  let note: string | undefined;
  for (const round of ROUNDS) {
    const address = await startServer(path);
    const headers = await signIn(address);
    const get = async (url: string): Promise<unknown> => (await fetch(address + url, { headers })).json();
    const [site] = (await get('/api/sites')) as { id: string }[];
    const [network] = (await get(`/api/sites/${site?.id}/networks`)) as { id: string; version: number }[];
    if (network === undefined) throw new Error('the demo has a network');

    let { version } = network;
    const acknowledged: string[] = [];
    try {
      for (;;) {
        const batch = batchOf(opsFor(version, note));
        const answer = await fetch(`${address}/api/networks/${network.id}/edits`, {
          method: 'POST',
          headers: { ...headers, 'If-Match': `"${version}"` },
          body: JSON.stringify(batch),
        });
        expect(answer.status, await answer.text()).toBe(200);
        acknowledged.push(batch.batchId);
        if (acknowledged.length === round.edits) setTimeout(() => child?.kill('SIGKILL'), round.thenMs);
        if (version % 2 === 1) note = noteOf(version);
        version += 1;
      }
    } catch (error) {
      // the connection broke: the server is dead
      if (!(error instanceof TypeError)) throw error;
    }

    const db = openDatabase(path);
    expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok');
    expect(db.$client.pragma('foreign_key_check')).toEqual([]);
    expect(firstBrokenAuditRow(db)).toBeUndefined();
    const networks = new NetworkRepository(db);
    expect(acknowledged.length).toBeGreaterThanOrEqual(round.edits);
    for (const batchId of acknowledged) expect(networks.editByBatch(batchId)).toBeDefined();
    const head = networks.head(network.id);
    // the last one may have been stored and its answer lost
    expect([version, version + 1]).toContain(head?.version);
    const stored = networks.document(network.id);
    if (stored === undefined) throw new Error('the network is stored');
    expect(head?.solverHash).toBe(solverHashOf(stored));
    const edits = networks.editsSince(network.id, 1);
    expect(edits.map((edit) => edit.version)).toEqual(edits.map((_, i) => i + 2));
    const first = edits.toReversed().reduce((document, { inverse }) => {
      const undone = applyBatch(document, inverse);
      if (!undone.ok) throw new Error(JSON.stringify(undone.errors));
      return undone.document;
    }, stored);
    expect(solverHashOf(first)).toBe(networks.edit(network.id, 1)?.solverHash);
    note = stored.nodes.get('TR1')?.value.note;
    db.$client.close();
  }
}, 120_000);

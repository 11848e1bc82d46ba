import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { applyBatch, type EditOp } from '@riseback/network';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { solverHashOf } from '../../server/src/networks/network-hashes';
import { checkAudit } from '../../server/src/platform/db/audit-check';
import { auditHeadLogOf, readAuditHeads } from '../../server/src/platform/db/audit-head-log';
import { openDatabase, type Database } from '../../server/src/platform/db/database';
import { batchOf, SMALL } from '../api/network-samples';
import { demoNetwork, signIn, startServer, type ServerProcess } from './server-process';
import { FULL, randomFrom, seedOfRun } from './test-form';

const ROUNDS = FULL ? 200 : 3;
/** A round ends so many acknowledged edits and so many milliseconds after its start, each time at another point of a write. */
const MOST_EDITS = 40;
const MOST_MS = 12;

let folder = '';
let server: ServerProcess | undefined;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-kill-'));
});
afterAll(() => {
  server?.child.kill('SIGKILL');
  rmSync(folder, { recursive: true, force: true });
});

/** What the server's answers said is stored, over all rounds. */
interface Acknowledged {
  /** Of the network before the first of these writes; 0 before it was asked. */
  first: number;
  version: number;
  note: string | undefined;
  readonly batches: string[];
  readonly networks: string[];
}

/**
 * Even versions add a trap with its pipe to the hall header; odd ones take it away again and leave their number in a note.
 * @param first version: nothing was added before it that could be taken away
 * @param note what the last odd version left
 */
function opsFor(version: number, { first, note }: Acknowledged): EditOp[] {
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
  if (version === first) return [write];
  return [write, { op: 'remove', in: 'nodes', id }, { op: 'remove', in: 'pipes', id: pipe.id }];
}

function noteOf(version: number): string {
  return `version ${version}`;
}

/** Runs until the connection breaks, which it does when the server is dead. */
async function untilBroken(work: () => Promise<void>): Promise<void> {
  try {
    for (;;) await work();
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
  }
}

/** Edits of one network, new networks and profile changes side by side, until the server is killed among them. */
async function writeUntilKilled(
  { address, child }: ServerProcess,
  known: Acknowledged,
  kill: { readonly afterEdits: number; readonly thenMs: number },
): Promise<{ networkId: string; from: number }> {
  const headers = await signIn(address);
  const network = await demoNetwork(address, headers);
  const send = (method: string, path: string, body: object, more: object = {}) =>
    fetch(address + path, { method, headers: { ...headers, ...more }, body: JSON.stringify(body) });
  if (known.first === 0) known.first = network.version;
  known.version = network.version;
  let edits = 0;
  const editing = untilBroken(async () => {
    const { version } = known;
    const batch = batchOf(opsFor(version, known));
    const answer = await send('POST', `/api/networks/${network.id}/edits`, batch, { 'If-Match': `"${version}"` });
    expect(answer.status, await answer.text()).toBe(200);
    known.batches.push(batch.batchId);
    if (version % 2 === 1) known.note = noteOf(version);
    known.version += 1;
    edits += 1;
    if (edits === kill.afterEdits) setTimeout(() => child.kill('SIGKILL'), kill.thenMs);
  });
  const making = untilBroken(async () => {
    const answer = await send('POST', `/api/sites/${network.siteId}/networks`, SMALL);
    expect(answer.status).toBe(201);
    known.networks.push(((await answer.json()) as { id: string }).id);
  });
  const changing = untilBroken(async () => {
    await send('PATCH', '/api/profile', { theme: edits % 2 === 0 ? 'dark' : 'light' });
  });
  await Promise.all([editing, making, changing]);
  return { networkId: network.id, from: network.version };
}

/** Everything that was acknowledged, whole; what was on its way may be there or not, but never in half. */
function demandAllThere(db: Database, networkId: string, known: Acknowledged, lastVersion: number): void {
  expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok');
  expect(db.$client.pragma('foreign_key_check')).toEqual([]);
  const networks = new NetworkRepository(db);
  for (const batchId of known.batches) expect(networks.editByBatch(batchId)).toBeDefined();
  for (const id of known.networks) {
    const document = networks.document(id);
    expect(document === undefined ? undefined : solverHashOf(document)).toBe(networks.head(id)?.solverHash);
  }
  const head = networks.head(networkId);
  // the last one may have been stored and its answer lost
  expect([known.version, known.version + 1]).toContain(head?.version);
  const stored = networks.document(networkId);
  if (stored === undefined) throw new Error('the network is stored');
  expect(head?.solverHash).toBe(solverHashOf(stored));
  const edits = networks.editsSince(networkId, lastVersion);
  expect(edits.map((edit) => edit.version)).toEqual(edits.map((_, i) => lastVersion + i + 1));
  const before = edits.toReversed().reduce((document, { inverse }) => {
    const undone = applyBatch(document, inverse);
    if (!undone.ok) throw new Error(JSON.stringify(undone.errors));
    return undone.document;
  }, stored);
  expect(solverHashOf(before)).toBe(networks.edit(networkId, lastVersion)?.solverHash);
  known.note = stored.nodes.get('TR1')?.value.note;
}

it(
  'keeps every acknowledged write through kill -9, and never half a one',
  async () => {
    const random = randomFrom(seedOfRun('killed servers'));
    const path = join(folder, 'riseback.db');
    const known: Acknowledged = { first: 0, version: 0, note: undefined, batches: [], networks: [] };
    for (let round = 0; round < ROUNDS; round += 1) {
      server = await startServer(path);
      const kill = { afterEdits: 5 + Math.floor(random() * MOST_EDITS), thenMs: random() * MOST_MS };
      const { networkId, from } = await writeUntilKilled(server, known, kill);
      await server.ended();
      expect(known.batches.length).toBeGreaterThan(0);

      const heads = readAuditHeads(auditHeadLogOf(path));
      const db = openDatabase(path);
      expect(checkAudit(db, heads).mismatch).toBeUndefined();
      demandAllThere(db, networkId, known, from);
      known.version = new NetworkRepository(db).head(networkId)?.version ?? 0;
      db.$client.close();
      if ((round + 1) % 20 === 0) process.stdout.write(`${round + 1} kills\n`);
    }
    process.stdout.write(
      `${ROUNDS} kills: ${known.batches.length} edits and ${known.networks.length} networks acknowledged, all there\n`,
    );
  },
  // on a machine that is shared, a round may take half a minute
  FULL ? 4 * 3_600_000 : 120_000,
);

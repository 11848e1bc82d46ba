import type { EditAccepted, Network, Problem, SavedBatch, StaleVersion } from '@riseback/contracts';
import { applyBatch, fromFile, readNetworkFile, type EditOp } from '@riseback/network';
import { eq } from 'drizzle-orm';
import { afterAll, describe, expect, it } from 'vitest';
import { audit, edits, nodes } from '../../server/src/platform/db/schema';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { batchOf, makeNetwork, raise, sendBatch, SMALL } from './network-samples';
import { TestServer, type Client } from './test-server';

const server = new TestServer();
afterAll(() => {
  server.close();
});
const designer = server.as('designer');
const GAUGE: EditOp = { op: 'add', in: 'gauges', ordinal: 0, value: { id: 'G1', node: 'J1', elevationM: 1 } };

async function networkOf(client: Client, id: string): Promise<Network> {
  return (await client.get(`/api/networks/${id}`).expect(200)).body as Network;
}

describe('an accepted batch', () => {
  it('answers the new version with its ETag, and changes what it says', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const answer = await sendBatch(designer, id, 1, batchOf([raise(3)])).expect(200);
    expect(answer.headers['etag']).toBe('"2"');
    expect(answer.body).toMatchObject({ version: 2 });
    const network = await networkOf(designer, id);
    expect(network.version).toBe(2);
    expect(network.solverHash).toBe((answer.body as EditAccepted).solverHash);
    expect(network.document.nodes.find(({ value }) => value.id === 'T1')?.value.elevationM).toBe(3);
  });

  it('writes only the rows it touches', async () => {
    const id = await makeNetwork(designer, server.siteId);
    await sendBatch(designer, id, 1, batchOf([raise(3)])).expect(200);
    const rows = server.db.select().from(nodes).where(eq(nodes.networkId, id)).all();
    expect(Object.fromEntries(rows.map((row) => [row.id, row.changedIn]))).toEqual({ T1: 2, J1: 1, R1: 1 });
  });

  it('is kept with its inverse, which gives the first document back', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const before = await networkOf(designer, id);
    const ops: EditOp[] = [
      { op: 'remove', in: 'pipes', id: 'L2' },
      { op: 'add', in: 'cases', ordinal: 0, value: { id: 'c', name: 'C' } },
      { op: 'add', in: 'overrides', id: 'c/T1', ordinal: 0, value: { node: 'T1', state: 'isolated' } },
      { op: 'set', in: 'nodes', id: 'T1', key: 'tag', from: 'TR-1' },
      { op: 'set', in: 'network', key: 'name', from: 'Small', to: 'Renamed' },
      GAUGE,
    ];
    await sendBatch(designer, id, 1, batchOf(ops)).expect(200);
    const stored = server.db
      .select()
      .from(edits)
      .where(eq(edits.networkId, id))
      .all()
      .find(({ version }) => version === 2);
    await sendBatch(designer, id, 2, batchOf(stored?.inverse as EditOp[], 'undo')).expect(200);
    const after = await networkOf(designer, id);
    expect({ ...after, version: 1 }).toEqual(before);
  });

  it('is recorded in the log, in an unbroken chain', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const batch = batchOf([raise(1)], 'raise TR-1');
    await sendBatch(designer, id, 1, batch).expect(200);
    const rows = server.db.select().from(audit).where(eq(audit.subject, id)).all();
    expect(rows.map(({ action }) => action)).toEqual(['network.create', 'network.edit']);
    expect(rows[1]).toMatchObject({
      personId: 'designer',
      siteId: server.siteId,
      details: { version: 2, batchId: batch.batchId, label: 'raise TR-1' },
    });
    expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  });

  it('may name its elements in any order', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const add: EditOp[] = [
      { op: 'add', in: 'gauges', ordinal: 0, value: { id: 'G9', pipe: 'L9', distanceM: 1, elevationM: 0 } },
      {
        op: 'add',
        in: 'pipes',
        ordinal: 9,
        value: { id: 'L9', from: 'T9', to: 'J1', lengthM: 1, insideDiameterM: 0.02 },
      },
      {
        op: 'add',
        in: 'nodes',
        ordinal: 9,
        value: { id: 'T9', kind: 'trap', elevationM: 0, inletPressurePa: 3e5, loadKgS: 0.1 },
      },
    ];
    await sendBatch(designer, id, 1, batchOf(add)).expect(200);
    const remove: EditOp[] = [
      { op: 'remove', in: 'nodes', id: 'T9' },
      { op: 'remove', in: 'pipes', id: 'L9' },
      { op: 'remove', in: 'gauges', id: 'G9' },
    ];
    await sendBatch(designer, id, 2, batchOf(remove)).expect(200);
    expect(server.db.$client.pragma('foreign_key_check')).toEqual([]);
  });
});

describe('a batch that is sent again', () => {
  it('gets its first answer and is not applied twice, also after later edits', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const batch = batchOf([raise(1)]);
    const first = await sendBatch(designer, id, 1, batch).expect(200);
    await sendBatch(designer, id, 2, batchOf([raise(2, 1)])).expect(200);
    const again = await sendBatch(designer, id, 1, batch).expect(200);
    expect(again.body).toEqual(first.body);
    expect(again.headers['etag']).toBe('"2"');
    expect((await networkOf(designer, id)).version).toBe(3);
  });

  it('is applied once however often it comes at once', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const batch = batchOf([raise(1)]);
    const answers = await Promise.all(Array.from({ length: 20 }, () => sendBatch(designer, id, 1, batch)));
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([200]));
    expect((await networkOf(designer, id)).version).toBe(2);
  });

  it('is refused when its content differs, or it belongs elsewhere', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const batch = batchOf([raise(1)]);
    await sendBatch(designer, id, 1, batch).expect(200);
    await sendBatch(designer, id, 1, { ...batch, ops: [raise(2)] }).expect(409);
    await sendBatch(designer, id, 1, { ...batch, label: 'other words' }).expect(409);
    await sendBatch(server.as('administrator'), id, 1, batch).expect(409);
    const other = await makeNetwork(designer, server.siteId);
    const refused = await sendBatch(designer, other, 1, batch).expect(409);
    expect((refused.body as Problem).type).toBe('/problems/conflict');
  });
});

describe('the version in If-Match', () => {
  it('must be there, and be one', async () => {
    const id = await makeNetwork(designer, server.siteId);
    await designer.post(`/api/networks/${id}/edits`, batchOf([raise(1)])).expect(428);
    for (const bad of ['1', 'W/"1"', '"x"', '*', '"1", "2"']) {
      await designer
        .post(`/api/networks/${id}/edits`, batchOf([raise(1)]))
        .set('If-Match', bad)
        .expect(400);
    }
  });

  it('must be the newest: 412 carries the batches since, which make the newest document', async () => {
    const id = await makeNetwork(designer, server.siteId);
    await sendBatch(designer, id, 1, batchOf([raise(1)], 'first')).expect(200);
    server.pass(1_000);
    await sendBatch(server.as('administrator'), id, 2, batchOf([GAUGE], 'second')).expect(200);
    const refused = await sendBatch(designer, id, 1, batchOf([raise(7)])).expect(412);
    const { currentVersion, batches } = refused.body as StaleVersion;
    expect(refused.body).toMatchObject({ type: '/problems/stale-version' });
    expect(currentVersion).toBe(3);
    expect(batches.map(({ version, label, personName }) => ({ version, label, personName }))).toEqual([
      { version: 2, label: 'first', personName: 'designer' },
      { version: 3, label: 'second', personName: 'administrator' },
    ]);
    const read = readNetworkFile(SMALL);
    if (!read.ok) throw new Error('the sample is a network file');
    const replayed = applyBatch(
      fromFile(read.file),
      batches.flatMap(({ ops }) => ops),
    );
    expect(replayed.ok && [...replayed.document.gauges.keys()]).toEqual(['G1']);
    const since = (await designer.get(`/api/networks/${id}/edits?since=1`).expect(200)).body as SavedBatch[];
    expect(since).toEqual(batches);
    await sendBatch(designer, id, 9, batchOf([raise(7)])).expect(412);
  });

  it('lets exactly one of fifty edits on one version win', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const answers = await Promise.all(
      Array.from({ length: 50 }, (_, i) => sendBatch(designer, id, 1, batchOf([raise(i + 1)], `edit ${i}`))),
    );
    const statuses = answers.map(({ status }) => status);
    expect(statuses.filter((status) => status === 200)).toHaveLength(1);
    expect(statuses.filter((status) => status === 412)).toHaveLength(49);
    const winner = answers.findIndex(({ status }) => status === 200);
    const network = await networkOf(designer, id);
    expect(network.version).toBe(2);
    expect(network.document.nodes.find(({ value }) => value.id === 'T1')?.value.elevationM).toBe(winner + 1);
  });
});

describe('what a batch touches decides who may send it', () => {
  const both = [GAUGE, raise(2)];
  it.each([
    { who: 'designer', gauges: 200, drawing: 200, mixed: 200 },
    { who: 'administrator', gauges: 200, drawing: 200, mixed: 200 },
    { who: 'commissioning', gauges: 200, drawing: 403, mixed: 403 },
    { who: 'reviewer', gauges: 403, drawing: 403, mixed: 403 },
    { who: 'viewer', gauges: 403, drawing: 403, mixed: 403 },
    { who: 'outsider', gauges: 404, drawing: 404, mixed: 404 },
    { who: 'stranger', gauges: 404, drawing: 404, mixed: 404 },
  ] as const)('$who: gauges $gauges, drawing $drawing, both $mixed', async ({ who, gauges, drawing, mixed }) => {
    for (const [ops, status] of [
      [[GAUGE], gauges],
      [[raise(2)], drawing],
      [both, mixed],
    ] as const) {
      const id = await makeNetwork(designer, server.siteId);
      await sendBatch(server.as(who), id, 1, batchOf([...ops])).expect(status);
      expect((await networkOf(designer, id)).version).toBe(status === 200 ? 2 : 1);
    }
  });
});

describe('a batch that does not fit', () => {
  it.each<{ name: string; ops: EditOp[]; pointer: string }>([
    { name: 'a stale from', ops: [raise(1), raise(2, 0)], pointer: '/ops/1' },
    { name: 'an unknown element', ops: [{ op: 'remove', in: 'nodes', id: 'T7' }], pointer: '/ops/0' },
    { name: 'a node that a pipe needs', ops: [{ op: 'remove', in: 'nodes', id: 'J1' }], pointer: '/ops/0' },
    {
      name: 'an unknown key',
      ops: [{ op: 'set', in: 'nodes', id: 'T1', key: 'colour', to: 'red' }],
      pointer: '/ops/0',
    },
    { name: 'a value out of range', ops: [raise(1e9)], pointer: '/ops/0' },
    {
      name: 'the key __proto__',
      ops: [{ op: 'set', in: 'nodes', id: 'T1', key: '__proto__', to: { elevationM: 5 } }],
      pointer: '/ops/0',
    },
  ])('is refused as a whole with the step: $name', async ({ ops, pointer }) => {
    const id = await makeNetwork(designer, server.siteId);
    const refused = await sendBatch(designer, id, 1, batchOf(ops)).expect(422);
    expect((refused.body as Problem).errors?.map((error) => error.pointer)).toContain(pointer);
    const network = await networkOf(designer, id);
    expect(network.version).toBe(1);
    expect(server.db.select().from(edits).where(eq(edits.networkId, id)).all()).toHaveLength(1);
  });

  it('is a bad request when it is no batch', async () => {
    const id = await makeNetwork(designer, server.siteId);
    await sendBatch(designer, id, 1, { ...batchOf([raise(1)]), batchId: 'x' }).expect(400);
    await sendBatch(designer, id, 1, batchOf([])).expect(400);
  });
});

describe('what the edits remember', () => {
  it('is the whole history, the creation included', async () => {
    const id = await makeNetwork(designer, server.siteId);
    const [creation] = (await designer.get(`/api/networks/${id}/edits?since=0`).expect(200)).body as SavedBatch[];
    expect(creation).toMatchObject({ version: 1, personName: 'designer' });
    expect(creation?.ops.filter(({ op }) => op === 'add').length).toBe(SMALL.nodes.length + SMALL.pipes.length);
    await designer.get(`/api/networks/${id}/edits?since=-1`).expect(400);
    await designer.get(`/api/networks/${id}/edits`).expect(400);
  });
});

import type { Network, NetworkSummary } from '@riseback/contracts';
import { readNetworkFile, type NetworkFile } from '@riseback/network';
import { afterAll, describe, expect, it } from 'vitest';
import ternQuay from '../../server/demo/tern-quay.json';
import { batchOf, EVERY_KEY, makeNetwork, raise, sendBatch, SMALL } from './network-samples';
import { TestServer } from './test-server';

const server = new TestServer();
afterAll(() => {
  server.close();
});
const designer = server.as('designer');
const NETWORKS = `/api/sites/${server.siteId}/networks`;

function defaultsFilledIn(file: object): NetworkFile {
  const read = readNetworkFile(file);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

describe('a new network', () => {
  it('answers 201 with its place, its version and itself', async () => {
    const made = await designer.post(NETWORKS, SMALL).expect(201);
    const network = made.body as Network;
    expect(network).toMatchObject({ name: 'Small', version: 1, siteId: server.siteId, role: 'designer' });
    expect(made.headers['location']).toBe(`/api/networks/${network.id}`);
    expect(made.headers['etag']).toBe('"1"');
    const got = await designer.get(`/api/networks/${network.id}`).expect(200);
    expect(got.body).toEqual(network);
    expect(got.headers['etag']).toBe('"1"');
  });

  it.each([
    { name: 'a small one', file: SMALL },
    { name: 'one with every key', file: EVERY_KEY },
    { name: 'the demo plant', file: ternQuay },
  ])('gives its file back with the defaults filled in: $name', async ({ file }) => {
    const id = await makeNetwork(designer, server.siteId, file);
    const back = await designer.get(`/api/networks/${id}/file`).expect(200);
    expect(back.body).toEqual(defaultsFilledIn(file));
  });

  it('keeps its elements when the server has forgotten them (read from the rows)', async () => {
    const id = await makeNetwork(designer, server.siteId, EVERY_KEY);
    // sixteen others push it out of what is held in memory
    for (let i = 0; i < 17; i += 1) await makeNetwork(designer, server.siteId);
    const back = await designer.get(`/api/networks/${id}/file`).expect(200);
    expect(back.body).toEqual(defaultsFilledIn(EVERY_KEY));
  });

  it('is drawn where the file says nothing', async () => {
    const nodes = SMALL.nodes.map(({ position: _, ...node }) => node);
    const id = await makeNetwork(designer, server.siteId, { ...SMALL, nodes });
    const { document } = (await designer.get(`/api/networks/${id}`).expect(200)).body as Network;
    const spots = document.nodes.flatMap(({ value }) => value.position ?? []);
    expect(new Set(spots.map((spot) => JSON.stringify(spot))).size).toBe(3);
  });

  it('takes elements whose ids are names of Object.prototype', async () => {
    const file = { ...SMALL, nodes: [{ id: 'constructor', kind: 'junction', elevationM: 0 }], pipes: [] };
    const id = await makeNetwork(designer, server.siteId, file);
    const back = (await designer.get(`/api/networks/${id}/file`).expect(200)).body as NetworkFile;
    expect(back.nodes.map((node) => node.id)).toEqual(['constructor']);
  });
});

describe('a file with mistakes', () => {
  it('is refused with a pointer to each, and nothing is stored', async () => {
    const [trap, ...others] = SMALL.nodes;
    const file = {
      ...SMALL,
      nodes: [{ ...trap, inletPressurePa: -1, colour: 'red' }, ...others],
      pipes: [{ ...SMALL.pipes[0], to: 'J9' }, SMALL.pipes[1]],
    };
    const before = ((await designer.get(NETWORKS)).body as NetworkSummary[]).length;
    const refused = await designer.post(NETWORKS, file).expect(400);
    expect(refused.headers['content-type']).toContain('application/problem+json');
    const { errors } = refused.body as { errors: { pointer: string; detail: string }[] };
    expect(errors.map(({ pointer }) => pointer)).toEqual(
      expect.arrayContaining(['/nodes/0/inletPressurePa', '/nodes/0/colour']),
    );
    expect(((await designer.get(NETWORKS)).body as NetworkSummary[]).length).toBe(before);
  });

  it.each([{ body: [] }, { body: { format: 'other' } }])('is refused when it is no network file', async ({ body }) => {
    await designer.post(NETWORKS, body).expect(400);
  });
});

describe('the list of networks', () => {
  it('says who changed each last, when, and what its first case shows', async () => {
    const other = new TestServer();
    const id = await makeNetwork(other.as('designer'), other.siteId);
    other.pass(60_000);
    await sendBatch(other.as('administrator'), id, 1, batchOf([raise(0.5)])).expect(200);
    await other.as('viewer').get(`/api/networks/${id}/results`).expect(200);
    const list = (await other.as('viewer').get(`/api/sites/${other.siteId}/networks`).expect(200))
      .body as NetworkSummary[];
    expect(list).toHaveLength(1);
    expect(list[0]).toMatchObject({
      id,
      name: 'Small',
      version: 2,
      changedBy: 'administrator',
      changedAt: '2026-03-02T08:01:00.000Z',
      solve: { state: 'solved', traps: 1 },
    });
    expect((await other.as('outsider').get(`/api/sites/${other.otherSiteId}/networks`).expect(200)).body).toEqual([]);
    other.close();
  });
});

describe('a download', () => {
  it.each([
    { name: 'Tern Quay / West', expected: 'Tern-Quay-West.json' },
    { name: 'a"; filename="x.exe', expected: 'a-filename-x-exe.json' },
    { name: '../../etc/passwd', expected: 'etc-passwd.json' },
    { name: 'Kälte\u202Egpj', expected: 'Kalte-gpj.json' },
    { name: '…', expected: 'network.json' },
  ])('has a name that no system takes for more than a name: $expected', async ({ name, expected }) => {
    const id = await makeNetwork(designer, server.siteId, { ...SMALL, name });
    const plain = await designer.get(`/api/networks/${id}/file`).expect(200);
    expect(plain.headers['content-disposition']).toBeUndefined();
    const saved = await designer.get(`/api/networks/${id}/file?download=1`).expect(200);
    expect(saved.headers['content-disposition']).toBe(`attachment; filename=${expected}`);
    expect(saved.headers['content-type']).toContain('application/json');
  });
});

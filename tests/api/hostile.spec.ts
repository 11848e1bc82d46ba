import { randomUUID } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import type { EditOp } from '@riseback/network';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RATE_LIMITED } from '../../server/src/platform/http/rate-limit';
import type { Route } from '../../server/src/platform/routes/route-table';
import { costly, Listening, type Answer } from './listening-server';
import { batchOf, makeNetwork, raise, sendBatch, SMALL } from './network-samples';
import { rightfulOf } from './rightful-role';
import { TestServer, type Client } from './test-server';

const MB = 1024 * 1024;

let listening: Listening;
let designer: Client;
let networkId: string;
beforeAll(async () => {
  listening = await new Listening().listen();
  designer = listening.app.as('designer');
  networkId = await makeNetwork(designer, listening.app.siteId);
});
afterAll(() => listening.close());

const create = () => `/api/sites/${listening.app.siteId}/networks`;
const edits = () => `/api/networks/${networkId}/edits`;
const makes = [
  { name: 'a new network', path: create },
  { name: 'a solve', path: () => '/api/solve' },
  { name: 'an edit', path: edits },
];

function manyPipes(count: number): string {
  const pipes = Array.from({ length: count }, (_, i) => ({ id: `L${i}`, from: 'T1', to: 'R1', lengthM: 1 }));
  return JSON.stringify({ ...SMALL, pipes });
}

describe('a body that is too much', () => {
  it.each(makes)('10 MB for $name are refused before they are read', async ({ path }) => {
    const body = `{"name":"${'x'.repeat(10 * MB)}"}`;
    const { status, body: problem } = await costly(listening, () =>
      listening.send(designer, path(), body, { 'If-Match': '"1"' }),
    );
    expect({ status, type: problem.type }).toEqual({ status: 413, type: '/problems/payload-too-large' });
    expect(problem.detail).toMatch(/ MB at most/);
  });

  it.each(makes)('10 MB packed into 10 kB for $name are refused as they unpack', async ({ path }) => {
    const packed = gzipSync('['.repeat(10 * MB));
    expect(packed.length).toBeLessThan(20_000);
    const headers = { 'Content-Encoding': 'gzip', 'If-Match': '"1"' };
    const { status } = await costly(listening, () => listening.send(designer, path(), packed, headers));
    expect(status).toBe(413);
  });

  it.each(makes.slice(0, 2))('200,000 pipes for $name are refused', async ({ path }) => {
    const { status } = await costly(listening, () => listening.send(designer, path(), manyPipes(200_000)));
    expect(status).toBe(413);
  });

  it('more operations than a batch may have are refused', async () => {
    const ops = Array.from({ length: 20_001 }, () => ({ op: 'remove', in: 'pipes', id: 'L' }));
    const body = JSON.stringify({ batchId: randomUUID(), label: 'many', ops });
    const { status } = await costly(listening, () => listening.send(designer, edits(), body, { 'If-Match': '"1"' }));
    expect(status).toBe(400);
  });

  it('a file as large as may be, with a mistake in every pipe, is answered with the first hundred', async () => {
    const pipes = Array.from({ length: 45_000 }, () => ({ id: '!', from: 7, to: null }));
    const body = JSON.stringify({ ...SMALL, pipes });
    expect(body.length).toBeLessThan(2 * MB);
    const { status, body: problem } = await costly(listening, () => listening.send(designer, create(), body));
    expect(status).toBe(400);
    // and one that says that there are more
    expect(problem.errors?.length).toBeLessThanOrEqual(101);
  });
});

describe('a network that grows beyond every plant by edits', () => {
  it('is refused, with what to do', async () => {
    const id = await makeNetwork(designer, listening.app.siteId);
    const junctions = (from: number, count: number): EditOp[] =>
      Array.from({ length: count }, (_, i) => ({
        op: 'add',
        in: 'nodes',
        ordinal: 10 + from + i,
        value: { id: `N${from + i}`, kind: 'junction', elevationM: 0 },
      }));
    await sendBatch(designer, id, 1, batchOf(junctions(0, 15_000))).expect(200);
    const refused = await sendBatch(designer, id, 2, batchOf(junctions(15_000, 15_000))).expect(422);
    expect((refused.body as Answer['body']).detail).toMatch(/25000 of each are the most/);
  });
});

describe('what no plant says', () => {
  const deep = `${'['.repeat(100_000)}1${']'.repeat(100_000)}`;
  const json = (text: string) => text.replace('"HERE"', deep);
  const set = (to: unknown, key = 'elevationM') =>
    JSON.stringify(batchOf([{ op: 'set', in: 'nodes', id: 'T1', key, from: 0, to } as EditOp]));
  const file = (change: object) => JSON.stringify({ ...SMALL, ...change });
  const trap = (change: object) => file({ nodes: [{ ...SMALL.nodes[0], ...change }, ...SMALL.nodes.slice(1)] });

  it.each([
    { name: 'arrays 100,000 deep', text: () => json(file({ name: 'HERE' })) },
    { name: 'arrays 100,000 deep in an element', text: () => json(trap({ note: 'HERE' })) },
    { name: 'nothing but brackets', text: () => deep },
    { name: 'brackets that are never closed', text: () => '['.repeat(MB) },
    { name: 'a number beyond all measure', text: () => trap({ elevationM: 1e308 }) },
    {
      name: 'a number that JSON has and a double has not',
      text: () => trap({ elevationM: 1 }).replace(':1,', ':1e999,'),
    },
    { name: 'a long text', text: () => trap({ tag: 'x'.repeat(MB) }) },
    { name: 'half a character', text: () => trap({ id: '\ud800' }) },
    { name: 'a prototype', text: () => file({}).replace('{', '{"__proto__":{"admin":true},') },
    { name: 'a prototype in an element', text: () => trap({}).replace('"kind"', '"__proto__":{},"kind"') },
    { name: 'an id twice', text: () => file({ nodes: [...SMALL.nodes, SMALL.nodes[0]] }) },
  ])('in a file is refused with 400: $name', async ({ text }) => {
    for (const path of [create(), '/api/solve']) {
      const { status, body } = await costly(listening, () => listening.send(designer, path, text()));
      expect({ path, status, type: body.type }).toEqual({ path, status: 400, type: '/problems/bad-request' });
    }
  });

  it.each([
    { name: 'deep nesting', text: () => json(set('HERE', 'note')), expected: 400 },
    { name: 'a number beyond all measure', text: () => set(1e308), expected: 422 },
    { name: 'a long text', text: () => set('x'.repeat(MB), 'tag'), expected: 422 },
    { name: 'a prototype as a key', text: () => set({}, '__proto__'), expected: 422 },
    { name: 'an id that is there', text: () => adding({ ...SMALL.nodes[1] }), expected: 422 },
    {
      name: 'a prototype in a value',
      text: () => adding({ id: 'N' }).replace('"id"', '"__proto__":{"a":1},"id"'),
      expected: 422,
    },
  ])('in an edit is refused: $name', async ({ text, expected }) => {
    const { status } = await costly(listening, () => listening.send(designer, edits(), text(), { 'If-Match': '"1"' }));
    expect(status).toBe(expected);
    expect(({} as Record<string, unknown>)['admin']).toBeUndefined();
  });

  const adding = (value: object) =>
    JSON.stringify(batchOf([{ op: 'add', in: 'nodes', ordinal: 9, value: value as Record<string, unknown> }]));

  it.each([-0, 1e-320, 5e-324])('numbers that are only odd are kept as they are: %d', async (elevationM) => {
    const text = trap({ elevationM }).replace(
      '"elevationM":0',
      `"elevationM":${Object.is(elevationM, -0) ? '-0' : elevationM}`,
    );
    const { status, body } = await listening.send(designer, create(), text);
    expect(status).toBe(201);
    const { id } = body as { id: string };
    const got = await listening.send(designer, `/api/networks/${id}/file`, '', {}, 'GET');
    const [first] = (got.body as { nodes: { elevationM: number }[] }).nodes;
    // JSON has no zero of its own below zero
    expect(first?.elevationM).toBe(elevationM === 0 ? 0 : elevationM);
  });
});

describe('a history of any length', () => {
  it('is told in pages, to those who ask for edits and to those who are behind', async () => {
    const id = await makeNetwork(designer, listening.app.siteId);
    addEdits(id, 1_300, [raise(1)]);
    const versions: number[] = [];
    let path: string | undefined = `/api/networks/${id}/edits?since=1`;
    while (path !== undefined) {
      const page = await costly(listening, () => Promise.resolve(designer.get(path ?? '').expect(200)));
      const batches = page.body as { version: number }[];
      expect(batches.length).toBeLessThanOrEqual(500);
      versions.push(...batches.map(({ version }) => version));
      path = /^<([^>]+)>; rel="next"$/.exec(String(page.headers['link']))?.[1];
    }
    expect(versions).toEqual(Array.from({ length: 1_299 }, (_, i) => i + 2));

    const behind = await costly(listening, () =>
      Promise.resolve(sendBatch(designer, id, 1, batchOf([raise(2)])).expect(412)),
    );
    const stale = behind.body as { currentVersion: number; batches: { version: number }[] };
    expect(stale.currentVersion).toBe(1_300);
    expect(stale.batches.map(({ version }) => version)).toEqual(versions.slice(0, 500));
    await costly(listening, () => Promise.resolve(designer.get(`/api/networks/${id}/results?version=2`).expect(422)));
  });

  it('is cut by its size too, and never empty', async () => {
    const id = await makeNetwork(designer, listening.app.siteId);
    addEdits(id, 3, [{ op: 'set', in: 'nodes', id: 'T1', key: 'note', to: 'x'.repeat(3_000_000) }]);
    const page = await designer.get(`/api/networks/${id}/edits?since=1`).expect(200);
    expect((page.body as unknown[]).length).toBe(1);
    expect(page.headers['link']).toContain('since=2');
  });

  /** Versions up to one, without the work of making them. */
  function addEdits(id: string, upTo: number, ops: readonly EditOp[]): void {
    const { $client } = listening.app.db;
    const insert = $client.prepare(
      'insert into edits select network_id, ?, ?, person_id, at, label, ?, inverse, hex(randomblob(32)) from edits where network_id = ? and version = 1',
    );
    for (let version = 2; version <= upTo; version++) insert.run(version, randomUUID(), JSON.stringify(ops), id);
    $client.prepare('update networks set version = ? where id = ?').run(upTo, id);
  }
});

describe('every route', () => {
  const nameOf = ({ method, path }: Route) => `${method.toUpperCase()} ${path}`;
  const routes = () => listening.app.app.routes;

  it('has a rate limit, but the one that says whether the process answers', async () => {
    const unlimited = routes().filter(({ path }) => !RATE_LIMITED.some((prefix) => path.startsWith(prefix)));
    expect(unlimited.map(nameOf)).toEqual(['GET /healthz']);
    const strict = new TestServer({ config: { requestsPerMinute: 10 } });
    const viewer = strict.as('viewer');
    for (const route of routes().filter((route) => !unlimited.includes(route))) {
      strict.pass(0);
      const path = route.path.replaceAll(/:\w+/g, 'x');
      let status = 0;
      for (let i = 0; i < 12 && status !== 429; i++) status = (await viewer.send(route.method, path)).status;
      expect({ route: nameOf(route), status }).toEqual({ route: nameOf(route), status: 429 });
    }
    strict.close();
  });

  it('that takes a body refuses one over its limit, and no limit is above 8 MB', async () => {
    for (const route of routes().filter(({ body }) => body !== undefined)) {
      expect(route.bodyLimitBytes, nameOf(route)).toBeLessThanOrEqual(8 * MB);
      const path = route.path
        .replace(':siteId', listening.app.siteId)
        .replace(':networkId', networkId)
        .replaceAll(/:\w+/g, 'x');
      const body = JSON.stringify('x'.repeat(route.bodyLimitBytes));
      const client = listening.app.as(route.rule.kind === 'public' ? 'anonymous' : rightfulOf(route));
      const { status } = await listening.send(client, path, body, { 'If-Match': '"1"' }, route.method.toUpperCase());
      expect({ route: nameOf(route), status }).toEqual({ route: nameOf(route), status: 413 });
    }
  });
});

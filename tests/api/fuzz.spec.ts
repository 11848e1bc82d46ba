import { randomUUID } from 'node:crypto';
import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { ROLES } from '@riseback/contracts';
import fc from 'fast-check';
import type { Response } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Route } from '../../server/src/platform/routes/route-table';
import { jpegOf, pngOf } from '../fixtures/images';
import { ApiDescription } from './api-description';
import { valueOf } from './schema-arbitrary';
import { TestServer, type Client, type Who } from './test-server';

/** Calls a route; the long form makes over 10,000 in all. */
const CALLS = process.env['RISEBACK_TEST_FULL'] === '1' ? 500 : 25;
/** Live objects may grow by this much from the first route to the last: caches that fill, and what the runner itself keeps. */
const MOST_GROWTH_BYTES = 32 * 1024 * 1024;

const FILE = {
  format: 'riseback-network',
  version: 1,
  name: 'Fuzz',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
    { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 101_325 },
  ],
  pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 6, insideDiameterM: 0.025 }],
};
const edit = (...ops: object[]) => ({ batchId: randomUUID(), label: 'fuzz', ops });
/** Bodies near enough to right ones that the code behind the schemas meets them. */
const NEARLY: readonly (() => unknown)[] = [
  () => FILE,
  () => edit({ op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from: 0, to: 1 }),
  () => edit({ op: 'add', in: 'nodes', ordinal: 3, value: { id: 'J1', kind: 'junction', elevationM: 0 } }),
  () => edit({ op: 'remove', in: 'nodes', id: 'T1' }),
  () => edit({ op: 'set', in: 'network', key: 'method', from: {}, to: { friction: 'friedel' } }),
  () => ({ email: 'a@b.example', password: 'x' }),
  () => ({ units: 'si', theme: 'dark', timeZone: 'UTC' }),
];

const server = new TestServer({ config: { requestsPerMinute: 1e9, logLevel: 'error' } });
let description: ApiDescription;
const networkIds: string[] = [];
beforeAll(async () => {
  description = await ApiDescription.of(server);
  for (let i = 0; i < 2; i += 1) {
    const made = await server.as('designer').post(`/api/sites/${server.siteId}/networks`, FILE).expect(201);
    networkIds.push((made.body as { id: string }).id);
  }
});
afterAll(() => {
  server.close();
});

/** The administrator oftener than the others: who is let through meets more of the program. */
const everyone: fc.Arbitrary<Who | 'anonymous'> = fc.oneof(
  fc.constant('administrator' as const),
  fc.constantFrom('designer' as const, ...ROLES, 'stranger' as const, 'outsider' as const, 'anonymous' as const),
);
const clients = new Map<Who | 'anonymous', Client>();

/** A session of each, and another once a call has ended it. */
function clientOf(who: Who | 'anonymous', last?: Response): Client {
  const known = clients.get(who);
  if (known !== undefined && last?.status !== 401) return known;
  const client = server.as(who);
  clients.set(who, client);
  return client;
}

const oddKey = fc.constantFrom('__proto__', 'constructor', 'toString', 'id', 'kind', 'ops', 'nodes', 'value', 'to', '');
const oddValue: fc.Arbitrary<unknown> = fc.oneof(
  fc.jsonValue({ maxDepth: 3 }),
  fc.constantFrom(
    null,
    -0,
    1e308,
    -1e308,
    5e-324,
    2 ** 53,
    '',
    '\u0000',
    '\ud800',
    "'; drop table people; --",
    [],
    {},
    [[[[]]]],
  ),
  fc.dictionary(oddKey, fc.jsonValue({ maxDepth: 1 })),
);

/** A value with one of its parts, chosen by `seed`, put in the place of another or taken away. */
function spoil(value: unknown, seed: number, odd: unknown): unknown {
  if (typeof value !== 'object' || value === null || seed % 5 === 0) return odd;
  const keys = Object.keys(value);
  const key = keys[seed % Math.max(1, keys.length)];
  if (key === undefined) return odd;
  const part = spoil((value as Record<string, unknown>)[key], Math.floor(seed / 7), odd);
  return Array.isArray(value)
    ? value.map((item: unknown, index) => (String(index) === key ? part : item))
    : { ...value, [key]: part };
}

/** What the route's own contract asks for, or what is right for another route; half of it spoilt. */
function bodyFor(route: Route): fc.Arbitrary<unknown> {
  const schema = description.bodyOf(route);
  const other = fc.constantFrom(...NEARLY).map((make) => make());
  const right = schema === undefined ? other : fc.oneof(other, { weight: 2, arbitrary: valueOf(schema) });
  return fc
    .tuple(right, fc.nat(), oddValue)
    .map(([value, seed, odd]) => (seed % 2 === 0 ? value : spoil(value, seed, odd)));
}

function pathOf(route: Route, odd: string): string {
  const siteId = odd.length % 7 === 6 ? server.otherSiteId : server.siteId;
  const path = route.path
    .replace(':siteId', siteId)
    .replace(':networkId', networkIds[odd.length % networkIds.length] ?? '');
  // an empty last part is another route's address
  return path.replaceAll(/:\w+/g, encodeURIComponent(odd === '' ? '-' : odd));
}

/** A file with one of its bytes put in the place of another, or cut off there. */
function nearlyFile(odd: string): Buffer {
  const file = Buffer.from(odd.length % 2 === 0 ? pngOf(4, 4) : jpegOf());
  const at = [...odd].reduce((sum, letter) => (sum * 31 + (letter.codePointAt(0) ?? 0)) % file.length, 7);
  if (odd.length % 5 === 4) return file.subarray(0, at);
  file.writeUInt8((file.readUInt8(at) + odd.length) % 256, at);
  return file;
}

/** The key that goes with a body that has an id, so that the code behind the check meets it. */
function keyOf(sent: unknown): string {
  const id: unknown = typeof sent === 'object' && sent !== null && 'id' in sent ? sent.id : undefined;
  return typeof id === 'string' && /^[\w-]+$/.test(id) ? id : 'none';
}

async function call(route: Route, who: Who | 'anonymous', sent: unknown, odd: string): Promise<Response> {
  const query = `?version=${encodeURIComponent(odd)}&since=${encodeURIComponent(odd)}&case=${encodeURIComponent(odd)}`;
  const path = pathOf(route, odd) + (odd.length % 2 === 0 ? query : '');
  const once = async (client: Client) => {
    const test = client.send(route.method, path);
    void test.set('If-Match', odd.length % 3 === 0 ? '"1"' : `"${String(odd.length)}"`);
    void test.set('Idempotency-Key', keyOf(sent));
    if (route.body !== undefined) void test.set('Content-Type', 'application/json').send(JSON.stringify(sent));
    if (route.upload !== undefined) {
      const { types } = route.upload;
      void test.set('Content-Type', types[odd.length % types.length] ?? '').send(nearlyFile(odd));
    }
    return test;
  };
  const first = await once(clientOf(who));
  return first.status === 401 && who !== 'anonymous' ? once(clientOf(who, first)) : first;
}

/** Live bytes of the JavaScript heap, after a full collection. */
function liveBytes(): number {
  setFlagsFromString('--expose_gc');
  const collect = runInNewContext('gc') as () => void;
  collect();
  return process.memoryUsage().heapUsed;
}

const routes = server.app.routes.map((route) => ({ name: `${route.method.toUpperCase()} ${route.path}`, route }));

describe('whatever is sent and by whom, the answer is one that the API describes and the fault is never the server’s', () => {
  let before = 0;
  let made = 0;
  it('has room to start from', async () => {
    for (const { route } of routes) await call(route, 'administrator', FILE, 'warm');
    before = liveBytes();
    expect(before).toBeGreaterThan(0);
  });

  it.each(routes)(
    '$name',
    async ({ route }) => {
      const odd = fc.string({ unit: 'grapheme', maxLength: 12 });
      await fc.assert(
        fc.asyncProperty(bodyFor(route), odd, everyone, async (sent, text, who) => {
          made += 1;
          const response = await call(route, who, sent, text);
          // Not ready is an answer: the description has it.
          if (route.path !== '/readyz') expect(response.status).toBeLessThan(500);
          expect(description.misfit(route, response), `${who}: ${String(response.status)}`).toBeUndefined();
        }),
        { numRuns: CALLS },
      );
    },
    120_000,
  );

  it('leaves no more in memory than caches hold', () => {
    expect(made).toBeGreaterThanOrEqual(CALLS * routes.length);
    const grown = liveBytes() - before;
    expect(grown, `${String(made)} calls left ${(grown / 2 ** 20).toFixed(1)} MB`).toBeLessThan(MOST_GROWTH_BYTES);
    // Faults alone would be in it.
    expect(server.log).toEqual([]);
  });

  it.each(['[', '{"a":', '{"ops":['])('a body nested a hundred thousand deep in %s', async (opening) => {
    const closing = opening.startsWith('{"ops"') ? ']}' : opening === '[' ? ']' : '}';
    const deep = `${opening.repeat(100_000)}1${closing.repeat(100_000)}`;
    const nested = `{"batchId":"${randomUUID()}","label":"deep","ops":[{"op":"set","in":"nodes","id":"T1","key":"note","to":${deep}}]}`;
    const file = `{"format":"riseback-network","version":1,"name":${deep}}`;
    for (const [path, text] of [
      ['/api/session', deep],
      ['/api/solve', deep],
      ['/api/solve', file],
      [`/api/networks/${networkIds[0] ?? ''}/edits`, nested],
    ] as const) {
      const response = await server
        .as('administrator')
        .send('post', path)
        .set('If-Match', '"1"')
        .set('Content-Type', 'application/json')
        .send(text);
      expect(response.status, path).toBeGreaterThanOrEqual(400);
      expect(response.status, path).toBeLessThan(500);
    }
  });
});

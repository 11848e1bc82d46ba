import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Route } from '../../server/src/platform/routes/route-table';
import { TestServer, type Client } from './test-server';

/** Calls a route; the long form asks for many more. */
const CALLS = process.env['RISEBACK_TEST_FULL'] === '1' ? 500 : 25;

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

const server = new TestServer({ config: { requestsPerMinute: 1e9 } });
let client: Client;
let networkId = '';
beforeAll(async () => {
  client = server.as('administrator');
  const made = await client.post(`/api/sites/${server.siteId}/networks`, FILE).expect(201);
  networkId = (made.body as { id: string }).id;
});
afterAll(() => {
  server.close();
});

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

const body = fc
  .tuple(fc.constantFrom(...NEARLY), fc.nat(), oddValue)
  .map(([make, seed, odd]) => (seed % 11 === 0 ? make() : spoil(make(), seed, odd)));

function pathOf(route: Route, odd: string): string {
  const path = route.path.replace(':siteId', server.siteId).replace(':networkId', networkId);
  return path.replaceAll(/:\w+/g, encodeURIComponent(odd));
}

async function statusOf(route: Route, sent: unknown, odd: string): Promise<number> {
  const query = `?version=${encodeURIComponent(odd)}&since=${encodeURIComponent(odd)}&case=${encodeURIComponent(odd)}`;
  const test = client.send(route.method, pathOf(route, odd) + (odd.length % 2 === 0 ? query : ''));
  void test.set('If-Match', odd.length % 3 === 0 ? '"1"' : `"${String(odd.length)}"`);
  const text = sent === undefined ? undefined : JSON.stringify(sent);
  if (route.body !== undefined) void test.set('Content-Type', 'application/json').send(text);
  return (await test).status;
}

const routes = server.app.routes
  // These would sign the fuzzing client out, or wait for its guesses.
  .filter(({ path, method }) => path !== '/api/session' || method === 'get')
  .map((route) => ({ name: `${route.method.toUpperCase()} ${route.path}`, route }));

describe('whatever is sent, the server answers and the fault is never its own', () => {
  it.each(routes)('$name', async ({ route }) => {
    const odd = fc.string({ unit: 'grapheme', maxLength: 12 });
    await fc.assert(
      fc.asyncProperty(body, odd, async (sent, text) => {
        expect(await statusOf(route, sent, text)).toBeLessThan(500);
      }),
      { numRuns: CALLS },
    );
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
      [`/api/networks/${networkId}/edits`, nested],
    ] as const) {
      const response = await client
        .send('post', path)
        .set('If-Match', '"1"')
        .set('Content-Type', 'application/json')
        .send(text);
      expect(response.status, path).toBeGreaterThanOrEqual(400);
      expect(response.status, path).toBeLessThan(500);
    }
  });
});

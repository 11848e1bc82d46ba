import type { Problem } from '@riseback/contracts';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Route } from '../../server/src/platform/routes/route-table';
import { ApiDescription, type JsonSchema } from './api-description';
import { rightfulOf } from './rightful-role';
import { valueOf } from './schema-arbitrary';
import { TestServer } from './test-server';

const FILE = {
  format: 'riseback-network',
  version: 1,
  name: 'Assigned',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
    { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 101_325 },
  ],
  pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 6, insideDiameterM: 0.025 }],
};

const server = new TestServer();
let description: ApiDescription;
let networkId = '';
let elsewhere = '';
beforeAll(async () => {
  description = await ApiDescription.of(server);
  const make = async (who: 'designer' | 'outsider', siteId: string) => {
    const made = await server.as(who).post(`/api/sites/${siteId}/networks`, FILE).expect(201);
    return (made.body as { id: string }).id;
  };
  networkId = await make('designer', server.siteId);
  elsewhere = await make('outsider', server.otherSiteId);
});
afterAll(() => {
  server.close();
});

const withBody = server.app.routes
  .filter(({ body }) => body !== undefined)
  .map((route) => ({ name: `${route.method.toUpperCase()} ${route.path}`, route }));

/**
 * Where a body may hold what its schema does not name. A network file is read, key by key, by libs/network; of an edit the
 * element and the values, which the reducer judges. Both are held below.
 */
const OPEN: Readonly<Record<string, readonly string[]>> = {
  'POST /api/sites/:siteId/networks': [''],
  'POST /api/solve': [''],
  'POST /api/networks/:networkId/edits': ['/ops/value', '/ops/value/*', '/ops/from', '/ops/to'],
};

interface Schema {
  readonly type?: string;
  readonly properties?: Readonly<Record<string, Schema>>;
  readonly additionalProperties?: boolean | Schema;
  readonly items?: Schema;
  readonly oneOf?: readonly Schema[];
  readonly anyOf?: readonly Schema[];
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
}

/** The places, without the indexes of lists, where anything at all would be taken. */
function openPlaces(schema: Schema, place = ''): string[] {
  const branches = [...(schema.oneOf ?? []), ...(schema.anyOf ?? [])];
  if (branches.length > 0) return branches.flatMap((branch) => openPlaces(branch, place));
  if (schema.type === 'array') return openPlaces(schema.items ?? {}, place);
  if (schema.type === 'object') {
    const { properties = {}, additionalProperties = {} } = schema;
    const inside = Object.entries(properties).flatMap(([key, value]) => openPlaces(value, `${place}/${key}`));
    if (additionalProperties === false) return inside;
    const values = additionalProperties === true ? {} : additionalProperties;
    return [...inside, place, ...openPlaces(values, `${place}/*`)];
  }
  return schema.type === undefined && schema.const === undefined && schema.enum === undefined ? [place] : [];
}

/** Keys at the top of a body that its route knows. */
function keysOf(schema: Schema): string[] {
  const branches = [...(schema.oneOf ?? []), ...(schema.anyOf ?? [])];
  return [...Object.keys(schema.properties ?? {}), ...branches.flatMap(keysOf)];
}

/** What someone would slip in to become more than they are, or to reach what is not theirs. */
function slippedIn(): Readonly<Record<string, unknown>> {
  return {
    id: elsewhere,
    siteId: server.otherSiteId,
    networkId: elsewhere,
    personId: 'administrator',
    sessionId: 'another',
    role: 'administrator',
    permissions: ['view', 'draw', 'people'],
    administersInstallation: true,
    passwordHash: '$2b$12$x',
    version: 99,
    createdBy: 'outsider',
    createdAt: '2020-01-01T00:00:00.000Z',
    solverHash: '0',
  };
}

function pathOf(route: Route): string {
  const path = route.path.replace(':siteId', server.siteId).replace(':networkId', networkId);
  return path.replaceAll(/:\w+/g, 'some-id');
}

const send = (route: Route, body: unknown) =>
  server
    .as(rightfulOf(route))
    .send(route.method, pathOf(route))
    .set('If-Match', '"1"')
    .set('Content-Type', 'application/json')
    .send(JSON.stringify(body));

/** All that is stored but sessions and the log, which every request adds to, and solves, which end when they end. */
function stored(): string {
  const named = server.db.$client.prepare(`select name from sqlite_schema where type = 'table'`).all();
  const tables = (named as { name: string }[]).filter(({ name }) => !/^(sqlite|__|sessions$|audit|solve)/.test(name));
  return JSON.stringify(tables.map(({ name }) => server.db.$client.prepare(`select * from "${name}"`).all()));
}

const pointersOf = (problem: unknown) => ((problem as Problem).errors ?? []).map(({ pointer }) => pointer);

describe('a body', () => {
  it.each(withBody)('of $name takes only the keys that its contract names', ({ name, route }) => {
    const places = [...new Set(openPlaces(description.bodyOf(route) as Schema))];
    expect(places.sort()).toEqual([...(OPEN[name] ?? [])].sort());
  });

  it.each(withBody.filter(({ name }) => !(OPEN[name] ?? []).includes('')))(
    'of $name is refused with ids, roles or versions slipped in, and nothing is stored',
    async ({ route }) => {
      const schema = description.bodyOf(route) as JsonSchema;
      const known = keysOf(schema as Schema);
      const slipped = Object.fromEntries(Object.entries(slippedIn()).filter(([key]) => !known.includes(key)));
      expect(Object.keys(slipped).length).toBeGreaterThan(9);
      const before = stored();
      for (const right of fc.sample(valueOf(schema), { numRuns: 3, seed: 1 })) {
        const response = await send(route, { ...(right as object), ...slipped });
        expect(response.status).toBe(400);
        const pointers = pointersOf(response.body);
        for (const key of Object.keys(slipped)) expect(pointers).toContain(`/${key}`);
      }
      expect(stored()).toBe(before);
    },
  );
});

describe('a network file', () => {
  const files = withBody.filter(({ name }) => (OPEN[name] ?? []).includes(''));
  const [trap, receiver] = FILE.nodes;

  it.each(files)(
    'to $name with unknown keys is refused with a pointer to each, and nothing is stored',
    async ({ route }) => {
      const before = stored();
      const { id: _id, version: _version, ...slipped } = slippedIn();
      const file = {
        ...FILE,
        ...slipped,
        site: { ...FILE.site, siteId: server.otherSiteId },
        nodes: [{ ...trap, networkId: elsewhere, ordinal: 4, changedIn: 9 }, receiver],
        pipes: [{ ...FILE.pipes[0], networkId: elsewhere }],
      };
      const response = await send(route, file);
      expect(response.status).toBe(400);
      const expected = [
        ...Object.keys(slipped).map((key) => `/${key}`),
        '/site/siteId',
        '/nodes/0/networkId',
        '/nodes/0/ordinal',
        '/nodes/0/changedIn',
        '/pipes/0/networkId',
      ];
      expect(pointersOf(response.body)).toEqual(expect.arrayContaining(expected));
      expect(stored()).toBe(before);
    },
  );
});

describe('an edit', () => {
  const edit = (...ops: object[]) => ({ batchId: crypto.randomUUID(), label: 'slip in', ops });
  const junction = { id: 'J9', kind: 'junction', elevationM: 0 };
  const bad = () => [
    edit({ op: 'add', in: 'nodes', ordinal: 9, value: { ...junction, networkId: elsewhere } }),
    edit({ op: 'add', in: 'nodes', ordinal: 9, value: { ...junction, changedIn: 7 } }),
    edit({ op: 'set', in: 'nodes', id: 'T1', key: 'networkId', to: elsewhere }),
    edit({ op: 'set', in: 'nodes', id: 'T1', key: 'id', from: 'T1', to: 'T2' }),
    edit({ op: 'set', in: 'nodes', id: 'T1', key: 'ordinal', from: 0, to: 5 }),
    edit({ op: 'set', in: 'network', key: 'version', from: 1, to: 99 }),
    edit({ op: 'set', in: 'network', key: 'site', from: FILE.site, to: { ...FILE.site, siteId: server.otherSiteId } }),
    edit({ op: 'set', in: 'people', id: 'viewer', key: 'role', to: 'administrator' }),
    edit({ op: 'remove', in: 'nodes', id: `${elsewhere}/T1` }),
  ];

  it('can put nothing where an element has no such key, nor reach beyond its network', async () => {
    const route = server.app.routes.find(({ method, path }) => method === 'post' && path.endsWith('/edits'));
    if (route === undefined) throw new Error('There is no route for edits');
    const before = stored();
    for (const batch of bad()) {
      const response = await send(route, batch);
      expect([400, 422], JSON.stringify(batch.ops)).toContain(response.status);
      expect(pointersOf(response.body).length).toBeGreaterThan(0);
    }
    expect(stored()).toBe(before);
  });
});

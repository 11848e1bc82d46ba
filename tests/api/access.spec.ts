import { permissionsOf, PERMISSIONS, ROLES, type Role } from '@riseback/contracts';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { memberships } from '../../server/src/platform/db/schema';
import type { Route } from '../../server/src/platform/routes/route-table';
import { TestServer, type Who } from './test-server';

const NETWORK_FILE = {
  format: 'riseback-network',
  version: 1,
  name: 'Matrix',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [
    { id: 'T1', kind: 'trap', elevationM: 0, inletPressurePa: 618_000, loadKgS: 0.05 },
    { id: 'R1', kind: 'receiver', elevationM: 0, pressurePa: 101_325 },
  ],
  pipes: [{ id: 'L1', from: 'T1', to: 'R1', lengthM: 6, insideDiameterM: 0.025 }],
};
const EVERYONE: readonly (Who | 'anonymous')[] = ['anonymous', 'stranger', 'outsider', ...ROLES];

const server = new TestServer();
let networkId = '';
let otherNetworkId = '';
beforeAll(async () => {
  const make = async (who: Who, siteId: string) => {
    const made = await server.as(who).post(`/api/sites/${siteId}/networks`, NETWORK_FILE).expect(201);
    return (made.body as { id: string }).id;
  };
  networkId = await make('designer', server.siteId);
  otherNetworkId = await make('outsider', server.otherSiteId);
});
afterAll(() => {
  server.close();
});

function pathOf(route: Route, ids: { siteId: string; networkId: string }): string {
  return route.path.replace(':siteId', ids.siteId).replace(':networkId', ids.networkId).replaceAll(/:\w+/g, 'some-id');
}

/** All that the other site holds. */
function rowsElsewhere(): string {
  const ofNetwork = ['nodes', 'pipes', 'trap_models', 'cases', 'case_overrides', 'gauges', 'edits', 'solves'];
  const all = (sql: string, id: string) => server.db.$client.prepare(sql).all(id);
  return JSON.stringify([
    ...ofNetwork.map((table) => all(`select * from ${table} where network_id = ?`, otherNetworkId)),
    ...['networks', 'memberships', 'audit'].map((table) =>
      all(`select * from ${table} where site_id = ?`, server.otherSiteId),
    ),
  ]);
}

/** What the rule of the route alone makes of this person; undefined = let through. */
function refusalOf(route: Route, who: Who | 'anonymous'): 401 | 403 | 404 | undefined {
  const { rule } = route;
  if (rule.kind === 'public') return undefined;
  if (who === 'anonymous') return 401;
  if (rule.kind === 'signedIn') return undefined;
  if (who === 'stranger' || who === 'outsider') return 404;
  return rule.anyOf.some((permission) => permissionsOf(who).includes(permission)) ? undefined : 403;
}

const rows = server.app.routes.flatMap((route) =>
  EVERYONE.map((who) => ({
    name: `${route.method.toUpperCase()} ${route.path}`,
    route,
    who,
    refusal: refusalOf(route, who),
  })),
);

describe('the access matrix, made of the route table', () => {
  it.each(rows)('$name, $who: $refusal', async ({ route, who, refusal }) => {
    const path = pathOf(route, { siteId: server.siteId, networkId });
    const response = await server.as(who).send(route.method, path);
    if (refusal !== undefined) {
      expect(response.status).toBe(refusal);
      expect(response.headers['content-type']).toContain('application/problem+json');
      return;
    }
    // Let through: what comes is the handler's or the schema's answer, never the rule's. A public sign-in without a
    // body is a mistake of form, and a session that is not one's own is not found.
    expect([200, 202, 204, 400, 404, 428]).toContain(response.status);
    expect(response.body).not.toMatchObject({ type: '/problems/forbidden' });
  });

  it('covers the routes that the application has', () => {
    const kinds = new Set(server.app.routes.map(({ rule }) => rule.kind));
    expect([...kinds].sort()).toEqual(['network', 'public', 'signedIn', 'site']);
    expect(
      server.app.routes.filter(({ rule, mutates }) => rule.kind === 'public' && mutates).map(({ path }) => path),
    ).toEqual([
      '/api/session',
      '/api/links',
      '/api/links/acceptance',
      '/api/password-resets',
      '/api/password-resets/completion',
    ]);
  });
});

describe('a role at one site', () => {
  const scoped = rows.filter(({ route, who }) => 'anyOf' in route.rule && (ROLES as readonly string[]).includes(who));

  it.each(scoped)('opens nothing at another, by the path: $name, $who', async ({ route, who }) => {
    const path = pathOf(route, { siteId: server.otherSiteId, networkId: otherNetworkId });
    const response = await server.as(who).send(route.method, path);
    expect(response.status).toBe(404);
    expect(response.headers['content-type']).toContain('application/problem+json');
  });

  const changes = scoped.filter(({ route, refusal }) => route.body !== undefined && refusal === undefined);

  it.each(changes)('changes nothing at another, by the body: $name, $who', async ({ route, who }) => {
    const before = rowsElsewhere();
    const theirs = { siteId: server.otherSiteId, networkId: otherNetworkId };
    for (const body of [
      { ...NETWORK_FILE, ...theirs, id: otherNetworkId },
      { batchId: crypto.randomUUID(), label: 'reach', ...theirs, ops: [{ op: 'remove', in: 'nodes', id: 'T1' }] },
      { ...theirs, selected: ['T1'] },
      theirs,
    ]) {
      const response = await server
        .as(who)
        .send(route.method, pathOf(route, { siteId: server.siteId, networkId }))
        .set('If-Match', '"1"')
        .send(body);
      expect(response.status).toBe(400);
    }
    expect(rowsElsewhere()).toBe(before);
  });
});

describe('someone without a role', () => {
  it('gets for a site or network that exists word for word what one that does not exist gets', async () => {
    const scoped = server.app.routes.filter(({ rule }) => rule.kind === 'site' || rule.kind === 'network');
    expect(scoped.length).toBeGreaterThan(5);
    for (const route of scoped) {
      const stranger = server.as('stranger');
      const present = await stranger.send(route.method, pathOf(route, { siteId: server.siteId, networkId }));
      const absent = await stranger.send(route.method, pathOf(route, { siteId: 'no-such', networkId: 'no-such' }));
      expect(present.status).toBe(404);
      expect({ ...(present.body as object), instance: '' }).toEqual({ ...(absent.body as object), instance: '' });
    }
  });

  it('sees no site in the list', async () => {
    expect((await server.as('stranger').get('/api/sites').expect(200)).body).toEqual([]);
  });
});

describe('a role that is too small', () => {
  it('is told which one is needed', async () => {
    const response = await server.as('viewer').post(`/api/sites/${server.siteId}/networks`, NETWORK_FILE).expect(403);
    expect(response.body).toMatchObject({
      type: '/problems/forbidden',
      detail: expect.stringContaining('needs the role designer or administrator') as string,
    });
  });

  it('is refused before the body is even read', async () => {
    const body = Buffer.alloc(40 * 1024 * 1024, ' ');
    const request = server.as('viewer').send('post', `/api/sites/${server.siteId}/networks`);
    await request.set('Content-Type', 'application/json').send(body.toString()).expect(403);
  });
});

describe('a viewer', () => {
  const edit = (ops: readonly object[]) => ({ batchId: crypto.randomUUID(), label: 'raise', ops });
  const raise = edit([{ op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from: 0, to: 1 }]);
  const addGauge = edit([{ op: 'add', in: 'gauges', ordinal: 0, value: { id: 'G1', node: 'R1', elevationM: 0 } }]);
  const send = (who: Role, batch: object) =>
    server.as(who).post(`/api/networks/${networkId}/edits`, batch).set('If-Match', '"1"');

  it('cannot edit, and a commissioning engineer cannot move a trap', async () => {
    await send('viewer', raise).expect(403);
    await send('reviewer', raise).expect(403);
    await send('commissioning', raise).expect(403);
    await send('viewer', addGauge).expect(403);
    const after = await server.as('viewer').get(`/api/networks/${networkId}`).expect(200);
    expect((after.body as { version: number }).version).toBe(1);
  });

  it('may do so from the moment the role changes, and no longer once it is taken', async () => {
    const setRole = (role: Role) =>
      server.db.update(memberships).set({ role }).where(eq(memberships.personId, 'viewer')).run();
    const client = server.as('viewer');
    await client.get(`/api/networks/${networkId}`).expect(200);
    setRole('designer');
    const path = `/api/networks/${networkId}/edits`;
    await client.post(path, raise).set('If-Match', '"1"').expect(200);
    setRole('viewer');
    await client
      .post(path, edit([{ op: 'set', in: 'nodes', id: 'T1', key: 'elevationM', from: 1, to: 2 }]))
      .set('If-Match', '"2"')
      .expect(403);
  });
});

it('knows no permission that no role has', () => {
  for (const permission of PERMISSIONS)
    expect(ROLES.some((role) => permissionsOf(role).includes(permission))).toBe(true);
});

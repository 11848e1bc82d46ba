import { permissionsOf, type Role, type Site } from '@riseback/contracts';
import { afterAll, describe, expect, it } from 'vitest';
import { makeNetwork } from './network-samples';
import { TestServer } from './test-server';

const server = new TestServer();
afterAll(() => {
  server.close();
});

describe('the sites of a person', () => {
  it.each<{ who: Role }>([{ who: 'viewer' }, { who: 'designer' }, { who: 'administrator' }])(
    'are those where they have a role: $who',
    async ({ who }) => {
      const list = (await server.as(who).get('/api/sites').expect(200)).body as Site[];
      expect(list.map(({ id }) => id)).toEqual([server.siteId]);
      expect(list[0]).toMatchObject({ role: who, permissions: permissionsOf(who), atmosphericPressurePa: 101_325 });
    },
  );

  it('count the networks of each', async () => {
    const before = (await server.as('viewer').get(`/api/sites/${server.siteId}`).expect(200)).body as Site;
    expect(before.networkCount).toBe(0);
    await makeNetwork(server.as('designer'), server.siteId);
    await makeNetwork(server.as('designer'), server.siteId);
    const after = (await server.as('viewer').get(`/api/sites/${server.siteId}`).expect(200)).body as Site;
    expect(after).toEqual({ ...before, networkCount: 2 });
    const [other] = (await server.as('outsider').get('/api/sites').expect(200)).body as Site[];
    expect(other).toMatchObject({ id: server.otherSiteId, networkCount: 0 });
  });

  it('do not lend their role to another site', async () => {
    const id = await makeNetwork(server.as('designer'), server.siteId);
    await server.as('outsider').get(`/api/sites/${server.siteId}`).expect(404);
    await server.as('outsider').get(`/api/networks/${id}`).expect(404);
    await server.as('outsider').get(`/api/networks/${id}/results`).expect(404);
    await server.as('designer').get(`/api/sites/${server.otherSiteId}/networks`).expect(404);
  });
});

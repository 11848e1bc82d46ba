import type { Revision, RevisionSummary } from '@riseback/contracts';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { batchOf, makeNetwork, raise, sendBatch } from './network-samples';
import { TestServer, type Client } from './test-server';

const server = new TestServer();
let designer: Client;
let networkId = '';
beforeAll(async () => {
  designer = server.as('designer');
  networkId = await makeNetwork(designer, server.siteId);
});
afterAll(() => {
  server.close();
});

const path = (rest = '') => `/api/networks/${networkId}/revisions${rest}`;
const body = { title: 'First issue', reason: 'For review', networkVersion: 1 };

describe('freezing', () => {
  it('keeps the network and its results under a letter', async () => {
    const made = await designer.post(path(), body).expect(201);
    const revision = made.body as Revision;
    expect(revision).toMatchObject({ letter: 'A', state: 'draft', title: 'First issue', networkVersion: 1 });
    expect(made.headers['location']).toBe(path(`/${revision.id}`));
    await sendBatch(designer, networkId, 1, batchOf([raise(1)])).expect(200);
    const later = (await designer.get(path(`/${revision.id}`)).expect(200)).body as Revision;
    expect(later.file).toEqual(revision.file);
    const list = (await server.as('viewer').get(path()).expect(200)).body as RevisionSummary[];
    expect(list.map(({ letter }) => letter)).toEqual(['A']);
  });
});

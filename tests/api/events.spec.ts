import type { Server } from 'node:http';
import type { PeopleEvent, SavedBatch, SolveEvent } from '@riseback/contracts';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { memberships, networks } from '../../server/src/platform/db/schema';
import { MOST_BEHIND } from '../../server/src/events/event-service';
import { STREAMS_PER_SESSION } from '../../server/src/events/network-streams';
import { EventReader, listening } from './event-reader';
import { batchOf, makeNetwork, raise, sendBatch } from './network-samples';
import { TestServer, type Client, type Who } from './test-server';

const HEARTBEAT_MS = 80;

let server: TestServer;
let http: Server;
let origin = '';
let designer: Client;
let id = '';
const readers: EventReader[] = [];

beforeEach(async () => {
  server = new TestServer({ heartbeatMs: HEARTBEAT_MS });
  ({ http, origin } = await listening(server));
  designer = server.as('designer');
  id = await makeNetwork(designer, server.siteId);
});
afterEach(async () => {
  for (const reader of readers.splice(0)) reader.close();
  server.app.endStreams();
  await new Promise((resolve) => http.close(resolve));
  server.close();
});

async function open(client: Client, from: { since?: number; lastEventId?: number } = {}): Promise<EventReader> {
  const reader = await EventReader.open(origin, client, id, from);
  readers.push(reader);
  return reader;
}
const versionsOf = (reader: EventReader) => reader.of('edit').map(({ data }) => (data as SavedBatch).version);
const peopleOf = (reader: EventReader) => (reader.of('people').at(-1)?.data as PeopleEvent | undefined)?.people ?? [];
const save = (version: number, elevationM: number, from: number) =>
  sendBatch(designer, id, version, batchOf([raise(elevationM, from)], 'raise')).expect(200);

const isSolved = (data: unknown, version: number) => {
  const solve = data as SolveEvent;
  return solve.version === version && solve.state === 'finished';
};

describe('edits', () => {
  it('reach everyone who has the network open, with batch, author and id, and after them their solve', async () => {
    const viewer = await open(server.as('viewer'), { since: 1 });
    await save(1, 3, 0);
    const ended = () => viewer.of('solve').some(({ data }) => isSolved(data, 2));
    await viewer.until(ended, 'the edit and its solve');
    expect(viewer.of('edit')).toMatchObject([
      {
        id: '2',
        data: { version: 2, personId: 'designer', personName: 'designer', label: 'raise', ops: [raise(3, 0)] },
      },
    ]);
    const { solverHash } = viewer.of('edit')[0]?.data as SavedBatch;
    expect(viewer.of('solve').at(-1)?.data).toEqual({ version: 2, solverHash, state: 'finished' });
    expect(viewer.of('solve').every((event) => event.id === undefined)).toBe(true);
  });

  it('come after the state of the solve, which says no more than that', async () => {
    await designer.get(`/api/networks/${id}/results`).expect(200);
    const viewer = await open(server.as('viewer'));
    await viewer.until(() => viewer.of('solve').length > 0, 'the state of the solve');
    expect(viewer.of('solve')[0]?.data).toEqual({
      version: 1,
      solverHash: expect.any(String) as string,
      state: 'finished',
    });
  });

  it('of another network are not heard, nor one that was refused', async () => {
    const viewer = await open(server.as('viewer'), { since: 1 });
    const other = await makeNetwork(designer, server.siteId);
    await sendBatch(designer, other, 1, batchOf([raise(1)])).expect(200);
    await sendBatch(designer, id, 7, batchOf([raise(1)])).expect(412);
    await save(1, 3, 0);
    await viewer.until(() => viewer.of('edit').length > 0, 'the edit');
    expect(versionsOf(viewer)).toEqual([2]);
  });

  it('a batch that is sent twice is told once', async () => {
    const viewer = await open(server.as('viewer'), { since: 1 });
    const batch = batchOf([raise(3)]);
    await sendBatch(designer, id, 1, batch).expect(200);
    await sendBatch(designer, id, 1, batch).expect(200);
    await sendBatch(designer, id, 2, batchOf([raise(4, 3)])).expect(200);
    await viewer.until(() => viewer.of('edit').length >= 2, 'both edits');
    expect(versionsOf(viewer)).toEqual([2, 3]);
  });
});

describe('a stream that was lost', () => {
  it('resumes behind the last event that its reader has, whatever version the address names', async () => {
    for (let version = 1; version <= 5; version += 1) await save(version, version, version - 1);
    const viewer = await open(server.as('viewer'), { since: 1, lastEventId: 4 });
    await save(6, 6, 5);
    await viewer.until(() => versionsOf(viewer).length >= 3, 'what was missed and what is new');
    expect(versionsOf(viewer)).toEqual([5, 6, 7]);
  });

  it('is told to read the network again when it is over five hundred edits behind', async () => {
    server.db
      .update(networks)
      .set({ version: MOST_BEHIND + 2 })
      .where(eq(networks.id, id))
      .run();
    const near = await open(server.as('viewer'), { since: 2 });
    await near.until(() => near.of('solve').length > 0, 'the state of the solve');
    expect(near.of('reload')).toEqual([]);
    const far = await open(server.as('viewer'), { since: 1 });
    await far.until(() => far.of('solve').length > 0, 'the state of the solve');
    expect(far.of('reload').map(({ data }) => data)).toEqual([{ currentVersion: MOST_BEHIND + 2 }]);
    expect(versionsOf(far)).toEqual([]);
  });

  it('is told so too when the database was put back to an earlier state', async () => {
    const viewer = await open(server.as('viewer'), { since: 9 });
    await viewer.until(() => viewer.of('reload').length > 0, 'reload');
  });
});

describe('people', () => {
  it('see who is there and what they have selected, and that they have left', async () => {
    const viewer = await open(server.as('viewer'));
    const other = await open(designer);
    await viewer.until(() => peopleOf(viewer).length === 2, 'both people');
    await designer.post(`/api/networks/${id}/presence`, { selected: ['T1'] }).expect(204);
    await viewer.until(() => peopleOf(viewer).some(({ selected }) => selected.length > 0), 'the selection');
    expect(peopleOf(viewer).find(({ personId }) => personId === 'designer')).toEqual({
      personId: 'designer',
      name: 'designer',
      selected: ['T1'],
    });
    other.close();
    await other.until(() => other.ended, 'closed');
    await viewer.until(() => {
      server.pass(1_000);
      return peopleOf(viewer).length === 1;
    }, 'only the viewer is left');
  });

  it('with two windows are listed once', async () => {
    const first = await open(designer);
    await open(designer);
    await save(1, 3, 0);
    await first.until(() => first.of('edit').length > 0, 'the edit');
    expect(peopleOf(first).map(({ personId }) => personId)).toEqual(['designer']);
  });
});

describe('a stream', () => {
  it('shows signs of life', async () => {
    const viewer = await open(server.as('viewer'));
    await viewer.until(() => viewer.comments >= 2, 'two comments');
  });

  it('ends within a heartbeat once its session has ended', async () => {
    const client = server.as('viewer');
    const viewer = await open(client);
    await client.send('delete', '/api/session').expect(204);
    await viewer.until(() => viewer.ended, 'the end');
  });

  it('ends once the role is taken, before it is told of another edit', async () => {
    const viewer = await open(server.as('viewer'), { since: 1 });
    server.db.delete(memberships).where(eq(memberships.personId, 'viewer')).run();
    await save(1, 3, 0);
    await viewer.until(() => viewer.ended, 'the end');
    expect(viewer.of('edit')).toEqual([]);
  });

  it.each<{ who: Who | 'anonymous'; status: number }>([
    { who: 'anonymous', status: 401 },
    { who: 'stranger', status: 404 },
    { who: 'outsider', status: 404 },
  ])('is not opened for $who', async ({ who, status }) => {
    expect((await open(server.as(who))).status).toBe(status);
  });

  it('is one of a few for a session', async () => {
    for (let count = 0; count < STREAMS_PER_SESSION; count += 1) expect((await open(designer)).status).toBe(200);
    expect((await open(designer)).status).toBe(429);
    expect((await open(server.as('designer'))).status).toBe(200);
  });

  it('is refused to whoever would wait for its end', async () => {
    await designer.get(`/api/networks/${id}/events`).expect(400);
  });

  it('ends when the server stops, and none is opened then', async () => {
    const viewer = await open(server.as('viewer'));
    server.app.endStreams();
    await viewer.until(() => viewer.ended, 'the end');
    expect((await open(server.as('viewer'))).status).toBe(503);
  });
});

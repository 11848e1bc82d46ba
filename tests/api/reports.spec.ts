import { createHash } from 'node:crypto';
import { REPORT_FORMATS, type ReportJob, type Revision, ROLES } from '@riseback/contracts';
import { eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { audit, jobs, memberships } from '../../server/src/platform/db/schema';
import { makeReport, type ReportMaterial, type ReportOrder } from '../../server/src/reports/report-material';
import { ReportRepository } from '../../server/src/reports/report-repository';
import { ReportRunner } from '../../server/src/reports/report-runner';
import { MOST_OF_A_PERSON } from '../../server/src/reports/report-service';
import type { ReportPort } from '../../server/src/reports/report-threads';
import { listening } from './event-reader';
import { batchOf, makeNetwork, raise, sendBatch } from './network-samples';
import { HOST, TestServer, type Client } from './test-server';

type Make = ReportPort['make'];

/** A maker that the test leads by the hand. */
class LedPort implements ReportPort {
  readonly orders: ReportOrder[] = [];
  readonly signals: AbortSignal[] = [];

  constructor(private readonly answer: (attempt: number) => ReturnType<Make>) {}

  make: Make = (order, progress, signal) => {
    this.orders.push(order);
    this.signals.push(signal);
    progress(0.5, 'Half-way');
    return this.answer(this.orders.length);
  };
}

const FILE = Buffer.from('a file');
const never = () => new Promise<Uint8Array>(() => undefined);
const crash = () => Promise.reject(new Error('the thread died'));

let server: TestServer;
let viewer: Client;
let networkId = '';
let path = '';

async function begin(port: ReportPort): Promise<void> {
  server = new TestServer({ reportPort: port });
  viewer = server.as('viewer');
  networkId = await makeNetwork(server.as('designer'), server.siteId);
  path = `/api/networks/${networkId}/reports`;
}

beforeEach(() => begin(new LedPort(() => Promise.resolve(FILE))));
afterEach(() => server.close());

async function order(client: Client, request: object = { format: 'pdf' }): Promise<ReportJob> {
  return (await client.post(path, request).expect(202)).body as ReportJob;
}

async function state(client: Client, { id }: ReportJob): Promise<ReportJob> {
  return (await client.get(`${path}/${id}`).expect(200)).body as ReportJob;
}

async function until(client: Client, job: ReportJob, done: (job: ReportJob) => boolean): Promise<ReportJob> {
  for (;;) {
    const present = await state(client, job);
    if (done(present)) return present;
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
}
const ended = (client: Client, job: ReportJob) =>
  until(client, job, (present) => !['waiting', 'running'].includes(present.state));
const running = (client: Client, job: ReportJob) => until(client, job, ({ progress }) => progress > 0);

describe('a report', () => {
  it.each(ROLES)('is ordered and fetched by the role %s', async (role) => {
    const client = server.as(role);
    const job = await ended(client, await order(client));
    expect(job).toMatchObject({ state: 'finished', progress: 1, name: 'Small-working.pdf', sizeBytes: FILE.length });
    const response = await client.get(`${path}/${job.id}/content`).expect(200);
    expect(response.body).toEqual(FILE);
    expect(response.headers).toMatchObject({
      'content-type': 'application/pdf',
      'content-disposition': 'attachment; filename=Small-working.pdf',
      'cache-control': 'no-store',
    });
    expect(job.sha256).toBe(createHash('sha256').update(FILE).digest('hex'));
  });

  it('is its owner’s alone: a colleague is told that there is none, and sees it in no list', async () => {
    const job = await ended(viewer, await order(viewer));
    const colleague = server.as('designer');
    for (const rest of ['', '/content', '/events']) {
      const asked = colleague.get(`${path}/${job.id}${rest}`).set('Accept', 'text/event-stream, application/json');
      expect((await asked).status).toBe(404);
    }
    expect((await colleague.send('delete', `${path}/${job.id}`)).status).toBe(404);
    expect((await colleague.get(path).expect(200)).body).toEqual([]);
    expect((await viewer.get(path).expect(200)).body).toMatchObject([{ id: job.id, name: 'Small-working.pdf' }]);
  });

  it('leaves a line in the log that tells which bytes were made', async () => {
    const job = await ended(viewer, await order(viewer));
    const row = server.db.select().from(audit).where(eq(audit.action, 'report.make')).get();
    expect(row).toMatchObject({ personId: 'viewer', subject: networkId, siteId: server.siteId });
    expect(row?.details).toMatchObject({ jobId: job.id, format: 'pdf', sha256: job.sha256 });
  });

  it('is of the network with the results of exactly these inputs, whatever was asked for first', async () => {
    const port = new LedPort(() => Promise.resolve(FILE));
    server.close();
    await begin(port);
    await sendBatch(server.as('designer'), networkId, 1, batchOf([raise(3)])).expect(200);
    await ended(viewer, await order(viewer));
    const material = port.orders[0]?.material;
    expect(material?.state).toMatchObject({ kind: 'working', version: 2, changedByName: 'designer' });
    const file = JSON.parse(material?.fileText ?? '') as { nodes: { id: string; elevationM: number }[] };
    expect(file.nodes.find(({ id }) => id === 'T1')?.elevationM).toBe(3);
    const outcomes = JSON.parse(material?.outcomesText ?? '') as { status: string }[];
    expect(outcomes).toMatchObject([{ status: 'solved' }]);
  });

  it('of a revision holds what was frozen, whatever the network is by now, beside the revision before', async () => {
    const port = new LedPort(() => Promise.resolve(FILE));
    server.close();
    await begin(port);
    const designer = server.as('designer');
    const freeze = async (networkVersion: number) => {
      await designer.get(`/api/networks/${networkId}/results`).expect(200);
      const wanted = { title: 'As drawn', reason: 'To be read', networkVersion };
      return (await designer.post(`/api/networks/${networkId}/revisions`, wanted).expect(201)).body as Revision;
    };
    await freeze(1);
    await sendBatch(designer, networkId, 1, batchOf([raise(3)])).expect(200);
    const second = await freeze(2);
    await sendBatch(designer, networkId, 2, batchOf([raise(4, 3)])).expect(200);

    const job = await ended(viewer, await order(viewer, { format: 'json', revisionId: second.id }));
    expect(job).toMatchObject({ state: 'finished', name: 'Small-revision-B.json', revisionId: second.id });
    const material = port.orders[0]?.material;
    expect(material?.state).toMatchObject({ kind: 'revision', letter: 'B', state: 'draft', version: 2, editsSince: 1 });
    expect(material).toMatchObject({ fileHash: second.fileHash, previous: { letter: 'A', title: 'As drawn' } });
    const elevationOf = (text: string | undefined) =>
      (JSON.parse(text ?? '') as { nodes: { id: string; elevationM: number }[] }).nodes.find(({ id }) => id === 'T1')
        ?.elevationM;
    expect([elevationOf(material?.previous?.fileText), elevationOf(material?.fileText)]).toEqual([0, 3]);
    expect(JSON.parse(material?.outcomesText ?? '')).toMatchObject([{ caseId: '', status: 'solved' }]);
  });

  it('is made in each format by the makers themselves', async () => {
    server.close();
    await begin({ make: makeReport });
    for (const format of REPORT_FORMATS) {
      const job = await ended(viewer, await order(viewer, { format }));
      expect(job, format).toMatchObject({ state: 'finished' });
      expect(job.sizeBytes, format).toBeGreaterThan(500);
    }
  });

  it('names revisions that are not there, and another network’s, as such', async () => {
    const response = await viewer.post(path, { format: 'pdf', revisionId: 'none' });
    expect(response.status).toBe(404);
  });

  it('fails in words where the person’s role was taken while it waited', async () => {
    server.close();
    const opened: (() => void)[] = [];
    await begin({
      make: () => new Promise((resolve) => opened.push(() => resolve(FILE))),
    });
    // two are being made, the third waits
    const [first, second, third] = [await order(viewer), await order(viewer), await order(viewer)];
    server.db.delete(memberships).where(eq(memberships.personId, 'viewer')).run();
    while (opened.length < 2) await new Promise((resolve) => setTimeout(resolve, 5));
    for (const open of opened) open();
    const stateOf = ({ id }: ReportJob) => server.db.select().from(jobs).where(eq(jobs.id, id)).get();
    while (stateOf(third)?.state !== 'failed') await new Promise((resolve) => setTimeout(resolve, 5));
    expect(stateOf(third)?.problem).toMatchObject({ status: 403 });
    expect([stateOf(first)?.state, stateOf(second)?.state]).toEqual(['finished', 'finished']);
  });
});

describe('an order', () => {
  it('is called off at once, and its maker with it', async () => {
    server.close();
    const port = new LedPort(never);
    await begin(port);
    const job = await order(viewer);
    await running(viewer, job);
    const start = performance.now();
    const response = await viewer.send('delete', `${path}/${job.id}`).expect(200);
    expect(performance.now() - start).toBeLessThan(1_000);
    expect(response.body).toMatchObject({ state: 'cancelled', doing: 'Called off' });
    expect(port.signals[0]?.aborted).toBe(true);
    expect((await viewer.get(`${path}/${job.id}/content`)).status).toBe(409);
  });

  it('that has ended stays as it is', async () => {
    const job = await ended(viewer, await order(viewer));
    const response = await viewer.send('delete', `${path}/${job.id}`).expect(200);
    expect(response.body).toMatchObject({ state: 'finished' });
  });

  it('beyond what one person may have under way is refused, and another person’s is not', async () => {
    server.close();
    await begin(new LedPort(never));
    for (let i = 0; i < MOST_OF_A_PERSON; i += 1) await order(viewer);
    const refused = await viewer.post(path, { format: 'pdf' });
    expect(refused.status).toBe(429);
    expect(refused.headers['retry-after']).toBe('5');
    await order(server.as('designer'));
  });

  it('is tried once more after its thread died', async () => {
    server.close();
    const port = new LedPort((attempt) => (attempt === 1 ? crash() : Promise.resolve(FILE)));
    await begin(port);
    expect(await ended(viewer, await order(viewer))).toMatchObject({ state: 'finished' });
    expect(port.orders).toHaveLength(2);
  });

  it('fails in words after its thread died twice, and those behind it are made', async () => {
    server.close();
    const port = new LedPort((attempt) => (attempt <= 2 ? crash() : Promise.resolve(FILE)));
    await begin(port);
    const first = await ended(viewer, await order(viewer));
    expect(first).toMatchObject({ state: 'failed', problem: { status: 500, type: '/problems/internal' } });
    expect(JSON.stringify(first)).not.toContain('the thread died');
    expect(await ended(viewer, await order(viewer))).toMatchObject({ state: 'finished' });
  });
});

describe('a server that starts again', () => {
  it('takes up what was not finished, once; what ended a server twice is given up', async () => {
    server.close();
    await begin(new LedPort(never));
    const kept = await order(viewer);
    const lost = await order(viewer);
    await running(viewer, kept);
    await running(viewer, lost);
    server.app.reports.close();
    server.db.update(jobs).set({ attempt: 2 }).where(eq(jobs.id, lost.id)).run();

    const port = new LedPort(() => Promise.resolve(FILE));
    const rows = new ReportRepository(server.db);
    const next = new ReportRunner(rows, {
      gather: () => Promise.resolve({} as ReportMaterial),
      port,
      now: () => server.now(),
      changed: () => undefined,
      report: () => undefined,
    });
    next.takeUp();
    const stateOf = ({ id }: ReportJob) => rows.byId(id)?.state;
    while (stateOf(kept) !== 'finished') await new Promise((resolve) => setTimeout(resolve, 5));
    expect(stateOf(lost)).toBe('failed');
    expect(port.orders).toHaveLength(1);
    next.close();
  });

  it('sweeps what is older than a day', async () => {
    const job = await ended(viewer, await order(viewer));
    server.pass(23 * 3_600_000);
    server.app.reports.takeUp();
    await state(server.as('viewer'), job);
    server.pass(2 * 3_600_000);
    server.app.reports.takeUp();
    expect((await server.as('viewer').get(`${path}/${job.id}`)).status).toBe(404);
  });
});

describe('whoever watches a report', () => {
  it('is told at once how far it is, then each step, whenever they come', async () => {
    server.close();
    let finish: () => void = () => undefined;
    await begin({
      make: (_order, progress) =>
        new Promise((resolve) => {
          progress(0.5, 'Half-way');
          finish = () => resolve(FILE);
        }),
    });
    const job = await order(viewer);
    await running(viewer, job);
    const { http, origin } = await listening(server);
    const headers = { Host: HOST, Accept: 'text/event-stream', Cookie: viewer.cookie ?? '' };
    const response = await fetch(`${origin}${path}/${job.id}/events`, { headers });
    expect(response.headers.get('content-type')).toContain('text/event-stream');
    const reader = response.body?.pipeThrough(new TextDecoderStream()).getReader();
    let text = '';
    const read = async (words: string) => {
      while (!text.includes(words)) text += (await reader?.read())?.value ?? '';
    };
    await read('"doing":"Half-way"');
    finish();
    await read('"state":"finished"');
    expect(text.match(/^event: .*$/gm)).toEqual(['event: report', 'event: report']);
    await reader?.cancel();
    server.app.endStreams();
    await new Promise((resolve) => http.close(resolve));
  });
});

import { connect } from 'node:net';
import type { EditOp } from '@riseback/network';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { STREAMS_PER_PERSON } from '../../server/src/events/network-streams';
import { boundedServer } from '../../server/src/platform/http/http-server';
import { SolveThread } from '../../server/src/solve/solve-thread';
import { Listening } from './listening-server';
import { batchOf, makeNetwork, sendBatch, SMALL } from './network-samples';
import { HOST, type Client } from './test-server';

const MB = 1024 * 1024;
/** Does what the case it is given is called: `spins` for ever. */
const DYING_WORKER = new URL('../faults/dying-worker.ts', import.meta.url);

describe('a solve that would not end', () => {
  const threads: SolveThread[] = [];
  afterEach(async () => {
    for (const thread of threads.splice(0)) await thread.close();
  });
  const withEndlessSolver = async (limitMs: number): Promise<Listening> => {
    const thread = new SolveThread({
      limitMs,
      workerUrl: DYING_WORKER,
      report: () => undefined,
    });
    threads.push(thread);
    return new Listening({ fileSolver: thread }).listen();
  };

  it('is stopped, says so, and holds up nobody', async () => {
    // long enough for a new thread to start on a busy machine
    const endless = await withEndlessSolver(5_000);
    const person = endless.app.as('viewer');
    const solved = endless.send(person, '/api/solve?case=spins', JSON.stringify(SMALL));
    const start = performance.now();
    for (let i = 0; i < 20; i++) expect(await endless.isHealthy()).toBe(true);
    const meanwhileMs = performance.now() - start;
    const { status, body } = await solved;
    expect({ status, type: body.type }).toEqual({ status: 503, type: '/problems/solve-failed' });
    expect(body.detail).toMatch(/took more than 5 s and was stopped/);
    expect(meanwhileMs).toBeLessThan(5_000);
    const after = await endless.send(person, '/api/solve', JSON.stringify(SMALL));
    expect(after.status).toBe(200);
    await endless.close();
  });

  it('lets a hundred wait behind it and refuses the next at once', async () => {
    const thread = new SolveThread({ workerUrl: DYING_WORKER, report: () => undefined });
    threads.push(thread);
    const job = { fileText: new TextEncoder().encode(JSON.stringify(SMALL)), caseId: 'spins' };
    const hundredAndOne = Array.from({ length: 101 }, (_, i) => thread.solveText(`job ${i}`, job));
    expect(await thread.solveText('one more', job)).toMatchObject({
      end: 'failed',
      detail: expect.any(String) as string,
    });
    await thread.close();
    expect(new Set((await Promise.all(hundredAndOne)).map(({ end }) => end))).toEqual(new Set(['superseded']));
  });

  it('cannot be asked for by one person as often as they like', async () => {
    const endless = await withEndlessSolver(500);
    const person = endless.app.as('viewer');
    const all = Array.from({ length: 10 }, () => endless.send(person, '/api/solve?case=spins', JSON.stringify(SMALL)));
    const statuses = (await Promise.all(all)).map(({ status }) => status).sort();
    expect(statuses).toEqual([...new Array<number>(6).fill(429), ...new Array<number>(4).fill(503)]);
    await endless.close();
  });
});

describe('those who are slow on purpose', () => {
  const limits = { headersMs: 300, requestMs: 600, silenceMs: 900, connections: 100 };
  let patient: Listening;
  beforeAll(async () => {
    patient = await new Listening({}, limits).listen();
  });
  afterAll(() => patient.close());

  /** Says what it is given to say, a character at a time, and hears what comes back until the connection ends. */
  function drip(text: string, everyMs: number): Promise<string> {
    return new Promise((resolve) => {
      const socket = connect(patient.port, '127.0.0.1');
      let [sent, heard] = [0, ''];
      const timer = setInterval(() => socket.write(text[sent++ % text.length] ?? ''), everyMs);
      socket.on('data', (chunk) => (heard += chunk.toString()));
      socket.on('error', () => undefined);
      socket.on('close', () => {
        clearInterval(timer);
        resolve(heard);
      });
    });
  }
  const problemIn = (heard: string) => JSON.parse(heard.slice(heard.indexOf('\r\n\r\n') + 4)) as { type: string };

  it('headers that never end are cut off with 408', async () => {
    const heard = await drip(`GET /healthz HTTP/1.1\r\nHost: x\r\nX-Slow: ${'x'.repeat(1000)}`, 20);
    expect(heard).toMatch(/^HTTP\/1\.1 408 /);
    expect(problemIn(heard).type).toBe('/problems/request-timeout');
  });

  it('a body that never ends is cut off', async () => {
    const viewer = patient.app.as('viewer');
    const head = `POST /api/solve HTTP/1.1\r\nHost: ${HOST}\r\nCookie: ${viewer.cookie ?? ''}\r\nX-XSRF-TOKEN: ${viewer.proof ?? ''}\r\nContent-Type: application/json\r\nContent-Length: 100000\r\n\r\n`;
    const heard = await new Promise<string>((resolve) => {
      const socket = connect(patient.port, '127.0.0.1');
      let text = '';
      socket.write(head);
      const timer = setInterval(() => socket.write('['), 20);
      socket.on('data', (chunk) => (text += chunk.toString()));
      socket.on('error', () => undefined);
      socket.on('close', () => {
        clearInterval(timer);
        resolve(text);
      });
    });
    expect(heard).toMatch(/^HTTP\/1\.1 408 /);
  });

  it('headers that are too large are refused in words', async () => {
    const heard = await new Promise<string>((resolve) => {
      const socket = connect(patient.port, '127.0.0.1');
      let text = '';
      socket.on('data', (chunk) => (text += chunk.toString()));
      socket.on('error', () => undefined);
      socket.on('close', () => resolve(text));
      socket.write(`GET /healthz HTTP/1.1\r\nHost: x\r\nX-Large: ${'x'.repeat(30_000)}\r\n\r\n`);
    });
    expect(heard).toMatch(/^HTTP\/1\.1 431 /);
    expect(problemIn(heard).type).toBe('/problems/headers-too-large');
  });

  it('a connection that says nothing is closed', async () => {
    expect(await drip('', 10_000)).toMatch(/^HTTP\/1\.1 408 /);
  });

  it('of the server as it runs, every limit is set', () => {
    const { headersTimeout, requestTimeout, timeout, maxConnections } = boundedServer(() => undefined);
    expect({ headersTimeout, requestTimeout, timeout, maxConnections }).toEqual({
      headersTimeout: 10_000,
      requestTimeout: 60_000,
      timeout: 90_000,
      maxConnections: 10_000,
    });
  });
});

describe('streams', () => {
  it('a thousand of one person are refused but for a few, from however many sessions', async () => {
    const streaming = await new Listening().listen();
    const id = await makeNetwork(streaming.app.as('designer'), streaming.app.siteId);
    const clients = Array.from({ length: 200 }, () => streaming.app.as('viewer'));
    // kept: what nobody holds is closed by the client itself
    const answers: Response[] = [];
    const controller = new AbortController();
    const open = async (client: Client): Promise<void> => {
      const answer = await fetch(`http://127.0.0.1:${streaming.port}/api/networks/${id}/events`, {
        headers: { Cookie: client.cookie ?? '', Accept: 'text/event-stream' },
        signal: controller.signal,
      });
      answers.push(answer);
    };
    for (const client of clients) await Promise.all(Array.from({ length: 5 }, () => open(client)));
    const statuses = answers.map(({ status }) => status);
    expect(statuses.length).toBe(1_000);
    expect(statuses.filter((status) => status === 200).length).toBe(STREAMS_PER_PERSON);
    expect(statuses.filter((status) => status === 429).length).toBe(1_000 - STREAMS_PER_PERSON);
    expect(await streaming.isHealthy()).toBe(true);
    controller.abort();
    await streaming.close();
  });

  it('a reader who never reads is dropped, and what waits for it is bounded', async () => {
    const streaming = await new Listening().listen();
    const { app } = streaming;
    const person = app.as('designer');
    const id = await makeNetwork(person, app.siteId);
    let unread = (): number => 0;
    const closed = new Promise<void>((resolve) => {
      const socket = connect(streaming.port, '127.0.0.1', () => {
        socket.write(
          `GET /api/networks/${id}/events HTTP/1.1\r\nHost: ${HOST}\r\nAccept: text/event-stream\r\nCookie: ${person.cookie ?? ''}\r\n\r\n`,
        );
        socket.pause();
      });
      socket.on('error', () => undefined);
      socket.on('close', () => resolve());
      streaming.server.once('connection', (other) => {
        unread = () => other.writableLength;
        other.once('close', () => socket.destroy());
      });
    });
    const note = 'x'.repeat(4_000);
    const notes = (from: number): EditOp[] =>
      Array.from({ length: 100 }, (_, i) => ({
        op: 'add',
        in: 'nodes',
        ordinal: from + i,
        value: { id: `N${from + i}`, kind: 'junction', elevationM: 0, note },
      }));
    let most = 0;
    for (let version = 1; version <= 30; version++) {
      await sendBatch(person, id, version, batchOf(notes(100 * version))).expect(200);
      most = Math.max(most, unread());
    }
    // it stopped growing when it was given up, though megabytes more were told
    expect(most).toBeGreaterThan(0);
    expect(most).toBeLessThan(4 * MB);
    await closed;
    expect(await streaming.isHealthy()).toBe(true);
    await streaming.close();
  });
});

import { pathToFileURL } from 'node:url';
import type { NetworkResults } from '@riseback/contracts';
import { readNetworkFile, type NetworkFile } from '@riseback/network';
import { afterEach, describe, expect, it } from 'vitest';
import ternQuay from '../../server/demo/tern-quay.json';
import { solveCases } from '../../server/src/solve/solve-cases';
import { SolveThread, type SolveThreadOptions } from '../../server/src/solve/solve-thread';
import { SolveThreads } from '../../server/src/solve/solve-threads';
import { makeNetwork, SMALL } from './network-samples';
import { TestServer } from './test-server';

const threads: { close(): Promise<void> }[] = [];
afterEach(async () => {
  await Promise.all(threads.splice(0).map((thread) => thread.close()));
});

function startThread(options: Partial<SolveThreadOptions> = {}): { thread: SolveThread; reports: unknown[] } {
  const reports: unknown[] = [];
  const thread = new SolveThread({ report: (error) => reports.push(error), ...options });
  threads.push(thread);
  return { thread, reports };
}

function fileOf(json: unknown): NetworkFile {
  const read = readNetworkFile(json);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

/** A worker that does what the job's first case says: `spin`, `throw`, `exit`; anything else it answers at once. */
const WORKER = pathToFileURL('tests/api/unruly-worker.mjs');
const job = (...caseIds: string[]) => ({ file: fileOf(SMALL), caseIds, partial: true, bands: false });

describe('the solver’s thread', () => {
  it('answers what the solver answers in the same thread', async () => {
    const { thread, reports } = startThread();
    const plant = { file: fileOf(ternQuay), caseIds: ['design', 'turndown', 'rt5open'], partial: true, bands: true };
    const ended = await thread.solve('a', plant);
    expect(reports).toEqual([]);
    expect(ended).toMatchObject({ end: 'finished', outcomes: solveCases(plant) });
  });

  it('does of the waiting jobs of one network only the newest, and those of others in turn', async () => {
    const { thread } = startThread({ workerUrl: WORKER });
    const ends = await Promise.all([
      thread.solve('a', job('1')),
      thread.solve('a', job('2')),
      thread.solve('b', job('3')),
      thread.solve('a', job('4')),
    ]);
    expect(ends.map(({ end }) => end)).toEqual(['finished', 'superseded', 'finished', 'finished']);
  });

  it('ends a solve that overruns its time, and goes on with the next', async () => {
    const { thread, reports } = startThread({ workerUrl: WORKER, limitMs: 300 });
    const [endless, next] = await Promise.all([thread.solve('a', job('spin')), thread.solve('b', job('1'))]);
    expect(endless).toEqual({ end: 'failed', detail: 'The solve took more than 0.3 s and was stopped.' });
    expect(next).toMatchObject({ end: 'finished' });
    expect(reports).toHaveLength(1);
  });

  it.each([{ how: 'throw' }, { how: 'exit' }])('outlives a worker that dies: $how', async ({ how }) => {
    const { thread, reports } = startThread({ workerUrl: WORKER });
    const [dead, next] = await Promise.all([thread.solve('a', job(how)), thread.solve('b', job('1'))]);
    expect(dead).toMatchObject({ end: 'failed', detail: expect.stringContaining('The solver broke') as string });
    expect(next).toMatchObject({ end: 'finished' });
    expect(reports.length).toBe(how === 'throw' ? 1 : 0);
  });

  it('refuses more work than it can promise', async () => {
    const { thread } = startThread({ workerUrl: WORKER });
    const ends = await Promise.all(Array.from({ length: 103 }, (_, i) => thread.solve(`network ${i}`, job('1'))));
    expect(ends.filter(({ end }) => end === 'failed')).toHaveLength(2);
  });
});

describe('bands', () => {
  const plant = (bands: boolean, cases = 3) => ({
    file: fileOf(ternQuay),
    caseIds: Array.from({ length: cases }, () => 'design'),
    partial: true,
    bands,
  });
  function startThreads(): SolveThreads {
    const both = new SolveThreads({ report: () => undefined });
    threads.push(both);
    return both;
  }

  it('never hold up pressures, and are called off by a newer job of their network', async () => {
    const both = startThreads();
    const order: string[] = [];
    const told = async (name: string, key: string, bands: boolean, cases?: number) => {
      const { end } = await both.solve(key, plant(bands, cases));
      order.push(`${name} ${end}`);
    };
    const bandsOfA = told('bands of a', 'a', true, 200);
    await told('pressures of b', 'b', false, 1);
    const newer = told('pressures of a', 'a', false, 1);
    await Promise.all([bandsOfA, newer]);
    expect(order[0]).toBe('pressures of b finished');
    expect(order).toContain('bands of a superseded');
    expect(order).toContain('pressures of a finished');
  });

  it('that wait their turn are called off as well', async () => {
    const both = startThreads();
    const ends = Promise.all([
      both.solve('a', plant(true)),
      both.solve('b', plant(true)),
      both.solve('b', plant(false)),
    ]);
    expect((await ends).map(({ end }) => end)).toEqual(['finished', 'superseded', 'finished']);
  });
});

describe('a network whose solve does not end', () => {
  it('fails with the reason while everything else can be read', async () => {
    const { thread } = startThread({ workerUrl: WORKER, limitMs: 1_500 });
    const server = new TestServer({ solver: thread });
    const designer = server.as('designer');
    const cases = [{ id: 'spin', name: 'Spin' }];
    const id = await makeNetwork(designer, server.siteId, { ...SMALL, cases });
    const asked = designer.get(`/api/networks/${id}/results`).expect(200);
    const began = performance.now();
    await designer.get(`/api/networks/${id}`).expect(200);
    await designer.get('/api/sites').expect(200);
    // a read takes some milliseconds; were it held up by the worker, it would take the whole 1.5 s
    expect(performance.now() - began).toBeLessThan(1_000);
    expect((await asked).body as NetworkResults).toMatchObject({
      state: 'failed',
      problem: { detail: 'The solve took more than 1.5 s and was stopped.' },
    });
    const next = await makeNetwork(designer, server.siteId);
    await designer.get(`/api/networks/${next}/results`).expect(200);
    server.close();
  });
});

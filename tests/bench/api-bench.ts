import { once } from 'node:events';
import { fileURLToPath } from 'node:url';
import { Worker } from 'node:worker_threads';
import { BareWrites } from './bare-writes';
import { headers, makeNetwork, smallNetwork, Writer } from './bench-networks';
import { startBenchServer, type BenchServer, type Headers } from './bench-server';
import { fire, otherThan, read, write, type Load, type Read } from './load';

const ROUNDS = 7;
const WHOLE_RESULTS = 'no goal: the body alone costs as much, docs/decisions/0060';
const READS_A_ROUND = 300;
const WRITES_A_ROUND = 150;
const CONNECTIONS = 10;
const USERS = 50;
const READS_TO_A_WRITE = 4;
const LARGE_PIPES = 20_000;
const P99_ROUNDS = 5;
const P99_ROUND_SECONDS = 4;
/** As fifty people read who also look at what they read; at full speed there would be no processor left for the solve. */
const READS_A_SECOND = 100;

export interface ApiBenchOptions {
  /** How long the fifty users work. */
  readonly minutes: number;
  readonly program?: string;
}

interface Bench {
  readonly server: BenchServer;
  readonly person: Headers;
  readonly siteId: string;
  /** The demo plant. */
  readonly networkId: string;
  readonly etag: string;
}

/** What the server costs over HTTP, as ratios within this run. */
export async function* apiBench({ minutes, program = builtServer() }: ApiBenchOptions): AsyncGenerator<string> {
  const server = await startBenchServer(program);
  try {
    const bench = await prepare(server);
    yield* readRatios(bench);
    yield* writeRatios(bench);
    yield* fiftyUsers(bench, minutes);
    yield* besideASolve(bench);
  } finally {
    await server.stop();
  }
}

function builtServer(): string {
  return fileURLToPath(new URL('../../dist/server/main.js', import.meta.url));
}

async function prepare(server: BenchServer): Promise<Bench> {
  const person = await server.signIn('designer');
  const get = (path: string) => fetch(server.address + path, { headers: person });
  const [site] = (await (await get('/api/sites')).json()) as { id: string }[];
  const siteId = site?.id ?? '';
  const [demo] = (await (await get(`/api/sites/${siteId}/networks`)).json()) as { id: string }[];
  const networkId = demo?.id ?? '';
  const results = await get(`/api/networks/${networkId}/results`);
  if (results.status !== 200) throw new Error(`the results of the demo were answered ${results.status}`);
  return { server, person, siteId, networkId, etag: results.headers.get('etag') ?? '' };
}

/** Processor time of the server decides: what else the machine does then hardly counts. */
async function* readRatios({ server, person, siteId, networkId, etag }: Bench): AsyncGenerator<string> {
  const health: Read = { path: '/healthz', headers: {} };
  const reads: readonly (Read & { readonly name: string; readonly status?: number; readonly goal?: string })[] = [
    { name: 'GET /api/sites', path: '/api/sites', headers: person },
    { name: 'GET the networks of a site', path: `/api/sites/${siteId}/networks`, headers: person },
    { name: 'GET a network', path: `/api/networks/${networkId}`, headers: person },
    { name: 'GET edits since the present version', path: `/api/networks/${networkId}/edits?since=1`, headers: person },
    {
      name: 'GET results, whole',
      path: `/api/networks/${networkId}/results`,
      headers: person,
      goal: WHOLE_RESULTS,
    },
    {
      name: 'GET results, packed as browsers take it',
      path: `/api/networks/${networkId}/results`,
      headers: { ...person, 'Accept-Encoding': 'gzip' },
      goal: WHOLE_RESULTS,
    },
    {
      name: 'GET results, already had',
      path: `/api/networks/${networkId}/results`,
      headers: { ...person, 'Accept-Encoding': 'gzip', 'If-None-Match': etag },
      status: 304,
    },
  ];
  const all: readonly (Read & { readonly status?: number })[] = [health, ...reads];
  const leastCpu = all.map(() => Infinity);
  const bestRate = all.map(() => 0);
  for (let round = 0; round < ROUNDS; round++) {
    for (const [i, one] of all.entries()) {
      const before = await server.cpuSeconds();
      const load = await fire(server.address, () => [read(one)], { connections: CONNECTIONS, amount: READS_A_ROUND });
      const cpu = (await server.cpuSeconds()) - before;
      demandNone(otherThan(load, one.status ?? 200), one.path);
      leastCpu[i] = Math.min(leastCpu[i] ?? NaN, cpu / load.requests);
      bestRate[i] = Math.max(bestRate[i] ?? NaN, load.requests / load.seconds);
    }
  }
  const [healthCpu = NaN] = leastCpu;
  const [healthRate = NaN] = bestRate;
  yield `Reads as a share of the rate of /healthz (${healthRate.toFixed(0)} a second over ${CONNECTIONS} connections), by the server's processor time`;
  for (const [i, { name, path, headers: sent, goal = 'goal: at least 0.5' }] of reads.entries()) {
    const answer = await fetch(server.address + path, { headers: { 'Accept-Encoding': 'identity', ...sent } });
    const size = Number(answer.headers.get('content-length'));
    await answer.arrayBuffer();
    const share = healthCpu / (leastCpu[i + 1] ?? NaN);
    const byRate = (bestRate[i + 1] ?? NaN) / healthRate;
    yield `  ${name}: ${share.toFixed(2)} (${goal}); ${byRate.toFixed(2)} by the clock, ${kilobytes(size)}`;
  }
}

async function* writeRatios({ server, person, siteId }: Bench): AsyncGenerator<string> {
  const bare = new BareWrites(server.folder);
  const kinds = [
    { name: 'Edits that move a symbol', changes: 'position' },
    { name: 'Edits that change a number, each solved and its results stored', changes: 'elevation' },
  ] as const;
  let bareRate = 0;
  const rates = kinds.map(() => 0);
  const writers = await Promise.all(
    kinds.map(({ changes }) => writersOf({ server, person, siteId }, CONNECTIONS, changes)),
  );
  for (let round = 0; round < ROUNDS; round++) {
    bareRate = Math.max(bareRate, bare.rate(WRITES_A_ROUND));
    for (const [i] of kinds.entries()) {
      const load = await fire(server.address, (n) => [write(at(writers[i], n))], {
        connections: CONNECTIONS,
        amount: WRITES_A_ROUND,
      });
      demandNone(otherThan(load, 200), 'an edit');
      rates[i] = Math.max(rates[i] ?? 0, load.requests / load.seconds);
    }
  }
  bare.close();
  yield `Writes as a share of bare transactions committed at synchronous = FULL (${bareRate.toFixed(0)} a second), each at its best of ${ROUNDS} rounds`;
  for (const [i, { name }] of kinds.entries()) {
    yield `  ${name}: ${((rates[i] ?? NaN) / bareRate).toFixed(2)} (goal: at least 0.5)`;
  }
}

/** Each has a network of their own, so that no edit is refused for another's. */
async function* fiftyUsers(bench: Bench, minutes: number): AsyncGenerator<string> {
  const { server, person } = bench;
  const writers = await writersOf(bench, USERS, 'elevation');
  const load = await fire(
    server.address,
    (user) => {
      const writer = at(writers, user);
      const own = `/api/networks/${writer.networkId}`;
      const paths = [`/api/sites/${bench.siteId}/networks`, own, `/api/networks/${bench.networkId}/results`, own];
      const reads = paths.slice(0, READS_TO_A_WRITE).map((path) => read({ path, headers: person }));
      return [...reads, write(writer)];
    },
    { connections: USERS, duration: minutes * 60 },
  );
  const wrong = otherThan(load, 200);
  const counts = [...load.statuses].map(([status, count]) => `${count} of ${status}`).join(', ');
  yield `${USERS} users, 80 % reads, for ${minutes} min: ${wrong} answers other than 200 (goal: 0); ${(load.requests / load.seconds).toFixed(0)} requests a second, p99 ${load.p99Ms} ms; ${counts}`;
}

/** Reads beside solves of a large network, one after the other, against reads with nothing else to do. */
async function* besideASolve(bench: Bench): AsyncGenerator<string> {
  const { server, person, networkId } = bench;
  const file = JSON.stringify(headers('Large', LARGE_PIPES));
  const reads = (): Promise<Load> =>
    fire(server.address, () => [read({ path: `/api/networks/${networkId}`, headers: person })], {
      connections: CONNECTIONS,
      duration: P99_ROUND_SECONDS,
      overallRate: READS_A_SECOND,
    });
  const url = `${server.address}/api/solve`;
  const p99s: { alone: number[]; beside: number[] } = { alone: [], beside: [] };
  let solves = 0;
  for (let round = 0; round < P99_ROUNDS; round++) {
    p99s.alone.push((await reads()).p99Ms);
    const solving = new Worker(new URL('./solve-again.mjs', import.meta.url), {
      workerData: { url, headers: person, file },
    });
    p99s.beside.push((await reads()).p99Ms);
    solving.postMessage('stop');
    const [outcome] = (await once(solving, 'message')) as [{ solves: number; refusal?: string }];
    if (outcome.refusal !== undefined) throw new Error(`a solve was answered ${outcome.refusal}`);
    solves += outcome.solves;
  }
  const [alone, beside] = [median(p99s.alone), median(p99s.beside)];
  yield `Reads beside ${solves} solves of ${LARGE_PIPES} pipes: p99 ${beside} ms, ${alone} ms without: ${(100 * (beside / alone - 1)).toFixed(0)} % more (goal: under 25 %)`;
}

async function writersOf(
  { server, person, siteId }: Pick<Bench, 'server' | 'person' | 'siteId'>,
  count: number,
  changes: 'position' | 'elevation',
): Promise<Writer[]> {
  const writers: Writer[] = [];
  for (let i = 0; i < count; i++) {
    const networkId = await makeNetwork(server, person, siteId, smallNetwork(`${changes} ${i}`));
    writers.push(new Writer(networkId, person, changes));
  }
  return writers;
}

function at<T>(items: readonly T[] | undefined, index: number): T {
  const item = items?.[index % items.length];
  if (item === undefined) throw new Error('there is none');
  return item;
}

function demandNone(wrong: number, what: string): void {
  if (wrong > 0) throw new Error(`${wrong} answers to ${what} were not the expected ones`);
}

function median(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? NaN;
}

function kilobytes(bytes: number): string {
  return `${(bytes / 1000).toFixed(1)} kB`;
}

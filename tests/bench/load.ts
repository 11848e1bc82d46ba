import autocannon from 'autocannon';
import type { Headers } from './bench-server';
import type { Writer } from './bench-networks';

/** What came of a series of requests. */
export interface Load {
  readonly requests: number;
  readonly seconds: number;
  readonly p99Ms: number;
  /** Answers by status; connections that broke or timed out count as 0. */
  readonly statuses: ReadonlyMap<number, number>;
}

export interface Read {
  readonly path: string;
  readonly headers: Headers;
}

/** Sends requests over some connections, each waiting for its answer before it sends the next. */
export async function fire(
  address: string,
  setup: (connection: number) => autocannon.Request[],
  {
    connections,
    ...length
  }: {
    readonly connections: number;
    readonly amount?: number;
    readonly duration?: number;
    readonly overallRate?: number;
  },
): Promise<Load> {
  const statuses = new Map<number, number>();
  const count = (status: number) => statuses.set(status, (statuses.get(status) ?? 0) + 1);
  let connection = 0;
  const start = performance.now();
  let lastAt = start;
  const { latency, errors, requests } = await new Promise<autocannon.Result>((resolve, reject) => {
    const options: autocannon.Options = {
      url: address,
      connections,
      timeout: 30,
      ...length,
      setupClient: (client) => client.setRequests(setup(connection++)),
    };
    const ended = (error: unknown, result: autocannon.Result): void => {
      if (error === null) resolve(result);
      else reject(error as Error);
    };
    autocannon(options, ended).on('response', (_client, status) => {
      count(status);
      // it ends at a full second, whenever its last answer came
      lastAt = performance.now();
    });
  });
  for (let i = 0; i < errors; i++) count(0);
  return { requests: requests.total, seconds: (lastAt - start) / 1000, p99Ms: latency.p99, statuses };
}

export function read({ path, headers }: Read): autocannon.Request {
  return { method: 'GET', path, headers: { ...headers } };
}

export function write(writer: Writer): autocannon.Request {
  return {
    method: 'POST',
    path: writer.path,
    setupRequest: (request) => ({ ...request, headers: writer.headers(), body: writer.body() }),
    onResponse: (status, body) => writer.answered(status, body),
  };
}

/** How many answers were none of these. */
export function otherThan({ statuses }: Load, ...expected: number[]): number {
  return [...statuses].reduce((sum, [status, count]) => (expected.includes(status) ? sum : sum + count), 0);
}

import { request as httpRequest, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { expect } from 'vitest';
import { boundedServer, SERVER_LIMITS } from '../../server/src/platform/http/http-server';
import { HOST, TestServer, type Client } from './test-server';

/** Processor time for refusing anything and answering a read beside it: on a quiet machine, a second would pass. */
const MOST_CPU_MS = 1_000;

export interface Answer {
  readonly status: number;
  readonly body: { readonly type?: string; readonly detail?: string; readonly errors?: readonly unknown[] };
}

/** The application behind the very server that `main` makes, on a port of its own. */
export class Listening {
  readonly app: TestServer;
  readonly server: Server;
  port = 0;

  constructor(options: ConstructorParameters<typeof TestServer>[0] = {}, limits = SERVER_LIMITS) {
    this.app = new TestServer({ ...options, config: { requestsPerMinute: 1e9, ...options.config } });
    this.server = boundedServer(this.app.app.handler, limits);
  }

  async listen(): Promise<this> {
    await new Promise<void>((resolve) => this.server.listen(0, '127.0.0.1', resolve));
    this.port = (this.server.address() as AddressInfo).port;
    return this;
  }

  async close(): Promise<void> {
    this.app.app.endStreams();
    this.server.closeAllConnections();
    await new Promise((resolve) => this.server.close(resolve));
    this.app.close();
  }

  /** Sends a body as it is; a server that has refused it may close the connection before it has taken it all. */
  send(
    client: Client,
    path: string,
    body: string | Buffer,
    headers: Readonly<Record<string, string>> = {},
    method = 'POST',
  ): Promise<Answer> {
    return new Promise((resolve, reject) => {
      const sent = httpRequest({
        port: this.port,
        method,
        path,
        headers: {
          Host: HOST,
          'Content-Type': 'application/json',
          ...(client.cookie === undefined ? {} : { Cookie: client.cookie }),
          ...(client.proof === undefined ? {} : { 'X-XSRF-TOKEN': client.proof }),
          ...headers,
        },
      });
      sent.on('error', reject);
      sent.on('response', (res) => {
        let text = '';
        res.on('data', (chunk: Buffer) => (text += chunk.toString()));
        res.on('end', () => resolve({ status: res.statusCode ?? 0, body: JSON.parse(text) as Answer['body'] }));
      });
      sent.end(body);
    });
  }

  async isHealthy(): Promise<boolean> {
    return (await fetch(`http://127.0.0.1:${this.port}/healthz`)).status === 200;
  }
}

/** What it takes of the processor to answer, and to answer a read that comes at the same time. */
export async function costly<T>(listening: Listening, work: () => Promise<T>): Promise<T> {
  const before = process.cpuUsage();
  const [answer, healthy] = await Promise.all([work(), listening.isHealthy()]);
  const { user, system } = process.cpuUsage(before);
  expect(healthy).toBe(true);
  expect((user + system) / 1000).toBeLessThan(MOST_CPU_MS);
  return answer;
}

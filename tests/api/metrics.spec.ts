import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createLog } from '../../server/src/platform/log';
import { Metrics } from '../../server/src/platform/metrics/metrics';
import { serveMetrics } from '../../server/src/platform/metrics/metrics-server';
import { makeNetwork } from './network-samples';
import { TestServer } from './test-server';

const metrics = new Metrics(':memory:');
const solver = metrics.timed({ solve: () => Promise.resolve({ end: 'failed', detail: 'too hard' }) });
const server = new TestServer({ observe: metrics.requestTimer(), solver });
const log = createLog({ logLevel: 'silent' }, process.stdout);
let figures: Server;
let address = '';
beforeAll(async () => {
  figures = await serveMetrics(metrics, { host: '127.0.0.1', port: 0 }, log);
  address = `http://127.0.0.1:${(figures.address() as AddressInfo).port}`;
});
afterAll(() => {
  figures.close();
  server.close();
});

describe('the figures for Prometheus', () => {
  it('count requests by the pattern of their route, never by an id', async () => {
    const id = await makeNetwork(server.as('designer'), server.siteId);
    await server.as('viewer').get(`/api/networks/${id}`).expect(200);
    await server.as('viewer').get('/api/networks/no-such-network').expect(404);
    await server.as('viewer').get('/api/nothing-here').expect(404);
    const text = await (await fetch(`${address}/metrics`)).text();
    const count = (route: string, status: string) =>
      `riseback_http_request_seconds_count{method="GET",route="${route}",status="${status}"} 1`;
    expect(text).toContain(count('/api/networks/:networkId', '2xx'));
    expect(text).toContain(count('/api/networks/:networkId', '4xx'));
    expect(text).toContain(count('other', '4xx'));
    expect(text).not.toContain(id);
    expect(text).not.toContain('nothing-here');
    expect(text).toContain('nodejs_eventloop_lag_p99_seconds');
  });

  it('tell of solves and backups', async () => {
    await makeNetwork(server.as('designer'), server.siteId);
    metrics.backupEnded(undefined);
    metrics.backupEnded(new Date('2026-03-01T08:00:00.000Z'));
    const text = await metrics.text();
    expect(text).toContain('riseback_solve_seconds_count{end="failed"}');
    expect(text).toContain('riseback_backups_total{end="failed"} 1');
    expect(text).toContain('riseback_last_backup_timestamp_seconds 1772352000');
  });

  it('are at /metrics of their own port and nowhere else', async () => {
    expect((await fetch(`${address}/`)).status).toBe(404);
    expect((await fetch(`${address}/metrics`, { method: 'POST' })).status).toBe(404);
    await server.as('administrator').get('/metrics').expect(404);
  });

  it('stop the start when their port is taken', async () => {
    const { port } = figures.address() as AddressInfo;
    await expect(serveMetrics(metrics, { host: '127.0.0.1', port }, log)).rejects.toThrow('EADDRINUSE');
  });
});

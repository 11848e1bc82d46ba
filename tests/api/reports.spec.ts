import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { ReportJob } from '@riseback/contracts';
import { makeNetwork } from './network-samples';
import { TestServer, type Client } from './test-server';

let server: TestServer;
let viewer: Client;
let path = '';

beforeEach(async () => {
  server = new TestServer();
  viewer = server.as('viewer');
  path = `/api/networks/${await makeNetwork(server.as('designer'), server.siteId)}/reports`;
});
afterEach(() => server.close());

async function ended(client: Client, job: ReportJob): Promise<ReportJob> {
  for (;;) {
    const { body } = (await client.get(`${path}/${job.id}`).expect(200)) as { body: ReportJob };
    if (!['waiting', 'running'].includes(body.state)) return body;
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
}

describe('a report', () => {
  it('is ordered, made and fetched by whoever may see the network', async () => {
    const { body: job } = (await viewer.post(path, { format: 'pdf' }).expect(202)) as { body: ReportJob };
    expect(await ended(viewer, job)).toMatchObject({ state: 'finished', progress: 1 });
    const { body, headers } = await viewer.get(`${path}/${job.id}/content`).expect(200);
    expect(headers).toMatchObject({ 'content-type': 'application/pdf' });
    expect((body as Buffer).subarray(0, 5).toString()).toBe('%PDF-');
  });
});

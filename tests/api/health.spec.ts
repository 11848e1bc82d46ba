import { afterEach, describe, expect, it } from 'vitest';
import { TestServer } from './test-server';

let server: TestServer | undefined;
afterEach(() => {
  server?.close();
});

describe('health', () => {
  it('says that it is alive to anyone', async () => {
    server = new TestServer();
    expect((await server.as('anonymous').get('/healthz').expect(200)).body).toEqual({ alive: true });
  });

  it('is ready when it can write, has room and its solver solves', async () => {
    server = new TestServer();
    const response = await server.as('anonymous').get('/readyz').expect(200);
    expect(response.body).toEqual({ ready: true, database: true, disk: true, worker: true });
  });

  it('is not ready when the solver fails', async () => {
    server = new TestServer({ solver: { solve: () => Promise.resolve({ end: 'failed', detail: 'broken' }) } });
    const response = await server.as('anonymous').get('/readyz').expect(503);
    expect(response.body).toMatchObject({ ready: false, worker: false, database: true });
  });

  it('asks a busy solver once, however many ask', async () => {
    let asked = 0;
    server = new TestServer({
      solver: {
        solve: () => {
          asked += 1;
          return new Promise(() => undefined);
        },
      },
    });
    const client = server.as('anonymous');
    const answers = await Promise.all([client.get('/readyz'), client.get('/readyz'), client.get('/readyz')]);
    // Busy is not dead: nothing else is known of it yet.
    for (const { status } of answers) expect(status).toBe(200);
    expect(asked).toBe(1);
    server.pass(2 * 60_000);
    expect((await client.get('/readyz')).status).toBe(503);
  });

  it('is not ready when the database cannot be written', async () => {
    server = new TestServer();
    server.db.$client.pragma('query_only = on');
    const response = await server.as('anonymous').get('/readyz').expect(503);
    expect(response.body).toMatchObject({ ready: false, database: false });
  });
});

import { createHash } from 'node:crypto';
import { once } from 'node:events';
import { createServer } from 'node:http';
import { connect, type AddressInfo } from 'node:net';
import { gzipSync } from 'node:zlib';
import { eq } from 'drizzle-orm';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import * as z from 'zod';
import { audit, people, sessions } from '../../server/src/platform/db/schema';
import { findSyntaxError } from '../../server/src/platform/http/json-syntax';
import { HOST, TestServer } from './test-server';

const HOUR_MS = 3_600_000;
const EMPTY_NETWORK = {
  format: 'riseback-network',
  version: 1,
  name: 'x',
  site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
  nodes: [],
  pipes: [],
};

let server: TestServer;
beforeEach(() => {
  server = new TestServer();
});
afterEach(() => {
  server.close();
});

/** All that is stored but sessions, the log and what solves leave behind. */
function stored(): string {
  const named = server.db.$client.prepare(`select name from sqlite_schema where type = 'table'`).all();
  const tables = (named as { name: string }[]).filter(({ name }) => !/^(sqlite|__|sessions$|audit|solve)/.test(name));
  return JSON.stringify(tables.map(({ name }) => server.db.$client.prepare(`select * from "${name}"`).all()));
}

describe('a change', () => {
  const change = { units: 'si' };

  it('without the proof, or with that of another session, is refused', async () => {
    const client = server.as('viewer');
    const other = server.as('viewer');
    const patch = (proof: string | undefined) => {
      const test = request(server.app.handler)
        .patch('/api/profile')
        .set('Host', HOST)
        .set('Cookie', client.cookie ?? '');
      if (proof !== undefined) void test.set('X-XSRF-TOKEN', proof);
      return test.send(change);
    };
    const refused = await patch(undefined).expect(403);
    expect(refused.body).toMatchObject({ type: '/problems/forged-request' });
    await patch('').expect(403);
    await patch(other.proof).expect(403);
    await patch(client.proof).expect(200);
  });

  it.each([
    { header: 'Origin', value: 'https://elsewhere.example' },
    { header: 'Origin', value: 'null' },
    { header: 'Origin', value: 'http://localhost:4311' },
    { header: 'Sec-Fetch-Site', value: 'cross-site' },
    { header: 'Sec-Fetch-Site', value: 'same-site' },
  ])('from another origin is refused, signing in too: $header $value', async ({ header, value }) => {
    await server.as('viewer').send('patch', '/api/profile').set(header, value).send(change).expect(403);
    const signIn = { email: 'viewer@ternquay.example', password: 'whatever it is' };
    await server.as('anonymous').send('post', '/api/session').set(header, value).send(signIn).expect(403);
  });

  it('from its own pages is accepted', async () => {
    const client = server.as('viewer');
    await client
      .send('patch', '/api/profile')
      .set('Origin', `http://${HOST}`)
      .set('Sec-Fetch-Site', 'same-origin')
      .send(change)
      .expect(200);
  });

  it('behind a proxy is measured against the configured origin', async () => {
    const behind = new TestServer({ config: { origin: new URL('http://plant.example') } });
    const client = behind.as('viewer');
    await client.send('patch', '/api/profile').set('Origin', 'http://plant.example').send(change).expect(200);
    await client.send('patch', '/api/profile').set('Origin', `http://${HOST}`).send(change).expect(403);
    behind.close();
  });
});

describe('a body', () => {
  const post = (text: string | Buffer, type = 'application/json') =>
    server.as('anonymous').send('post', '/api/session').set('Content-Type', type).send(text);

  it('that is not JSON is refused with the place of the mistake', async () => {
    const response = await post('{\n  "email": "a@b.example",\n  "password": secret words\n}').expect(400);
    expect(response.body).toMatchObject({
      type: '/problems/bad-request',
      detail: expect.stringContaining('line 3, column 15') as string,
    });
    // Not even a piece of what was sent comes back.
    expect(JSON.stringify(response.body)).not.toContain('secret');
  });

  it('of the right syntax but the wrong form is refused with a pointer for each mistake', async () => {
    const response = await post(JSON.stringify({ email: 7, passwort: 'x' })).expect(400);
    const { errors } = response.body as { errors: { pointer: string }[] };
    expect(errors.map(({ pointer }) => pointer).sort()).toEqual(['/email', '/password', '/passwort']);
    await post('5').expect(400);
    await post('').expect(400);
  });

  it('that is too large is refused, however it is packed', async () => {
    const large = JSON.stringify({ email: 'a@b.example', password: 'x'.repeat(1_200_000) });
    await post(large).expect(413);
    const packed = gzipSync(large);
    expect(packed.length).toBeLessThan(10_000);
    // supertest would write a Buffer as JSON
    const test = post('').set('Content-Encoding', 'gzip');
    test.write(packed);
    await test.expect(413);
  });

  it('of another kind is refused', async () => {
    await post('email=a', 'application/x-www-form-urlencoded').expect(415);
    await post('{}', 'text/plain').expect(415);
    await post('{}', 'application/json; charset=iso-8859-1').expect(415);
    await post('{}').set('Content-Encoding', 'compress').expect(415);
  });
});

describe('a session', () => {
  it('older than the password is dead, though nobody ended it', async () => {
    const client = server.as('viewer');
    await client.get('/api/session').expect(200);
    const passwordChangedAt = new Date(server.now().getTime() + 1000).toISOString();
    server.db.update(people).set({ passwordChangedAt }).where(eq(people.id, 'viewer')).run();
    await client.get('/api/session').expect(401);
  });

  it.each([
    { limit: 'idle', hours: 12, kept: {} },
    { limit: 'absolute', hours: 7 * 24, kept: { idleUntil: '2027-01-01T00:00:00.000Z' } },
  ])('over its $limit limit is dead by its row, however fresh the token', async ({ hours, kept }) => {
    const { sessionId } = server.session('viewer');
    if ('idleUntil' in kept) server.db.update(sessions).set(kept).where(eq(sessions.id, sessionId)).run();
    const withFreshToken = () => {
      const token = server.tokens.sign(sessionId, server.now(), new Date(server.now().getTime() + HOUR_MS));
      return request(server.app.handler)
        .get('/api/session')
        .set('Host', HOST)
        .set('Cookie', `riseback-session=${token}`);
    };
    server.pass(hours * HOUR_MS - 1_000);
    await withFreshToken().expect(200);
    server.pass(2_000);
    await withFreshToken().expect(401);
  });
});

describe('findSyntaxError', () => {
  it.each([
    ['', 1, 1],
    ['{', 1, 2],
    ['{"a" 1}', 1, 6],
    ['{"a": 1,}', 1, 9],
    ['[1, 2', 1, 6],
    ['[1 2]', 1, 4],
    ['[1]]', 1, 4],
    ['{"a": 01}', 1, 8],
    ['"tab\tinside"', 1, 1],
    ['{"a": tru}', 1, 7],
    ['[}', 1, 2],
    ['{"a": [1, 2}', 1, 12],
    ['{\n"a": 1\n"b": 2}', 3, 1],
    ['1 x', 1, 3],
  ])('%j: line %i, column %i', (text, line, column) => {
    expect(() => JSON.parse(text) as unknown).toThrow();
    expect(findSyntaxError(text)).toEqual({ line, column });
  });

  it.each(['{}', '[]', ' [1, -2.5e+3, "\\u00e9\\n", true, false, null, {"a": {"b": []}}] ', '"x"', '0'])(
    'finds none in %s',
    (text) => {
      JSON.parse(text);
      expect(findSyntaxError(text)).toBeUndefined();
    },
  );
});

describe('a fault of ours', () => {
  const secretive = (error: Error) =>
    new TestServer({ fileSolver: { solveText: () => Promise.reject(error) }, config: { logLevel: 'info' } });
  const file = EMPTY_NETWORK;

  it.each([
    new Error('SELECT * FROM people; at /srv/riseback/server.js:12'),
    new z.ZodError([{ code: 'custom', path: ['people'], message: 'SELECT in /srv', input: 1 }]),
  ])('becomes a 500 that says nothing of the inside and leads to the log', async (error) => {
    const faulty = secretive(error);
    const response = await faulty.as('viewer').post('/api/solve', file).expect(500);
    expect(JSON.stringify(response.body)).not.toMatch(/SELECT|srv|people|Error|stack|node_modules/);
    expect(response.body).toMatchObject({ type: '/problems/internal', status: 500 });
    const id = String(response.headers['x-request-id']);
    expect((response.body as { instance: string }).instance).toBe(`/requests/${id}`);
    expect(faulty.log.some((line) => line.includes(id) && line.includes('/srv'))).toBe(true);
    faulty.close();
  });

  it('a full disk is said as such, with 503', async () => {
    const faulty = secretive(Object.assign(new Error('database or disk is full'), { code: 'SQLITE_FULL' }));
    const response = await faulty.as('viewer').post('/api/solve', file).expect(503);
    expect(response.headers['retry-after']).toBeDefined();
    faulty.close();
  });
});

describe('the log', () => {
  it('has one line a request, with the id of the answer and without anything secret', async () => {
    const password = 'a password nobody else may read';
    const client = server.as('viewer');
    server.log.length = 0;
    const response = await server
      .as('anonymous')
      .post('/api/session?token=in-the-query', { email: 'viewer@ternquay.example', password })
      .set('Cookie', client.cookie ?? '')
      .set('Authorization', 'Bearer something');
    expect(response.status).toBe(401);
    expect(server.log).toHaveLength(1);
    const line = server.log[0] ?? '';
    expect(JSON.parse(line)).toMatchObject({
      id: response.headers['x-request-id'],
      method: 'POST',
      path: '/api/session',
      status: 401,
    });
    for (const secret of [password, client.issued?.token ?? '', 'Bearer', 'in-the-query', 'viewer@'])
      expect(line).not.toContain(secret);
  });

  it('says of a refusal whose session it was kept from, and of nobody else who they are', async () => {
    const lineOf = async (who: 'viewer' | 'stranger' | 'anonymous', path: string): Promise<unknown> => {
      const client = server.as(who);
      server.log.length = 0;
      await client.get(path);
      return JSON.parse(server.log[0] ?? '');
    };
    const audit = `/api/sites/${server.siteId}/audit`;
    expect(await lineOf('viewer', audit)).toMatchObject({ status: 403, person: 'viewer' });
    expect(await lineOf('stranger', audit)).toMatchObject({ status: 404, person: 'stranger' });
    expect(await lineOf('viewer', '/api/sites')).not.toHaveProperty('person');
    expect(await lineOf('anonymous', audit)).not.toHaveProperty('person');
  });
});

describe('the audit log', () => {
  /** RFC 8785 for what is in it: keys in order, numbers and texts as JSON has them. */
  function inOrder(value: unknown): unknown {
    if (typeof value !== 'object' || value === null) return value;
    const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
    return Object.fromEntries(entries.map(([key, inner]) => [key, inOrder(inner)]));
  }

  it('has in each hash the one before it, worked out anew from the rows', async () => {
    await server.as('designer').post(`/api/sites/${server.siteId}/networks`, EMPTY_NETWORK).expect(201);
    const rows = server.db.select().from(audit).orderBy(audit.seq).all();
    expect(rows.length).toBeGreaterThan(1);
    let before = '0'.repeat(64);
    for (const { hash, previousHash, ...row } of rows) {
      expect(previousHash).toBe(before);
      expect(hash).toBe(
        createHash('sha256')
          .update(previousHash + JSON.stringify(inOrder(row)))
          .digest('hex'),
      );
      before = hash;
    }
  });
});

describe('the address', () => {
  it('that the API does not know answers 404, one known under another method 405 with Allow', async () => {
    const unknown = await server.as('viewer').get('/api/nothing-here').set('Accept', 'text/html').expect(404);
    expect(unknown.headers['content-type']).toContain('application/problem+json');
    const other = await server.as('viewer').send('put', '/api/session').expect(405);
    expect(other.headers['allow']).toBe('POST, GET, HEAD, DELETE');
    await server.as('viewer').get('/api/sites/%E0%A4%A').expect(400);
  });

  it('asked for too often by one session answers 429', async () => {
    const busy = new TestServer({ config: { requestsPerMinute: 60 } });
    const client = busy.as('viewer');
    for (let i = 0; i < 60; i += 1) await client.get('/api/session').expect(200);
    const refused = await client.get('/api/session').expect(429);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    await busy.as('designer').get('/api/session').expect(200);
    busy.close();
  });
});

describe('a request', () => {
  /** What the server answers to bytes that no well-meaning client sends. */
  async function answerTo(text: string): Promise<string> {
    const listening = createServer(server.app.handler).listen(0, '127.0.0.1');
    await once(listening, 'listening');
    const socket = connect((listening.address() as AddressInfo).port, '127.0.0.1');
    socket.end(text.replaceAll('\n', '\r\n'));
    let answer = '';
    for await (const chunk of socket) answer += String(chunk);
    listening.close();
    return answer;
  }

  it('whose length is told in two ways is refused, so that no second one hides in it', async () => {
    const head = `POST /api/session HTTP/1.1\nHost: ${HOST}\nContent-Type: application/json\n`;
    const both = await answerTo(
      `${head}Content-Length: 4\nTransfer-Encoding: chunked\n\n0\n\nGET /healthz HTTP/1.1\nHost: ${HOST}\n\n`,
    );
    expect(both).toMatch(/^HTTP\/1\.1 400 /);
    const two = await answerTo(
      `${head}Content-Length: 2\nContent-Length: 40\n\n{}GET /healthz HTTP/1.1\nHost: ${HOST}\n\n`,
    );
    expect(two).toMatch(/^HTTP\/1\.1 400 /);
    for (const answer of [both, two]) expect(answer).not.toContain('alive');
  });

  it.each(['TRACE', 'OPTIONS', 'CONNECT', 'PROPFIND'])(
    'by the method %s changes and echoes nothing',
    async (method) => {
      const answer = await answerTo(
        `${method} /api/session HTTP/1.1\nHost: ${HOST}\nX-Echo: an-echo\nConnection: close\n\n`,
      );
      expect(answer).not.toMatch(/^HTTP\/1\.1 2/);
      expect(answer).not.toContain('an-echo');
    },
  );

  it('that reads stores nothing, whatever the route', async () => {
    const made = await server.as('designer').post(`/api/sites/${server.siteId}/networks`, EMPTY_NETWORK).expect(201);
    const ids = { siteId: server.siteId, networkId: (made.body as { id: string }).id };
    const before = stored();
    const reads = server.app.routes.filter(({ mutates }) => !mutates);
    expect(reads.length).toBeGreaterThan(8);
    for (const { path } of reads) {
      const address = path.replace(':siteId', ids.siteId).replace(':networkId', ids.networkId).replaceAll(/:\w+/g, 'x');
      await server
        .as('administrator')
        .get(`${address}?delete=1&_method=delete`)
        .set('X-HTTP-Method-Override', 'DELETE');
    }
    expect(stored()).toBe(before);
  });

  it('that names a parameter twice, or one of the body in the address, is refused or not listened to', async () => {
    const made = await server.as('designer').post(`/api/sites/${server.siteId}/networks`, EMPTY_NETWORK).expect(201);
    const { id } = made.body as { id: string };
    await server.as('viewer').get(`/api/networks/${id}/results?version=1&version=2`).expect(400);
    await server.as('viewer').get(`/api/networks/${id}/edits?since=0&since=1`).expect(400);
    const inTheAddress = server.as('anonymous').send('post', '/api/session?email=viewer@ternquay.example&password=x');
    const { errors } = (await inTheAddress.send({}).expect(400)).body as { errors: { pointer: string }[] };
    expect(errors.map(({ pointer }) => pointer).sort()).toEqual(['/email', '/password']);
  });

  it('that would break a line of the log stays in its own', async () => {
    server.log.length = 0;
    await server.as('viewer').get('/api/none%0d%0a%7b%22level%22:%22error%22%7d').expect(404);
    expect(server.log).toHaveLength(1);
    const [line = ''] = server.log;
    expect(line.trimEnd()).not.toMatch(/[\r\n]/);
    expect(JSON.parse(line)).toMatchObject({ level: 'info', status: 404, time: expect.stringMatching(/Z$/) as string });
  });
});

describe('headers', () => {
  it('let no other origin read an answer, whatever it claims to be', async () => {
    for (const origin of ['https://elsewhere.example', 'null', `http://${HOST}`]) {
      const { headers } = await server.as('viewer').get('/api/session').set('Origin', origin).expect(200);
      expect(Object.keys(headers).filter((name) => name.startsWith('access-control-'))).toEqual([]);
      expect(headers['cross-origin-resource-policy']).toBe('same-origin');
      expect(headers['cross-origin-opener-policy']).toBe('same-origin');
      expect(headers['content-type']).toBe('application/json; charset=utf-8');
    }
  });

  it('of the API forbid storing, sniffing, framing and referring', async () => {
    const { headers } = await server.as('viewer').get('/api/session').expect(200);
    expect(headers['cache-control']).toBe('no-store');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('no-referrer');
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(headers['x-powered-by']).toBeUndefined();
    expect(headers['strict-transport-security']).toBeUndefined();
  });

  it('tell browsers to stay on https where there is https', async () => {
    const secure = new TestServer({ config: { origin: new URL('https://riseback.example') } });
    const { headers } = await secure.as('anonymous').get('/healthz').expect(200);
    expect(headers['strict-transport-security']).toMatch(/max-age=\d{7,}/);
    secure.close();
  });
});

import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { brotliCompressSync, gzipSync } from 'node:zlib';
import request from 'supertest';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import * as z from 'zod';
import { findSyntaxError } from '../../server/src/platform/http/json-syntax';
import { HOST, TestServer } from './test-server';

let server: TestServer;
beforeEach(() => {
  server = new TestServer();
});
afterEach(() => {
  server.close();
});

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
    new TestServer({ solver: { solve: () => Promise.reject(error) }, config: { logLevel: 'info' } });
  const file = {
    format: 'riseback-network',
    version: 1,
    name: 'x',
    site: { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 },
    nodes: [],
    pipes: [],
  };

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

describe('headers', () => {
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

describe('the pages', () => {
  let folder = '';
  let pages: TestServer;
  beforeAll(() => {
    folder = mkdtempSync(join(tmpdir(), 'riseback-pages-'));
    writeFileSync(join(folder, 'index.html'), '<app-root ngCspNonce="CSP_NONCE"></app-root>');
    writeFileSync(join(folder, 'main-ABCD2345.js'), '1;');
    writeFileSync(join(folder, 'main-ABCD2345.js.br'), brotliCompressSync('1;'));
    writeFileSync(join(folder, 'mark.svg'), '<svg/>');
    mkdirSync(join(folder, 'media'));
    pages = new TestServer({ webFolder: folder });
  });
  afterAll(() => {
    pages.close();
    rmSync(folder, { recursive: true });
  });
  const open = (path: string) =>
    pages.as('anonymous').get(path).set('Accept', 'text/html,application/xhtml+xml,*/*;q=0.8');

  it.each(['/', '/sites/a/networks/b/drawing?case=design&element=T1.2', '/index.html'])(
    '%s is index.html',
    async (path) => {
      const response = await open(path);
      if (path === '/index.html') {
        expect(response.headers['cache-control']).not.toContain('immutable');
        return;
      }
      expect(response.status).toBe(200);
      expect(response.headers['cache-control']).toBe('no-store');
    },
  );

  it('carry a nonce of their own, in the page and in the policy, and allow no inline script', async () => {
    const nonces = new Set<string>();
    for (let i = 0; i < 3; i += 1) {
      const response = await open('/').expect(200);
      const nonce = /ngCspNonce="([^"]+)"/.exec(response.text)?.[1] ?? '';
      expect(nonce.length).toBeGreaterThanOrEqual(22);
      nonces.add(nonce);
      const policy = String(response.headers['content-security-policy']);
      expect(policy).toContain(`style-src 'self' 'nonce-${nonce}'`);
      expect(policy).toContain("default-src 'none'");
      expect(policy).toContain("script-src 'self';");
      expect(policy).toContain("require-trusted-types-for 'script'");
      expect(policy).not.toContain('unsafe');
    }
    expect(nonces.size).toBe(3);
  });

  it('keep hashed files for good and others not', async () => {
    const hashed = await pages.as('anonymous').get('/main-ABCD2345.js').expect(200);
    expect(hashed.headers['cache-control']).toBe('public, max-age=31536000, immutable');
    const plain = await pages.as('anonymous').get('/mark.svg').expect(200);
    expect(plain.headers['cache-control']).toBe('no-cache');
  });

  it('are sent compressed to those who take that, under the type of the file', async () => {
    const open = (encodings: string) =>
      pages.as('anonymous').get('/main-ABCD2345.js').set('Accept-Encoding', encodings).buffer(true).expect(200);
    const plain = await open('identity');
    expect(plain.headers['content-encoding']).toBeUndefined();
    const packed = await open('gzip, br');
    expect(packed.headers['content-encoding']).toBe('br');
    for (const { headers, text } of [plain, packed]) {
      expect(text).toBe('1;');
      expect(headers['content-type']).toContain('javascript');
      expect(headers['vary']).toContain('Accept-Encoding');
      expect(headers['cache-control']).toContain('immutable');
    }
  });

  it.each(['/main-GONE2345.js', '/media/none.woff2', '/../package.json', '/%2e%2e/package.json', '/.env'])(
    'a missing file is 404, never a page: %s',
    async (path) => {
      const response = await open(path);
      expect(response.status).toBe(404);
      expect(response.headers['content-type']).toContain('application/problem+json');
    },
  );

  it('are not given to a script that asks for JSON, nor to a change', async () => {
    await pages.as('anonymous').get('/sites').set('Accept', 'application/json').expect(404);
    await pages.as('anonymous').send('post', '/sites').expect(404);
  });
});

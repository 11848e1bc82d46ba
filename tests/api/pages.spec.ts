import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { brotliCompressSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { TestServer } from './test-server';

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
      expect(response.headers['content-type']).toBe('text/html; charset=utf-8');
    },
  );

  it('list no folder', async () => {
    for (const path of ['/media', '/media/']) expect((await open(path).expect(200)).text).toContain('<app-root');
  });

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
      expect(policy).toContain("connect-src 'self';");
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

  it.each([
    '/main-GONE2345.js',
    '/media/none.woff2',
    '/../package.json',
    '/%2e%2e/package.json',
    '/.env',
    '/.git/config',
    '/server/src/main.ts',
  ])('a missing file is 404, never a page: %s', async (path) => {
    const response = await open(path);
    expect(response.status).toBe(404);
    expect(response.headers['content-type']).toContain('application/problem+json');
  });

  it('are not given to a script that asks for JSON, nor to a change', async () => {
    await pages.as('anonymous').get('/sites').set('Accept', 'application/json').expect(404);
    await pages.as('anonymous').send('post', '/sites').expect(404);
  });
});

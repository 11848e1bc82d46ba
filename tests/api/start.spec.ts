import { spawn, type ChildProcess } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { chmodSync, mkdtempSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readConfig } from '../../server/src/platform/config';

const ROOT = join(import.meta.dirname, '../..');
const SECRET = randomBytes(48).toString('base64');

let folder = '';
let children: ChildProcess[] = [];
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-start-'));
});
afterEach(() => {
  for (const child of children) child.kill('SIGKILL');
  children = [];
  rmSync(folder, { recursive: true, force: true });
});

interface Running {
  readonly child: ChildProcess;
  output(): string;
  /** The address it printed, once it listens. */
  address(): Promise<string>;
  ended(): Promise<number | null>;
}

function run(file: string, args: readonly string[], env: Record<string, string>, input?: string): Running {
  const child = spawn(process.execPath, ['--import', 'tsx', file, ...args], {
    cwd: ROOT,
    env: { PATH: process.env['PATH'] ?? '', RISEBACK_DB: join(folder, 'riseback.db'), PORT: '0', ...env },
  });
  children.push(child);
  let output = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk: Buffer) => (output += chunk.toString()));
  const exit = new Promise<number | null>((resolve) => child.once('close', resolve));
  child.stdin.end(input ?? '');
  return {
    child,
    output: () => output,
    ended: () => exit,
    address: () =>
      new Promise((resolve, reject) => {
        const look = setInterval(() => {
          const address = /^Riseback: (http\S+)$/m.exec(output)?.[1];
          if (address === undefined) return;
          clearInterval(look);
          resolve(address);
        }, 20);
        void exit.then((code) => {
          clearInterval(look);
          reject(new Error(`ended with ${String(code)}: ${output}`));
        });
      }),
  };
}
const serve = (env: Record<string, string>) => run('server/src/main.ts', [], env);

describe('settings', () => {
  const production = { NODE_ENV: 'production', RISEBACK_DB: ':memory:', RISEBACK_SESSION_SECRET: SECRET };

  it('have defaults that serve one machine only', () => {
    const config = readConfig({ RISEBACK_DB: join(folder, 'a.db') });
    expect(config).toMatchObject({
      port: 4310,
      host: '127.0.0.1',
      production: false,
      trustProxy: false,
      origin: undefined,
    });
    expect(statSync(join(folder, 'session-secret')).mode & 0o777).toBe(0o600);
    expect(readConfig({ RISEBACK_DB: join(folder, 'a.db') }).sessionSecret).toBe(config.sessionSecret);
  });

  it.each([
    ['PORT', 'many'],
    ['PORT', '70000'],
    ['NODE_ENV', 'prod'],
    ['RISEBACK_ORIGIN', 'riseback.example'],
    ['RISEBACK_ORIGIN', 'https://riseback.example/path'],
    ['RISEBACK_ORIGIN', 'http://riseback.example'],
    ['TRUST_PROXY', 'true'],
    ['TRUST_PROXY', 'everyone'],
    ['RISEBACK_SESSION_SECRET', ''],
    ['RISEBACK_SESSION_SECRET', 'short'],
    ['RISEBACK_SESSION_SECRET', 'abcabcabcabcabcabcabcabcabcabcabcabcabc'],
    ['RISEBACK_REQUESTS_PER_MINUTE', '0'],
  ])('%s = %j stops the start with its name', (name, value) => {
    expect(() => readConfig({ ...production, [name]: value })).toThrow(name);
  });

  it('that open it to other machines need the origin people use', () => {
    expect(() => readConfig({ ...production, HOST: '0.0.0.0' })).toThrow('RISEBACK_ORIGIN');
    const config = readConfig({ ...production, HOST: '0.0.0.0', RISEBACK_ORIGIN: 'https://riseback.example/' });
    expect(config.origin?.origin).toBe('https://riseback.example');
  });

  it('never show a secret in the message', () => {
    expect(() => readConfig({ ...production, RISEBACK_SESSION_SECRET: 'hunter2hunter2' })).not.toThrow('hunter2');
  });

  it('take the secret from a file that only its owner may read', () => {
    const file = join(folder, 'secret');
    writeFileSync(file, `${SECRET}\n`, { mode: 0o600 });
    const fromFile = { NODE_ENV: 'production', RISEBACK_DB: ':memory:', RISEBACK_SESSION_SECRET_FILE: file };
    expect(readConfig(fromFile).sessionSecret).toBe(SECRET);
    chmodSync(file, 0o644);
    expect(() => readConfig(fromFile)).toThrow('chmod 600');
    expect(() => readConfig({ ...fromFile, RISEBACK_SESSION_SECRET: SECRET })).toThrow('both set');
    expect(() => readConfig({ ...fromFile, RISEBACK_SESSION_SECRET_FILE: join(folder, 'none') })).toThrow(
      'cannot be read',
    );
  });
});

describe('production', () => {
  it('does not start without a secret, and says which setting is missing', async () => {
    const server = serve({ NODE_ENV: 'production' });
    expect(await server.ended()).toBe(1);
    expect(server.output()).toContain('RISEBACK_SESSION_SECRET');
    expect(server.output()).not.toContain('    at ');
  });

  it('seeds nobody, says how to make the first administrator, who then signs in', async () => {
    const env = { NODE_ENV: 'production', RISEBACK_SESSION_SECRET: SECRET };
    const server = serve(env);
    const address = await server.address();
    expect(server.output()).toContain('npm run first-administrator -- EMAIL "NAME" "SITE"');
    expect(server.output()).toContain('No mail is sent: name a mail server in RISEBACK_SMTP_URL.');
    expect(server.output()).not.toContain('demo');
    const signIn = (email: string, password: string) =>
      fetch(`${address}/api/session`, {
        method: 'POST',
        headers: { 'Content-Type': 'application/json' },
        body: JSON.stringify({ email, password }),
      });
    expect((await signIn('admin@ternquay.example', 'demo-tern-quay')).status).toBe(401);

    const command = 'server/commands/first-administrator.ts';
    const person = ['ada@plant.example', 'Ada Quill', 'North Works'];
    const weak = run(command, person, {}, 'short\n');
    expect(await weak.ended()).toBe(1);
    expect(weak.output()).toContain('at least 12');
    const made = run(command, person, {}, 'seven green valves hum\n');
    expect(await made.ended(), made.output()).toBe(0);
    const again = run(command, ['eve@plant.example', 'Eve Marsh', 'North Works'], {}, 'seven green valves hum\n');
    expect(await again.ended()).toBe(1);
    expect(again.output()).toContain('has an administrator already');

    const signedIn = await signIn('ada@plant.example', 'seven green valves hum');
    expect(signedIn.status).toBe(200);
    const cookie = signedIn.headers
      .getSetCookie()
      .map((text) => text.split(';')[0])
      .join('; ');
    const sites = (await (await fetch(`${address}/api/sites`, { headers: { cookie } })).json()) as object[];
    expect(sites).toMatchObject([{ name: 'North Works', role: 'administrator' }]);
  });

  it('refuses a database with the demo people in it', async () => {
    const demo = serve({});
    await demo.address();
    expect(demo.output()).toContain('designer@ternquay.example');
    demo.child.kill('SIGTERM');
    expect(await demo.ended()).toBe(0);
    const server = serve({ NODE_ENV: 'production', RISEBACK_SESSION_SECRET: SECRET });
    expect(await server.ended()).toBe(1);
    expect(server.output()).toContain('demo people');
  });
});

describe('the process', () => {
  it('answers what it has begun when told to stop, lets nobody keep it waiting, and ends with 0', async () => {
    const server = serve({});
    const address = await server.address();
    const signingIn = fetch(`${address}/api/session`, {
      method: 'POST',
      headers: { 'Content-Type': 'application/json' },
      body: JSON.stringify({ email: 'viewer@ternquay.example', password: 'demo-tern-quay' }),
    });
    // Long enough to have arrived, short against the hash it waits for.
    await new Promise((resolve) => setTimeout(resolve, 60));
    const toldAt = performance.now();
    server.child.kill('SIGTERM');
    expect((await signingIn).status).toBe(200);
    expect(await server.ended()).toBe(0);
    expect(performance.now() - toldAt).toBeLessThan(10_000);
  });

  it('does not serve a database that another serves, until that one is gone, even killed', async () => {
    const first = serve({});
    await first.address();
    const second = serve({});
    expect(await second.ended()).toBe(1);
    expect(second.output()).toContain('Another Riseback serves the database');
    first.child.kill('SIGKILL');
    await first.ended();
    await serve({}).address();
  });

  it('says which port is taken', async () => {
    const first = serve({});
    const port = new URL(await first.address()).port;
    const second = serve({ PORT: port, RISEBACK_DB: join(folder, 'other.db') });
    expect(await second.ended()).toBe(1);
    expect(second.output()).toContain(port);
    expect(second.output()).not.toContain('    at ');
  });
});

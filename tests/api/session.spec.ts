import { hkdfSync } from 'node:crypto';
import { hashSync } from 'bcryptjs';
import { eq } from 'drizzle-orm';
import jwt from 'jsonwebtoken';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { PeopleRepository } from '../../server/src/people/people-repository';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { audit, people } from '../../server/src/platform/db/schema';
import { Client, HOST, TestServer } from './test-server';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const PASSWORD = 'four plain words here';
/** bcrypt's cheapest cost: what is tested is not how slow it is. */
const CHEAP_HASH = hashSync(PASSWORD, 4);

let server: TestServer;
beforeEach(() => {
  server = new TestServer();
});
afterEach(() => {
  server.close();
});

function signIn(email: string, password: string): request.Test {
  return request(server.app.handler).post('/api/session').set('Host', HOST).send({ email, password });
}

function cookiesOf(response: request.Response): string[] {
  return (response.headers['set-cookie'] ?? []) as unknown as string[];
}

describe('signing in', () => {
  beforeEach(() => {
    server.addPerson('ines', CHEAP_HASH);
  });

  it('gives one strict, script-proof session cookie and a readable proof, and says who it is', async () => {
    const response = await signIn('Ines@TernQuay.example ', PASSWORD).expect(200);
    expect(response.body).toEqual({
      person: {
        id: 'ines',
        name: 'ines',
        email: 'ines@ternquay.example',
        units: 'us',
        theme: 'system',
        timeZone: 'UTC',
        unwantedMails: [],
      },
    });
    const [session = '', proof = '', ...more] = cookiesOf(response);
    expect(more).toEqual([]);
    expect(session).toMatch(/^riseback-session=[\w.-]+; /);
    expect(session).toContain('HttpOnly');
    expect(session).toContain('SameSite=Strict');
    expect(session).toContain('Path=/');
    expect(session).not.toContain('Domain');
    expect(proof).toMatch(/^XSRF-TOKEN=[\w-]+; /);
    expect(proof).not.toContain('HttpOnly');

    const cookie = [session, proof].map((text) => text.split(';')[0]).join('; ');
    const who = await request(server.app.handler)
      .get('/api/session')
      .set('Host', HOST)
      .set('Cookie', cookie)
      .expect(200);
    expect(who.body).toEqual(response.body);
  });

  it('over https uses the __Host- name and Secure', async () => {
    server.close();
    server = new TestServer({ config: { origin: new URL('https://riseback.example') } });
    server.addPerson('ines', CHEAP_HASH);
    const [session = ''] = cookiesOf(await signIn('ines@ternquay.example', PASSWORD).expect(200));
    expect(session).toMatch(/^__Host-riseback-session=/);
    expect(session).toContain('Secure');
  });

  it('says the same of a wrong password, an unknown account, a disabled person and a password bcrypt would cut', async () => {
    server.addPerson('gone', CHEAP_HASH);
    server.db.update(people).set({ disabledAt: server.now().toISOString() }).where(eq(people.id, 'gone')).run();
    const long = 'x'.repeat(72);
    server.addPerson('long', hashSync(long, 4));
    const answers = await Promise.all([
      signIn('ines@ternquay.example', 'not the password'),
      signIn('nobody@ternquay.example', PASSWORD),
      signIn('gone@ternquay.example', PASSWORD),
      signIn('long@ternquay.example', `${long} and more`),
    ]);
    const bodies = answers.map(({ status, body }) => ({ status, ...(body as object), instance: '' }));
    for (const body of bodies) expect(body).toEqual(bodies[0]);
    expect(bodies[0]?.status).toBe(401);
    for (const answer of answers) expect(cookiesOf(answer)).toEqual([]);
  });

  it('ends the session that the browser held until then, and only once it has succeeded', async () => {
    const former = server.as('viewer');
    const other = server.as('viewer');
    const alive = async (client: Client) => (await client.get('/api/session')).status === 200;
    await signIn('ines@ternquay.example', 'wrong')
      .set('Cookie', former.cookie ?? '')
      .expect(401);
    expect(await alive(former)).toBe(true);
    await signIn('ines@ternquay.example', PASSWORD)
      .set('Cookie', former.cookie ?? '')
      .expect(200);
    expect([await alive(former), await alive(other)]).toEqual([false, true]);
    expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  });

  it('spends a full hash on an unknown account too', async () => {
    const start = performance.now();
    await signIn('nobody@ternquay.example', PASSWORD).expect(401);
    // Cost 12 takes hundreds of milliseconds anywhere; answering without it takes a few.
    expect(performance.now() - start).toBeGreaterThan(60);
  });

  it('writes sessions into the audit log, whose chain holds', async () => {
    const client = new Client(server, server.session('ines'));
    await client.send('delete', '/api/session').expect(204);
    const rows = server.db.select().from(audit).all();
    expect(rows.map(({ action, personId }) => ({ action, personId }))).toEqual([
      { action: 'session.start', personId: 'ines' },
      { action: 'session.end', personId: 'ines' },
    ]);
    expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  });
});

describe('guessing', () => {
  beforeEach(() => {
    server.addPerson('ines', CHEAP_HASH);
  });
  const guess = (address: string, password = 'wrong') =>
    signIn('ines@ternquay.example', password).set('X-Forwarded-For', address);

  it('is slowed down with 429 and Retry-After, for that account from that address only', async () => {
    server.close();
    server = new TestServer({ config: { trustProxy: 1 } });
    server.addPerson('ines', CHEAP_HASH);
    server.addPerson('tomas', CHEAP_HASH);
    for (let i = 0; i < 5; i += 1) await guess('192.0.2.7').expect(401);
    const refused = await guess('192.0.2.7', PASSWORD).expect(429);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    // The owner's other device, and another person behind the guesser's address, are not concerned.
    await guess('192.0.2.8', PASSWORD).expect(200);
    await signIn('tomas@ternquay.example', PASSWORD).set('X-Forwarded-For', '192.0.2.7').expect(200);

    server.pass(3_000);
    await guess('192.0.2.7').expect(401);
    server.pass(3_000);
    // Each further failure doubles the wait.
    await guess('192.0.2.7', PASSWORD).expect(429);
    server.pass(2_000);
    await guess('192.0.2.7', PASSWORD).expect(200);
    await guess('192.0.2.7').expect(401);
  });

  it('gains nothing from sending guesses all at once, nor from an invented X-Forwarded-For', async () => {
    const answers = await Promise.all(Array.from({ length: 20 }, (_, i) => guess(`192.0.2.${String(i)}`)));
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(5);
    expect(answers.filter(({ status }) => status === 429)).toHaveLength(15);
  });
});

describe('a session', () => {
  const alive = async (client: Client) => (await client.get('/api/session')).status === 200;

  it('ends after twelve idle hours, though its token may be fresh', async () => {
    const client = server.as('viewer');
    server.pass(12 * HOUR - 1_000);
    expect(await alive(client)).toBe(true);
    server.pass(2_000);
    // The renewed token went to the browser; this client kept the old one.
    expect(await alive(client)).toBe(false);
  });

  it('is renewed when its token is older than five minutes, and ends after seven days all the same', async () => {
    const client = server.as('viewer');
    server.pass(4 * MINUTE);
    expect(cookiesOf(await client.get('/api/session').expect(200))).toEqual([]);
    let cookie = client.cookie ?? '';
    for (let hours = 0; hours < 7 * 24 - 1; hours += 6) {
      server.pass(6 * HOUR);
      const response = await request(server.app.handler).get('/api/session').set('Host', HOST).set('Cookie', cookie);
      if (hours + 6 >= 7 * 24) {
        expect(response.status).toBe(401);
        return;
      }
      expect(response.status).toBe(200);
      cookie = cookiesOf(response)[0]?.split(';')[0] ?? '';
      expect(cookie).toMatch(/^riseback-session=./);
    }
    expect.unreachable('the session outlived seven days');
  });

  it('that was signed out is dead wherever its cookie went', async () => {
    const client = server.as('viewer');
    const response = await client.send('delete', '/api/session').expect(204);
    for (const cookie of cookiesOf(response)) expect(cookie).toContain('Expires=Thu, 01 Jan 1970');
    expect(await alive(client)).toBe(false);
  });

  it('dies at a new password, a changed role and disabling', async () => {
    const repository = new PeopleRepository(server.db);
    const entry = (action: string) => ({ at: server.now(), action, subject: 'viewer' });
    const changes: (() => void)[] = [
      () => repository.changePassword('viewer', { to: CHEAP_HASH }, entry('person.password')),
      () => repository.giveRole('viewer', server.siteId, 'designer', null, entry('person.role')),
      () => repository.disable('viewer', entry('person.disable')),
    ];
    for (const change of changes) {
      const client = server.as('viewer');
      expect(await alive(client)).toBe(true);
      server.pass(1_000);
      change();
      expect(await alive(client)).toBe(false);
      server.pass(1_000);
    }
    expect(await alive(server.as('viewer'))).toBe(false);
  });

  it('is not taken from a token with another signature, algorithm or audience', async () => {
    const { issued } = server.as('viewer');
    const answerTo = async (token: string) => {
      const cookie = `riseback-session=${token}`;
      return (await request(server.app.handler).get('/api/session').set('Host', HOST).set('Cookie', cookie)).status;
    };
    const [header = '', payload = '', signature = ''] = (issued?.token ?? '').split('.');
    const unsigned = Buffer.from(JSON.stringify({ alg: 'none', typ: 'JWT' })).toString('base64url');
    const forged = [
      `${unsigned}.${payload}.`,
      `${header}.${payload}.${signature.slice(0, -4)}AAAA`,
      `${header}.${payload}`,
      'x',
    ];
    for (const token of forged) expect(await answerTo(token), token).toBe(401);

    // Signed by the right key, as only a leak or another use of the key could make them.
    const key = Buffer.from(hkdfSync('sha256', server.config.sessionSecret, 'riseback', 'session token', 32));
    const second = Math.floor(server.now().getTime() / 1000);
    const claims = { sid: issued?.sessionId, iat: second, exp: second + 60 };
    const sign = (algorithm: 'HS256' | 'HS512', audience: string) => jwt.sign(claims, key, { algorithm, audience });
    expect(await answerTo(sign('HS256', 'riseback-session'))).toBe(200);
    expect(await answerTo(sign('HS512', 'riseback-session'))).toBe(401);
    expect(await answerTo(sign('HS256', 'something-else'))).toBe(401);
  });

  it('is listed to its owner, who can end another of them but nobody else’s', async () => {
    const here = server.as('viewer');
    const there = server.as('viewer');
    const other = server.as('designer');
    const list = (await here.get('/api/own-sessions').expect(200)).body as { id: string; current: boolean }[];
    expect(list).toHaveLength(2);
    expect(list.filter(({ current }) => current).map(({ id }) => id)).toEqual([here.issued?.sessionId]);
    await here.send('delete', `/api/own-sessions/${other.issued?.sessionId ?? ''}`).expect(404);
    expect(await alive(other)).toBe(true);
    await here.send('delete', `/api/own-sessions/${there.issued?.sessionId ?? ''}`).expect(204);
    expect(await alive(there)).toBe(false);
    expect(await alive(here)).toBe(true);
  });
});

describe('the profile', () => {
  it('takes a name, which the log remembers, and refuses one that plays tricks on those who read it', async () => {
    const client = server.as('viewer');
    const changed = await client.send('patch', '/api/profile').send({ name: '  Nóra Ács-Őri ' }).expect(200);
    expect(changed.body).toMatchObject({ name: 'Nóra Ács-Őri' });
    await client.send('patch', '/api/profile').send({ name: 'Nóra Ács-Őri', units: 'si' }).expect(200);
    const renamings = server.db.select().from(audit).where(eq(audit.action, 'person.rename')).all();
    expect(renamings).toMatchObject([{ personId: 'viewer', details: { from: 'viewer', to: 'Nóra Ács-Őri' } }]);
    for (const name of ['', '   ', 'x'.repeat(81), 'two\nlines', 'turned \u202e round']) {
      const refused = await client.send('patch', '/api/profile').send({ name }).expect(400);
      expect(refused.body).toMatchObject({ errors: [{ pointer: '/name' }] });
    }
  });

  it('takes units, theme and a known time zone, and refuses others with the pointer', async () => {
    const client = server.as('viewer');
    const changed = await client
      .send('patch', '/api/profile')
      .send({ units: 'si', timeZone: 'Europe/Lisbon' })
      .expect(200);
    expect(changed.body).toMatchObject({ units: 'si', theme: 'system', timeZone: 'Europe/Lisbon' });
    const zone = await client.send('patch', '/api/profile').send({ timeZone: 'Mars/Olympus' }).expect(400);
    expect(zone.body).toMatchObject({ errors: [{ pointer: '/timeZone' }] });
    // What is not one's own to choose is no key of the contract.
    for (const [key, value] of Object.entries({
      email: 'x@y.example',
      administersInstallation: true,
      id: 'designer',
    })) {
      const refused = await client
        .send('patch', '/api/profile')
        .send({ [key]: value })
        .expect(400);
      expect(refused.body).toMatchObject({ errors: [{ pointer: `/${key}` }] });
    }
  });
});

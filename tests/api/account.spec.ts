import { asc, eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { PasswordThreads } from '../../server/src/platform/auth/password-threads';
import { Passwords } from '../../server/src/platform/auth/passwords';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { audit, people } from '../../server/src/platform/db/schema';
import { addInes, MINUTE, NotingHasher, PASSWORD, signIn } from './account-people';
import { Client, TestServer } from './test-server';

const NEW = 'tall gulls eat my lunch';

let hasher: NotingHasher;
let server: TestServer;
let ines: Client;
beforeEach(() => {
  hasher = new NotingHasher();
  server = new TestServer({ hasher, config: { trustProxy: 1 } });
  ines = addInes(server);
});
afterEach(() => {
  server.close();
});

const change = (client: Client, body: object, address = '192.0.2.1') =>
  client.send('post', '/api/password').set('X-Forwarded-For', address).send(body);
const alive = async (client: Client) => (await client.get('/api/session')).status === 200;
const logged = (action: string) =>
  server.db.select().from(audit).where(eq(audit.action, action)).orderBy(asc(audit.seq)).all();

describe('changing one’s password', () => {
  it('asks for the present one, ends every session and gives this browser a new one', async () => {
    const elsewhere = new Client(server, server.session('ines'));
    server.pass(1_000);
    const answer = await change(ines, { presentPassword: PASSWORD, newPassword: NEW }).expect(200);
    expect(answer.body).toMatchObject({ person: { id: 'ines' } });
    expect(await alive(elsewhere)).toBe(false);
    // A copy of this session's own cookie is worth nothing either: the browser goes on in another session.
    expect(await alive(ines)).toBe(false);
    const cookies = answer.headers['set-cookie'] as unknown as string[];
    const cookie = cookies.map((text) => text.split(';')[0]).join('; ');
    const who = await server.as('anonymous').get('/api/session').set('Cookie', cookie).expect(200);
    expect(who.body).toMatchObject({ person: { id: 'ines' } });

    await signIn(server, { password: PASSWORD }).expect(401);
    await signIn(server, { password: NEW }).expect(200);
    expect(logged('person.password')).toMatchObject([{ personId: 'ines', sessionId: ines.issued?.sessionId }]);
    expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  });

  it('is refused with a wrong present one, which counts as a guess like those at sign-in', async () => {
    for (let i = 0; i < 5; i += 1) {
      const refused = await change(ines, { presentPassword: `guess ${String(i)}`, newPassword: NEW }).expect(422);
      expect(refused.body).toMatchObject({ errors: [{ pointer: '/presentPassword' }] });
    }
    const waiting = await change(ines, { presentPassword: PASSWORD, newPassword: NEW }).expect(429);
    expect(Number(waiting.headers['retry-after'])).toBeGreaterThan(0);
    await signIn(server, {}).expect(429);
    // Not so from another address: whoever guesses here does not lock the owner out there.
    await signIn(server, {}, '192.0.2.2').expect(200);
    expect(await alive(ines)).toBe(true);
    expect(logged('person.refuse').map(({ details }) => (details as { why: string }).why)).toEqual([
      ...Array.from({ length: 5 }, () => 'wrongPassword'),
      'tooManyAttempts',
    ]);
  });

  it.each([
    ['short', 'at least 12'],
    ['x'.repeat(73), 'bytes long at most'],
    ['password1234', 'among the first'],
    ['ines ternquay 2026', 'among the first'],
    [PASSWORD, 'the password you have'],
  ])('is refused for %j, with the pointer and the reason, and no hash is spent', async (newPassword, reason) => {
    const refused = await change(ines, { presentPassword: PASSWORD, newPassword }).expect(400);
    expect(refused.body).toMatchObject({
      errors: [{ pointer: '/newPassword', detail: expect.stringContaining(reason) as string }],
    });
    expect(hasher.compared).toEqual([]);
  });

  it.each(['   spaces   at both ends   ', 'кошка ест тёплый хлеб', '水曜日は山へ行く', 'gulls 🐟🐟 at the quay'])(
    'takes %j, and signs in with it',
    async (newPassword) => {
      await change(ines, { presentPassword: PASSWORD, newPassword }).expect(200);
      await signIn(server, { password: newPassword }).expect(200);
      await signIn(server, { password: newPassword.trim().slice(1) }).expect(401);
    },
  );

  it('takes an accent as the same however a keyboard writes it', async () => {
    await change(ines, { presentPassword: PASSWORD, newPassword: 'un caf\u00e9 tr\u00e8s chaud' }).expect(200);
    await signIn(server, { password: 'un cafe\u0301 tre\u0300s chaud' }).expect(200);
  });

  it('by two at once lets one win and tells the other', async () => {
    const other = new Client(server, server.session('ines'));
    const compare = hasher.matches.bind(hasher);
    let bothCompared = (): void => undefined;
    const both = new Promise<void>((resolve) => (bothCompared = resolve));
    hasher.matches = async (text, hash) => {
      const same = await compare(text, hash);
      if (hasher.compared.length === 2) bothCompared();
      await both;
      return same;
    };
    const answers = await Promise.all([
      change(ines, { presentPassword: PASSWORD, newPassword: NEW }, '192.0.2.1'),
      change(other, { presentPassword: PASSWORD, newPassword: `${NEW} too` }, '192.0.2.2'),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
    expect(logged('person.password')).toHaveLength(1);
  });
});

describe('signing in while the password changes', () => {
  it('does not let in who gave the old one', async () => {
    const slow = hasher.matches.bind(hasher);
    hasher.matches = async (text, hash) => {
      const same = await slow(text, hash);
      server.db
        .update(people)
        .set({ passwordHash: `noted:${NEW}` })
        .where(eq(people.id, 'ines'))
        .run();
      return same;
    };
    await signIn(server, {}).expect(401);
  });
});

describe('an unknown account', () => {
  it('costs as many hashes, of the same cost, and as many rows of the log as a known one', async () => {
    const before = server.db.select().from(audit).all().length;
    await signIn(server, { password: 'not it' }).expect(401);
    await signIn(server, { email: 'nobody@ternquay.example', password: 'not it' }).expect(401);
    await signIn(server, { password: 'x'.repeat(100) }).expect(401);
    expect(hasher.compared).toHaveLength(3);
    const costs = hasher.compared.slice(1).map(({ hash }) => hash.slice(0, 7));
    expect(costs).toEqual(['$2b$12$', '$2b$12$']);
    expect((await new Passwords().hash('four plain words here')).slice(0, 7)).toBe('$2b$12$');
    expect(server.db.select().from(audit).all()).toHaveLength(before + 3);
  });
});

describe('attempts that are turned away', () => {
  const refusals = (why: string) =>
    logged('session.refuse').filter(({ details }) => (details as { why: string }).why === why);

  it('are logged once for each wait, and neither look at the password nor tell whether the account exists', async () => {
    for (const email of ['ines@ternquay.example', 'nobody@ternquay.example']) {
      for (let i = 0; i < 5; i += 1) await signIn(server, { email, password: 'guess' }).expect(401);
      const hashes = hasher.compared.length;
      const bodies = [];
      for (let i = 0; i < 30; i += 1) bodies.push((await signIn(server, { email }).expect(429)).body as object);
      expect(hasher.compared).toHaveLength(hashes);
      expect(bodies[0]).toMatchObject({ detail: 'Too many failed attempts. Wait a little, then try again.' });
    }
    expect(refusals('tooManyAttempts').map(({ subject }) => subject)).toEqual(['ines', 'unknown']);
    server.pass(3_000);
    await signIn(server, { password: 'guess' }).expect(401);
    for (let i = 0; i < 5; i += 1) await signIn(server, {}).expect(429);
    expect(refusals('tooManyAttempts')).toHaveLength(3);
  });

  it('come after fifty failures from one address over all accounts, also when sent at once', async () => {
    const compare = hasher.matches.bind(hasher);
    hasher.matches = async (text, hash) => {
      await new Promise((resolve) => setTimeout(resolve, 5));
      return compare(text, hash);
    };
    const guess = (i: number) => signIn(server, { email: `p${String(i)}@ternquay.example` }, '192.0.2.9');
    const answers = await Promise.all(Array.from({ length: 80 }, (_, i) => guess(i)));
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(50);
    expect(answers.filter(({ status }) => status === 429)).toHaveLength(30);
    await signIn(server, {}, '192.0.2.1').expect(200);
    server.pass(60 * MINUTE);
    await signIn(server, {}, '192.0.2.9').expect(200);
  });
});

describe('one’s other sessions', () => {
  it('are all ended at once, with a row of the log each, and nobody else’s', async () => {
    const others = [server.session('ines'), server.session('ines')].map((issued) => new Client(server, issued));
    const viewer = server.as('viewer');
    const answer = await ines.send('delete', '/api/own-sessions').expect(200);
    expect(answer.body).toEqual({ ended: 2 });
    for (const other of others) expect(await alive(other)).toBe(false);
    expect(await alive(ines)).toBe(true);
    expect(await alive(viewer)).toBe(true);
    expect(logged('session.end')).toHaveLength(2);
  });
});

describe('the threads that hash', () => {
  it('hash and compare as bcrypt does, and say so when they break', async () => {
    const reported: unknown[] = [];
    const threads = new PasswordThreads({ count: 2, report: (error) => reported.push(error) });
    const passwords = new Passwords(threads);
    const hash = await threads.hash('кошка', 4);
    expect(await threads.matches('кошка', hash)).toBe(true);
    expect(await threads.matches('кошки', hash)).toBe(false);
    expect(await passwords.matches('кошка', hash)).toBe(true);
    // A vector of bcrypt's authors: crypt_blowfish 1.3, wrapper.c, test_hashes, with the prefix $2b$.
    expect(await threads.matches('U*U', '$2b$05$CCCCCCCCCCCCCCCCCCCCC.E5YPO9kmyuRGyh0XouQYb4YMJKvyOeW')).toBe(true);
    await expect(threads.matches('x', undefined as never)).rejects.toThrow('hashing broke');
    expect(await threads.matches('кошка', hash)).toBe(true);
    await threads.close();
    await expect(threads.hash('x', 4)).rejects.toThrow('closed');
  });

  it('that end by themselves fail what they had in hand, and are started anew', async () => {
    const threads = new PasswordThreads({
      count: 1,
      workerUrl: new URL('data:text/javascript,process.exit(1)'),
      report: () => undefined,
    });
    await expect(threads.hash('x', 4)).rejects.toThrow('ended');
    await expect(threads.hash('x', 4)).rejects.toThrow('ended');
    await threads.close();
  });
});

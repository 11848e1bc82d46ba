import { eq } from 'drizzle-orm';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { audit, mails, memberships, oneTimeLinks, people } from '../../server/src/platform/db/schema';
import { addInes, codeAt, NotingHasher, PASSWORD, turnCodesOn } from './account-people';
import { TestPost, tokenIn } from './test-post';
import { HOST, TestServer, type Client } from './test-server';

const HOUR = 60 * 60_000;
const INES = 'ines@ternquay.example';
const NEW = 'seven green valves hum';

let server: TestServer;
let post: TestPost;
let ines: Client;
beforeEach(() => {
  server = new TestServer({ hasher: new NotingHasher(), config: { trustProxy: 1 } });
  post = new TestPost(server);
  ines = addInes(server);
});
afterEach(() => {
  expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  server.close();
});

const send = (path: string, body: object, address = '192.0.2.1') =>
  request(server.app.handler).post(path).set('Host', HOST).set('X-Forwarded-For', address).send(body);
const ask = (email = INES, address?: string) => send('/api/password-resets', { email }, address);
const complete = (token: string, more: object = {}) =>
  send('/api/password-resets/completion', { token, newPassword: NEW, ...more });
const signIn = (password: string, more: object = {}) => send('/api/session', { email: INES, password, ...more });
const alive = async (client: Client) => (await client.get('/api/session')).status === 200;
/** A reset asked for, and the token in its mail. */
async function asked(): Promise<string> {
  await ask().expect(202);
  return tokenIn(await post.mailTo(INES));
}
const actions = () =>
  server.db
    .select()
    .from(audit)
    .all()
    .map(({ action }) => action)
    .filter((action) => /^(reset|person)\./.test(action));

describe('a forgotten password', () => {
  it('is replaced by way of a mail, which ends every session', async () => {
    const token = await asked();
    const told = await send('/api/links', { token }).expect(200);
    expect(told.body).toEqual({ purpose: 'passwordReset', email: INES, expiresAt: '2026-03-03T08:00:00.000Z' });
    expect(await alive(ines)).toBe(true);
    server.pass(1);
    await complete(token).expect(204);
    expect(await alive(ines)).toBe(false);
    await signIn(PASSWORD).expect(401);
    await signIn(NEW).expect(200);
    expect(actions()).toEqual(['reset.ask', 'person.passwordReset']);
  });

  it('is replaced once by one link, also when it is used twenty times at once', async () => {
    const token = await asked();
    const answers = await Promise.all(Array.from({ length: 20 }, () => complete(token)));
    expect(answers.map(({ status }) => status).sort()).toEqual([204, ...Array.from({ length: 19 }, () => 404)]);
    await complete(token).expect(404);
  });

  it.each([
    { hours: 24 - 1 / 3600, status: 204 },
    { hours: 24, status: 404 },
  ])('is replaced within 24 hours: after $hours hours the answer is $status', async ({ hours, status }) => {
    const token = await asked();
    server.pass(hours * HOUR);
    await complete(token).expect(status);
  });

  it('is not replaced by an older link once a newer one was asked for', async () => {
    const first = await asked();
    const second = await asked();
    await complete(first).expect(404);
    await complete(second).expect(204);
  });

  it('is not replaced by a link from before it was changed in another way', async () => {
    const token = await asked();
    server.pass(1_000);
    await ines.post('/api/password', { presentPassword: PASSWORD, newPassword: 'otters like wide rivers' }).expect(200);
    await complete(token).expect(404);
    await signIn('otters like wide rivers').expect(200);
  });

  it('is not replaced for who was disabled meanwhile', async () => {
    const token = await asked();
    server.db.update(people).set({ disabledAt: server.now().toISOString() }).where(eq(people.id, 'ines')).run();
    await complete(token).expect(404);
    expect(server.db.select().from(people).where(eq(people.id, 'ines')).get()?.passwordHash).toBe(`noted:${PASSWORD}`);
  });

  it.each(['short', 'password1234', 'ines-ternquay-1', 'x'.repeat(73)])(
    'is not replaced by one that will not do, and the link still works: %s',
    async (newPassword) => {
      const token = await asked();
      const refused = await complete(token, { newPassword }).expect(400);
      expect(refused.body).toMatchObject({ errors: [{ pointer: '/newPassword' }] });
      await complete(token).expect(204);
    },
  );

  it('takes a code too where codes are on: a mailbox alone is not enough', async () => {
    const { secret, recoveryCodes } = await turnCodesOn(server, ines);
    const token = await asked();
    expect((await complete(token).expect(401)).body).toMatchObject({ type: '/problems/code-needed' });
    expect((await complete(token, { code: '000000' }).expect(401)).body).toMatchObject({
      type: '/problems/wrong-code',
    });
    await signIn(NEW).expect(401);
    await complete(token, { code: codeAt(secret, server.now()) }).expect(204);
    server.pass(60_000);
    await signIn(NEW, { code: codeAt(secret, server.now()) }).expect(200);
    server.pass(HOUR);
    await complete(await asked(), { code: recoveryCodes[0] ?? '' }).expect(204);
  });

  it('cannot be replaced by guessing codes', async () => {
    await turnCodesOn(server, ines);
    const token = await asked();
    const statuses: number[] = [];
    for (let i = 0; i < 25; i += 1) statuses.push((await complete(token, { code: String(100_000 + i) })).status);
    expect(statuses.slice(0, 20)).toEqual(Array.from({ length: 20 }, () => 401));
    expect(statuses.slice(20)).toEqual(Array.from({ length: 5 }, () => 429));
  });
});

describe('asking for a reset', () => {
  it('is answered alike, word for word and in the same time, whoever has an account', async () => {
    server.addPerson('gone');
    server.db.update(people).set({ disabledAt: server.now().toISOString() }).where(eq(people.id, 'gone')).run();
    const times = new Map<string, number>();
    const answers = [];
    // the first of all pays for what is loaded
    await ask('warm@ternquay.example');
    for (const email of [INES, 'nobody@ternquay.example', 'gone@ternquay.example', INES.toUpperCase()]) {
      const begun = performance.now();
      answers.push(await ask(email));
      times.set(email, performance.now() - begun);
    }
    for (const { status, text, headers } of answers) {
      expect({ status, text }).toEqual({ status: 202, text: '' });
      expect(Object.keys(headers)).toEqual(Object.keys(answers[0]?.headers as object));
    }
    // A quarter of a second each, whatever was done in it; without that, a hundredth.
    for (const [email, ms] of times) expect(ms, email).toBeGreaterThan(240);
    expect(server.db.select().from(mails).all()).toHaveLength(2);
  });

  it('writes as many rows of the log for an unknown address as for a known one, and not the address', async () => {
    const logged = () => server.db.select().from(audit).all().length;
    const before = logged();
    await ask();
    const known = logged() - before;
    await ask('typed-my-password-here@ternquay.example');
    expect(logged() - before - known).toBe(known);
    const details = JSON.stringify(server.db.select().from(audit).all());
    expect(details).not.toContain('typed-my-password');
  });

  it('is slowed down for an address, known or not, after five', async () => {
    for (const email of [INES, 'nobody@ternquay.example']) {
      for (let i = 0; i < 5; i += 1) await ask(email).expect(202);
      const refused = await ask(email).expect(429);
      expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
      expect((refused.body as { detail: string }).detail).toContain('Wait a little');
    }
    // signing in is not concerned
    await signIn(PASSWORD).expect(200);
  });

  it('fills nobody’s mailbox, from however many places', async () => {
    for (let i = 0; i < 12; i += 1) await ask(INES, `192.0.2.${String(i + 10)}`).expect(202);
    await post.sender.sendDue();
    expect(server.db.select().from(oneTimeLinks).all()).toHaveLength(5);
    server.pass(HOUR + 1);
    await ask(INES, '192.0.2.99').expect(202);
    expect(server.db.select().from(oneTimeLinks).all()).toHaveLength(6);
  });

  it('shows in the outbox of the site where the account is its alone, and of no other', async () => {
    const grantedAt = server.now().toISOString();
    const grant = (siteId: string) =>
      server.db.insert(memberships).values({ personId: 'ines', siteId, role: 'viewer', grantedAt }).run();
    grant(server.siteId);
    await ask().expect(202);
    grant(server.otherSiteId);
    await ask().expect(202);
    expect(
      server.db
        .select()
        .from(mails)
        .all()
        .map(({ siteId }) => siteId),
    ).toEqual([server.siteId, null]);
  });
});

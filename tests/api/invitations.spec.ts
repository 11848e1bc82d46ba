import type { Role } from '@riseback/contracts';
import { eq } from 'drizzle-orm';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { audit, memberships, oneTimeLinks, people } from '../../server/src/platform/db/schema';
import { codeAt, NotingHasher, PASSWORD, turnCodesOn } from './account-people';
import { TestPost, tokenIn } from './test-post';
import { Client, HOST, TestServer } from './test-server';

const HOUR = 60 * 60_000;
const NEWCOMER = 'lena.brock@works.example';
const GOOD = 'seven green valves hum';

let server: TestServer;
let post: TestPost;
beforeEach(() => {
  server = new TestServer({ hasher: new NotingHasher() });
  post = new TestPost(server);
});
afterEach(() => {
  expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  server.close();
});

const path = (rest = '') => `/api/sites/${server.siteId}/invitations${rest}`;
const invite = (email = NEWCOMER, role: Role = 'designer') => server.as('administrator').post(path(), { email, role });
const list = async () => (await server.as('administrator').get(path()).expect(200)).body as { id: string }[];
const anonymous = (address: string, body: object) =>
  request(server.app.handler).post(address).set('Host', HOST).send(body);
const ask = (token: string) => anonymous('/api/links', { token });
const accept = (token: string, more: object = {}) =>
  anonymous('/api/links/acceptance', { token, name: 'Lena Brock', password: GOOD, ...more });
const signIn = (email: string, password: string) => anonymous('/api/session', { email, password });
const rolesOf = (personId: string) =>
  server.db
    .select({ siteId: memberships.siteId, role: memberships.role, grantedBy: memberships.grantedBy })
    .from(memberships)
    .where(eq(memberships.personId, personId))
    .all();
const actions = () =>
  server.db
    .select()
    .from(audit)
    .all()
    .map(({ action }) => action)
    .filter((action) => !action.startsWith('session.'));
/** An invitation sent, and the token in its mail. */
async function invited(email = NEWCOMER, role: Role = 'designer'): Promise<string> {
  await invite(email, role).expect(201);
  return tokenIn(await post.mailTo(email));
}

describe('an invitation', () => {
  it('goes by mail, says who sent it, and makes an account with the role', async () => {
    const made = await invite().expect(201);
    expect(made.body).toMatchObject({
      email: NEWCOMER,
      role: 'designer',
      madeByName: 'administrator',
      expiresAt: '2026-03-03T08:00:00.000Z',
      expired: false,
    });
    const mail = await post.mailTo(NEWCOMER);
    expect(mail.subject).toBe('administrator invites you to site-a');
    const token = tokenIn(mail);
    expect((await ask(token).expect(200)).body).toEqual({
      purpose: 'invitation',
      email: NEWCOMER,
      siteName: 'site-a',
      role: 'designer',
      fromName: 'administrator',
      hasAccount: false,
      expiresAt: '2026-03-03T08:00:00.000Z',
    });
    await accept(token).expect(204);
    const signedIn = await signIn(NEWCOMER, GOOD).expect(200);
    const { person } = signedIn.body as { person: { id: string } };
    expect(person).toMatchObject({ name: 'Lena Brock', email: NEWCOMER });
    expect(rolesOf(person.id)).toEqual([{ siteId: server.siteId, role: 'designer', grantedBy: 'administrator' }]);
    expect(await list()).toEqual([]);
    expect(actions()).toEqual(['invitation.make', 'person.create', 'invitation.accept']);
  });

  it('works once, also when it is accepted twenty times at once', async () => {
    const token = await invited();
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, i) => accept(token, { name: `Lena ${String(i)}` })),
    );
    expect(answers.filter(({ status }) => status === 204)).toHaveLength(1);
    for (const { status } of answers) expect([204, 401, 404, 409, 429]).toContain(status);
    expect(server.db.select().from(people).where(eq(people.email, NEWCOMER)).all()).toHaveLength(1);
    await ask(token).expect(404);
    await accept(token).expect(404);
  });

  it.each([
    { hours: 24 - 1 / 3600, status: 200 },
    { hours: 24, status: 404 },
  ])('works for 24 hours: after $hours hours the answer is $status', async ({ hours, status }) => {
    const token = await invited();
    server.pass(hours * HOUR);
    await ask(token).expect(status);
    if (status === 404) await accept(token).expect(404);
  });

  it('says the same whatever is wrong with a link: unknown, used, withdrawn, too old, replaced', async () => {
    const used = await invited();
    await accept(used).expect(204);
    const withdrawn = await invited('two@works.example');
    await server
      .as('administrator')
      .send('delete', path(`/${(await list())[0]?.id ?? ''}`))
      .expect(204);
    const replaced = await invited('three@works.example');
    await server
      .as('administrator')
      .post(path(`/${(await list())[0]?.id ?? ''}/sending`), {})
      .expect(200);
    const tokens = ['A'.repeat(43), used, withdrawn, replaced];
    const answers = await Promise.all(tokens.flatMap((token) => [ask(token), accept(token)]));
    server.pass(25 * HOUR);
    answers.push(await ask(tokenIn(await lastMail('three@works.example'))));
    for (const { status, body } of answers) {
      expect(status).toBe(404);
      expect({ ...(body as object), instance: '' }).toEqual({ ...(answers[0]?.body as object), instance: '' });
    }
  });

  it('is sent again with a fresh link, also when its time is over', async () => {
    const first = await invited();
    server.pass(25 * HOUR);
    const [expired] = await list();
    expect(expired).toMatchObject({ expired: true });
    await server
      .as('administrator')
      .post(path(`/${expired?.id ?? ''}/sending`), {})
      .expect(200);
    const second = tokenIn(await post.mailTo(NEWCOMER));
    expect(second).not.toBe(first);
    await ask(first).expect(404);
    await accept(second).expect(204);
  });

  it('that was withdrawn before its mail went out is not sent any more', async () => {
    await invite().expect(201);
    await server
      .as('administrator')
      .send('delete', path(`/${(await list())[0]?.id ?? ''}`))
      .expect(204);
    await post.sender.sendDue();
    expect(post.sent).toEqual([]);
  });

  it('of an administrator who is none any more lets nobody in', async () => {
    server.db.update(memberships).set({ role: 'administrator' }).where(eq(memberships.personId, 'viewer')).run();
    await server.as('viewer').post(path(), { email: NEWCOMER, role: 'administrator' }).expect(201);
    const token = tokenIn(await post.mailTo(NEWCOMER));
    await ask(token).expect(200);
    await server
      .as('administrator')
      .send('put', `/api/sites/${server.siteId}/people/viewer`)
      .send({ role: 'viewer' })
      .expect(200);
    await ask(token).expect(404);
    await accept(token).expect(404);
  });

  it('is refused to who has a role here, and twice to the same address, however it is written', async () => {
    await invite('VIEWER@ternquay.example').expect(409);
    await invite().expect(201);
    await invite(NEWCOMER.toUpperCase()).expect(409);
    for (const email of ['not an address', 'a@b.example\r\nBcc: c@d.example', `${'x'.repeat(250)}@b.example`])
      await invite(email).expect(400);
  });

  it('says the same of an address with an account elsewhere as of one without', async () => {
    const known = await invite('outsider@ternquay.example').expect(201);
    const unknown = await invite('nobody@ternquay.example').expect(201);
    expect(Object.keys(known.body as object)).toEqual(Object.keys(unknown.body as object));
    const mails = await server.as('administrator').get(`/api/sites/${server.siteId}/mails`).expect(200);
    for (const mail of mails.body as object[]) expect(mail).not.toHaveProperty('recipientName');
  });

  it('is one of fifty an hour at most', async () => {
    for (let i = 0; i < 50; i += 1) await invite(`p${String(i)}@works.example`).expect(201);
    const refused = await invite('p51@works.example').expect(429);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    server.pass(HOUR + 1);
    await invite('p51@works.example').expect(201);
  });

  it('is the business of the site’s own administrators', async () => {
    await invite().expect(201);
    const [{ id } = { id: '' }] = await list();
    for (const who of ['designer', 'reviewer', 'commissioning', 'viewer'] as const)
      await server.as(who).post(path(), { email: 'x@works.example', role: 'administrator' }).expect(403);
    const theirs = `/api/sites/${server.otherSiteId}/invitations`;
    const outsider = server.as('outsider');
    expect((await outsider.get(theirs).expect(200)).body).toEqual([]);
    await outsider.send('delete', `${theirs}/${id}`).expect(404);
    await outsider.post(`${theirs}/${id}/sending`, {}).expect(404);
    expect(await list()).toHaveLength(1);
  });
});

describe('accepting', () => {
  it.each([
    { what: 'no name', body: { name: undefined }, pointer: '/name' },
    { what: 'a short password', body: { password: 'short' }, pointer: '/password' },
    { what: 'a password of one’s own name', body: { password: 'lenabrock2026' }, pointer: '/password' },
    { what: 'a common password', body: { password: 'password1234' }, pointer: '/password' },
  ])('with $what is refused, and the link still works', async ({ body, pointer }) => {
    const token = await invited();
    const refused = await accept(token, body).expect(400);
    expect(refused.body).toMatchObject({ errors: [{ pointer }] });
    await accept(token).expect(204);
  });

  it('with an account takes its own password, and no other', async () => {
    server.addPerson('ines', `noted:${PASSWORD}`);
    const token = await invited('ines@ternquay.example', 'reviewer');
    expect((await ask(token).expect(200)).body).toMatchObject({ hasAccount: true });
    await accept(token, { password: GOOD }).expect(401);
    expect(rolesOf('ines')).toEqual([]);
    await accept(token, { password: PASSWORD, name: 'Somebody Else' }).expect(204);
    expect(rolesOf('ines')).toEqual([{ siteId: server.siteId, role: 'reviewer', grantedBy: 'administrator' }]);
    expect(server.db.select().from(people).where(eq(people.id, 'ines')).get()?.name).toBe('ines');
  });

  it('asks for a code where the account has codes', async () => {
    server.addPerson('ines', `noted:${PASSWORD}`);
    const { secret } = await turnCodesOn(server, new Client(server, server.session('ines')));
    const token = await invited('ines@ternquay.example');
    const needed = await accept(token, { password: PASSWORD }).expect(401);
    expect(needed.body).toMatchObject({ type: '/problems/code-needed' });
    const wrong = await accept(token, { password: PASSWORD, code: '000000' }).expect(401);
    expect(wrong.body).toMatchObject({ type: '/problems/wrong-code' });
    await accept(token, { password: PASSWORD, code: codeAt(secret, server.now()) }).expect(204);
  });

  it('lets nobody guess the password of an account, nor who is disabled come in', async () => {
    server.addPerson('ines', `noted:${PASSWORD}`);
    const token = await invited('ines@ternquay.example');
    for (let i = 0; i < 5; i += 1) await accept(token, { password: `wrong ${String(i)}` }).expect(401);
    await accept(token, { password: PASSWORD }).expect(429);
    server.pass(HOUR);
    server.db.update(people).set({ disabledAt: server.now().toISOString() }).where(eq(people.id, 'ines')).run();
    await accept(token, { password: PASSWORD }).expect(401);
    expect(rolesOf('ines')).toEqual([]);
  });

  it('changes no role that somebody was given meanwhile', async () => {
    server.addPerson('ines', `noted:${PASSWORD}`);
    const token = await invited('ines@ternquay.example', 'administrator');
    const grantedAt = server.now().toISOString();
    server.db.insert(memberships).values({ personId: 'ines', siteId: server.siteId, role: 'viewer', grantedAt }).run();
    await accept(token, { password: PASSWORD }).expect(409);
    expect(rolesOf('ines')).toMatchObject([{ role: 'viewer' }]);
  });
});

describe('a token', () => {
  it('stands nowhere in the database or the log, and cannot be planted there', async () => {
    const token = await invited();
    await ask(token).expect(200);
    const tables = server.db.$client.prepare("select name from sqlite_schema where type = 'table'").all();
    for (const { name } of tables as { name: string }[])
      expect(JSON.stringify(server.db.$client.prepare(`select * from "${name}"`).all()), name).not.toContain(token);
    expect(server.log.join('')).not.toContain(token);

    // Who can write to the database, and knows how tokens are hashed, but has not the secret.
    const planted = 'P'.repeat(43);
    const { createHash } = await import('node:crypto');
    const tokenHash = createHash('sha256').update(planted).digest('hex');
    server.db.update(oneTimeLinks).set({ tokenHash, role: 'administrator' }).run();
    await ask(planted).expect(404);
    await accept(planted).expect(404);
    await ask(token).expect(404);
  });

  it('of one purpose does not serve the other', async () => {
    server.addPerson('ines', `noted:${PASSWORD}`);
    const invitation = await invited('ines@ternquay.example');
    await anonymous('/api/password-resets/completion', { token: invitation, newPassword: GOOD }).expect(404);
    await anonymous('/api/password-resets', { email: 'ines@ternquay.example' }).expect(202);
    const reset = tokenIn(await post.mailTo('ines@ternquay.example'));
    await accept(reset, { password: PASSWORD }).expect(404);
    await signIn('ines@ternquay.example', PASSWORD).expect(200);
    for (const token of [invitation, reset]) await ask(token).expect(200);
  });
});

async function lastMail(email: string) {
  await post.sender.sendDue();
  return post.transport.lastTo(email);
}

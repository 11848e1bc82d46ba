import type { Role } from '@riseback/contracts';
import { and, eq } from 'drizzle-orm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { PeopleRepository } from '../../server/src/people/people-repository';
import { SitePeopleRepository } from '../../server/src/people/site-people-repository';
import { SitePeopleService } from '../../server/src/people/site-people-service';
import { AccessRules, type SiteAccess } from '../../server/src/platform/auth/access';
import { MembershipRepository } from '../../server/src/platform/auth/membership-repository';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { audit, memberships, people } from '../../server/src/platform/db/schema';
import { addInes, NotingHasher, PASSWORD, signIn, turnCodesOn } from './account-people';
import { TestPost } from './test-post';
import { Client, TestServer } from './test-server';

let server: TestServer;
beforeEach(() => {
  server = new TestServer({ hasher: new NotingHasher() });
});
afterEach(() => {
  expect(firstBrokenAuditRow(server.db)).toBeUndefined();
  server.close();
});

const at = (path: string) => `/api/sites/${server.siteId}/${path}`;
const person = (id: string, act = '') => at(`people/${id}${act === '' ? '' : `/${act}`}`);
const alive = async (client: Client) => (await client.get('/api/session')).status === 200;
const grant = (personId: string, siteId: string, role: Role) =>
  server.db.insert(memberships).values({ personId, siteId, role, grantedAt: server.now().toISOString() }).run();
const roleOf = (personId: string, siteId = server.siteId) =>
  server.db
    .select()
    .from(memberships)
    .where(and(eq(memberships.personId, personId), eq(memberships.siteId, siteId)))
    .get()?.role;
/** What the log says was done, after the sessions that the test itself began. */
const logged = () =>
  server.db
    .select()
    .from(audit)
    .all()
    .filter(({ action }) => !action.startsWith('session.'))
    .map(({ action, personId, siteId, subject, details }) => ({ action, personId, siteId, subject, details }));
const byAdministrator = () => ({ personId: 'administrator', siteId: server.siteId });

describe('the people of a site', () => {
  it('are listed to its administrators, with when they were last seen and what is whose alone', async () => {
    grant('viewer', server.otherSiteId, 'viewer');
    const administrator = server.as('administrator');
    server.pass(60_000);
    const ines = addInes(server);
    grant('ines', server.siteId, 'designer');
    await turnCodesOn(server, ines);
    const list = (await administrator.get(at('people')).expect(200)).body as { id: string }[];
    expect(list.map(({ id }) => id)).toEqual([
      'administrator',
      'commissioning',
      'designer',
      'ines',
      'reviewer',
      'viewer',
    ]);
    const of = (id: string) => list.find((one) => one.id === id);
    expect(of('administrator')).toMatchObject({ seenAt: '2026-03-02T08:00:00.000Z', onlyHere: true });
    expect(of('ines')).toMatchObject({
      email: 'ines@ternquay.example',
      role: 'designer',
      seenAt: '2026-03-02T08:01:00.000Z',
      codesOn: true,
    });
    expect(of('viewer')).toMatchObject({ onlyHere: false, codesOn: false });
    expect(of('viewer')).not.toHaveProperty('seenAt');
    expect(JSON.stringify(list)).not.toMatch(/hash|outsider|stranger/i);
  });

  it('are named to everybody there, without addresses and without who is disabled', async () => {
    await server.as('administrator').post(person('reviewer', 'disabling'), {}).expect(200);
    const names = (await server.as('viewer').get(at('names')).expect(200)).body as object[];
    expect(names).toEqual(
      ['administrator', 'commissioning', 'designer', 'viewer'].map((id) => ({ id, name: id, role: id })),
    );
  });
});

describe('a role', () => {
  it('is changed, which ends the sessions of the person and is in the log', async () => {
    const viewer = server.as('viewer');
    const other = server.as('designer');
    const changed = await server
      .as('administrator')
      .send('put', person('viewer'))
      .send({ role: 'designer' })
      .expect(200);
    expect(changed.body).toMatchObject({ id: 'viewer', role: 'designer', grantedByName: 'administrator' });
    expect([await alive(viewer), await alive(other)]).toEqual([false, true]);
    const details = { from: 'viewer', to: 'designer' };
    expect(logged()).toEqual([{ action: 'role.change', ...byAdministrator(), subject: 'viewer', details }]);
  });

  it('that is the same already changes nothing', async () => {
    const viewer = server.as('viewer');
    await server.as('administrator').send('put', person('viewer')).send({ role: 'viewer' }).expect(200);
    expect(await alive(viewer)).toBe(true);
    expect(logged()).toEqual([]);
  });

  it('is taken away, which ends the sessions', async () => {
    const viewer = server.as('viewer');
    await server.as('administrator').send('delete', person('viewer')).expect(204);
    expect(await alive(viewer)).toBe(false);
    expect(roleOf('viewer')).toBeUndefined();
    await server.as('viewer').get(at('names')).expect(404);
    const details = { role: 'viewer' };
    expect(logged()).toEqual([{ action: 'role.take', ...byAdministrator(), subject: 'viewer', details }]);
  });

  it('of one’s own is nobody’s to change', async () => {
    grant('stranger', server.siteId, 'administrator');
    const self = server.as('administrator');
    for (const answer of [
      await self.send('put', person('administrator')).send({ role: 'viewer' }),
      await self.send('delete', person('administrator')),
      await self.post(person('administrator', 'disabling'), {}),
      await self.post(person('administrator', 'codes-off'), {}),
    ])
      expect(answer.status).toBe(409);
    expect(await alive(self)).toBe(true);
    expect(logged()).toEqual([]);
  });

  // Two administrators at the same moment: each had passed the door before the other's change.
  it.each([
    {
      what: 'lowered',
      change: (service: SitePeopleService, by: SiteAccess) => service.changeRole(by, 'stranger', 'viewer'),
    },
    { what: 'taken', change: (service: SitePeopleService, by: SiteAccess) => service.takeRole(by, 'stranger') },
    { what: 'disabled', change: (service: SitePeopleService, by: SiteAccess) => service.disable(by, 'stranger') },
  ])('of the last administrator is not $what, with the remedy', ({ change }) => {
    grant('stranger', server.siteId, 'administrator');
    const rules = new AccessRules(new MembershipRepository(server.db));
    const signedIn = (id: string) => ({
      id,
      name: id,
      email: `${id}@ternquay.example`,
      sessionId: server.session(id).sessionId,
    });
    const byFirst = rules.site(signedIn('administrator'), server.siteId, ['people']);
    const bySecond = rules.site(signedIn('stranger'), server.siteId, ['people']);
    const unused = undefined as never;
    const rows = new SitePeopleRepository(server.db);
    const service = new SitePeopleService(rows, new PeopleRepository(server.db), unused, unused, () => server.now());
    service.disable(bySecond, 'administrator');
    expect(() => change(service, byFirst)).toThrow('Make somebody else an administrator first');
    expect(roleOf('stranger')).toBe('administrator');
    server.db.update(memberships).set({ role: 'administrator' }).where(eq(memberships.personId, 'viewer')).run();
    change(service, byFirst);
  });

  it('is given by administrators of that site alone, to people of that site alone', async () => {
    for (const who of ['viewer', 'designer', 'reviewer', 'commissioning'] as const)
      await server.as(who).send('put', person('viewer')).send({ role: 'administrator' }).expect(403);
    await server.as('outsider').send('put', person('viewer')).send({ role: 'administrator' }).expect(404);
    for (const nobodyHere of ['outsider', 'stranger', 'no-such-person']) {
      const answers = [
        await server.as('administrator').send('put', person(nobodyHere)).send({ role: 'viewer' }),
        await server.as('administrator').send('delete', person(nobodyHere)),
        ...(await Promise.all(
          ['disabling', 'enabling', 'password-reset', 'codes-off'].map((act) =>
            server.as('administrator').post(person(nobodyHere, act), {}),
          ),
        )),
      ];
      const bodies = answers.map(({ body }) => ({ ...(body as object), instance: '' }));
      expect(answers.map(({ status }) => status)).toEqual([404, 404, 404, 404, 404, 404]);
      for (const body of bodies) expect(body).toEqual(bodies[0]);
    }
    expect(logged()).toEqual([]);
  });
});

describe('an account', () => {
  beforeEach(() => {
    server.addPerson('ines', `noted:${PASSWORD}`);
    grant('ines', server.siteId, 'designer');
  });

  it('is disabled, at once and for every session, and enabled again', async () => {
    const ines = addSession('ines');
    const administrator = server.as('administrator');
    const disabled = await administrator.post(person('ines', 'disabling'), {}).expect(200);
    expect(disabled.body).toMatchObject({ disabledAt: server.now().toISOString() });
    await signIn(server, {}).expect(401);
    expect(await alive(ines)).toBe(false);
    await administrator.post(person('ines', 'disabling'), {}).expect(200);
    const enabled = await administrator.post(person('ines', 'enabling'), {}).expect(200);
    expect(enabled.body).not.toHaveProperty('disabledAt');
    await signIn(server, {}).expect(200);
    const own = { ...byAdministrator(), subject: 'ines', details: {} };
    expect(logged().filter(({ action }) => action.startsWith('person.'))).toEqual([
      { action: 'person.disable', ...own },
      { action: 'person.enable', ...own },
    ]);
  });

  it.each(['disabling', 'enabling', 'codes-off'])(
    'that is also another site’s, or the installation’s administrator’s, is left alone: %s',
    async (act) => {
      const administrator = server.as('administrator');
      grant('ines', server.otherSiteId, 'viewer');
      server.db.update(people).set({ administersInstallation: true }).where(eq(people.id, 'designer')).run();
      for (const id of ['ines', 'designer']) {
        const refused = await administrator.post(person(id, act), {}).expect(409);
        expect((refused.body as { detail: string }).detail).toContain('Take the role here away instead');
      }
      expect(logged()).toEqual([]);
    },
  );

  it('whose codes were lost is signed in to with the password alone again, and its sessions end', async () => {
    const ines = addSession('ines');
    await turnCodesOn(server, ines);
    await signIn(server, {}).expect(401);
    const off = await server.as('administrator').post(person('ines', 'codes-off'), {}).expect(200);
    expect(off.body).toMatchObject({ codesOn: false });
    expect(await alive(ines)).toBe(false);
    await signIn(server, {}).expect(200);
    const [entry] = logged().filter(({ action }) => action === 'codes.off');
    expect(entry).toEqual({
      action: 'codes.off',
      ...byAdministrator(),
      subject: 'ines',
      details: { byAdministrator: true },
    });
    await server.as('administrator').post(person('ines', 'codes-off'), {}).expect(409);
  });

  it('gets a link to choose a password, which says who sends it, five times an hour at most', async () => {
    const post = new TestPost(server);
    const administrator = server.as('administrator');
    for (let i = 0; i < 5; i += 1) await administrator.post(person('ines', 'password-reset'), {}).expect(202);
    const refused = await administrator.post(person('ines', 'password-reset'), {}).expect(429);
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    const mail = await post.mailTo('ines@ternquay.example');
    expect(mail.text).toContain('administrator, who administers your site');
    expect(logged().map(({ action }) => action)).toEqual(Array.from({ length: 5 }, () => 'reset.send'));
    // Of five links, the one that counts: those before it were withdrawn, and are not even sent.
    expect(post.sent).toHaveLength(1);
  });

  it('that is disabled gets no such link', async () => {
    await server.as('administrator').post(person('ines', 'disabling'), {}).expect(200);
    await server.as('administrator').post(person('ines', 'password-reset'), {}).expect(409);
  });
});

function addSession(id: string): Client {
  return new Client(server, server.session(id));
}

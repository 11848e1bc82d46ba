import type { AuditPage, AuditRecord } from '@riseback/contracts';
import { parse } from 'csv-parse/sync';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Passwords } from '../../server/src/platform/auth/passwords';
import { appendAudit } from '../../server/src/platform/db/audit';
import { makeNetwork } from './network-samples';
import { Client, TestServer } from './test-server';

const PASSWORD = 'seven green valves hum';
const server = new TestServer();
const path = `/api/sites/${server.siteId}/audit`;
const administrator = server.as('administrator');
let networkId = '';
beforeAll(async () => {
  server.addPerson('known', await new Passwords().hash(PASSWORD));
  const at = server.now().toISOString();
  server.db.$client.prepare("insert into memberships values ('known', ?, 'viewer', null, ?)").run(server.siteId, at);
  networkId = await makeNetwork(server.as('designer'), server.siteId);
  await makeNetwork(server.as('outsider'), server.otherSiteId);
});
afterAll(() => {
  server.close();
});

async function page(query = ''): Promise<AuditPage> {
  return (await administrator.get(`${path}${query}`).expect(200)).body as AuditPage;
}
const signIn = (email: string, password: string) => server.as('anonymous').post('/api/session', { email, password });

describe('the log of a site', () => {
  it('is for its administrators', async () => {
    for (const who of ['viewer', 'commissioning', 'designer', 'reviewer'] as const)
      await server.as(who).get(path).expect(403);
    await server.as('outsider').get(path).expect(404);
    await server.as('anonymous').get(path).expect(401);
  });

  it('tells who did what at this site and nothing of another', async () => {
    const { entries } = await page();
    const made = entries.filter(({ action }) => action === 'network.create');
    expect(made).toMatchObject([{ subject: networkId, personId: 'designer', personName: 'designer' }]);
    expect(entries.some(({ personId }) => personId === 'outsider')).toBe(false);
    expect(entries.map(({ seq }) => seq)).toEqual(entries.map(({ seq }) => seq).sort((a, b) => b - a));
  });

  it('can be filtered by time, person, action and subject', async () => {
    const { choices } = await page();
    expect(choices?.actions).toContain('network.create');
    expect(choices?.people).toContainEqual({ id: 'designer', name: 'designer' });
    expect((await page('?action=network.create&personId=designer')).entries.length).toBe(1);
    expect((await page(`?subject=${networkId}`)).entries.length).toBe(1);
    expect((await page('?personId=reviewer&action=network.create')).entries).toEqual([]);
    const now = server.now().toISOString();
    expect((await page(`?to=${now}`)).entries).toEqual([]);
    expect((await page(`?from=${now}`)).entries.length).toBeGreaterThan(0);
    await administrator.get(`${path}?form=x`).expect(400);
    await administrator.get(`${path}?from=yesterday`).expect(400);
    await administrator.get(`${path}?limit=100000`).expect(400);
  });

  it('goes on page by page and leaves nothing out', async () => {
    const all = (await page('?limit=500')).entries;
    const found: AuditRecord[] = [];
    for (let next = ''; ;) {
      const { entries, nextBefore, choices } = await page(`?limit=2${next}`);
      expect(choices === undefined).toBe(next !== '');
      found.push(...entries);
      if (nextBefore === undefined) break;
      next = `&before=${nextBefore}`;
    }
    expect(found).toEqual(all);
  });
});

describe('signing in', () => {
  it('that fails is in the log without what was typed, and so are a sign-in and its end', async () => {
    await signIn('known@ternquay.example', 'not the password').expect(401);
    await signIn('hunter2hunter2@ternquay.example', 'some password').expect(401);
    const answer = await signIn('known@ternquay.example', PASSWORD).expect(200);
    expect((answer.body as { person: { id: string } }).person.id).toBe('known');
    await new Client(server, server.session('known')).send('delete', '/api/session').expect(204);
    server.db.$client.exec("update people set disabled_at = '2026-01-01T00:00:00.000Z' where id = 'known'");
    await signIn('known@ternquay.example', PASSWORD).expect(401);
    const { entries } = await page('?personId=known');
    const told = entries.toReversed().map(({ action, details }) => [action, details['why']]);
    expect(told).toEqual([
      ['session.refuse', 'wrongPassword'],
      ['session.start', undefined],
      ['session.start', undefined],
      ['session.end', 'signedOut'],
      ['session.refuse', 'disabled'],
    ]);
    const whole = server.db.$client.prepare('select group_concat(details || subject) from audit').pluck().get();
    expect(whole).not.toContain('hunter2');
    expect(whole).toContain('unknownAccount');
  });
});

describe('the exported log', () => {
  beforeAll(() => {
    const { siteId } = server;
    for (let i = 0; i < 1_200; i += 1) {
      appendAudit(server.db, { at: server.now(), siteId, action: 'note', subject: i === 7 ? '=1+1' : `n${i}` });
    }
  });

  it('holds the same in both forms, oldest first, with the hashes', async () => {
    const json = await administrator.get(`${path}-export?format=json`).expect(200);
    const records = json.body as (AuditRecord & { hash: string })[];
    expect(records.length).toBeGreaterThan(1_200);
    expect(records.map(({ seq }) => seq)).toEqual(records.map(({ seq }) => seq).sort((a, b) => a - b));
    expect(records.every(({ hash }) => /^[0-9a-f]{64}$/.test(hash))).toBe(true);
    const csv = await administrator.get(`${path}-export?format=csv`).expect(200);
    expect(csv.headers['content-type']).toContain('text/csv');
    expect(csv.headers['content-disposition']).toContain('riseback-log.csv');
    const rows = parse(csv.text, { columns: true }) as Record<string, string>[];
    expect(rows.map((row) => Number(row['entry']))).toEqual(records.map(({ seq }) => seq));
    expect(rows.map((row) => row['hash'])).toEqual(records.map(({ hash }) => hash));
  });

  it('holds nothing that a spreadsheet would run', async () => {
    const csv = await administrator.get(`${path}-export?format=csv&action=note`).expect(200);
    expect(csv.text).toContain(",'=1+1,");
    expect(csv.text).not.toContain(',=1+1');
  });

  it('takes the same filters, and refuses what it does not know', async () => {
    const none = await administrator.get(`${path}-export?format=json&action=nothing`).expect(200);
    expect(none.body).toEqual([]);
    await administrator.get(`${path}-export?format=xlsx`).expect(400);
    await server.as('designer').get(`${path}-export?format=csv`).expect(403);
  });
});

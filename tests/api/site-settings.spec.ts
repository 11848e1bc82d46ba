import type { AuditPage, Problem, SiteSettings } from '@riseback/contracts';
import { beforeEach, describe, expect, it } from 'vitest';
import { type Client, TestServer } from './test-server';

let server: TestServer;
let path = '';
beforeEach(() => {
  server = new TestServer();
  path = `/api/sites/${server.siteId}/settings`;
});

const patch = (who: Client, body: object) => who.send('patch', path).send(body);
const settings = async (): Promise<SiteSettings> =>
  (await server.as('viewer').get(path).expect(200)).body as SiteSettings;

describe('the settings of a site', () => {
  it('begin with every limit at its default and no pattern', async () => {
    expect(await settings()).toEqual({
      atmosphericPressurePa: 101_325,
      ambientTemperatureK: 293.15,
      limits: {},
      tagPatterns: {},
    });
  });

  it('take what a change names and leave the rest', async () => {
    const designer = server.as('designer');
    await patch(designer, { limits: { velocity: { watchMS: 20 } }, tagPatterns: { trap: 'TR-###' } }).expect(200);
    const administrator = server.as('administrator');
    await patch(administrator, { limits: { velocity: { failMS: 30 } }, tagPatterns: { pipe: '*-##' } }).expect(200);
    await patch(administrator, { atmosphericPressurePa: 95_000 }).expect(200);
    expect(await settings()).toEqual({
      atmosphericPressurePa: 95_000,
      ambientTemperatureK: 293.15,
      limits: { velocity: { watchMS: 20, failMS: 30 } },
      tagPatterns: { trap: 'TR-###', pipe: '*-##' },
    });
  });

  it('give a limit back to its default and take a pattern away by null', async () => {
    const designer = server.as('designer');
    await patch(designer, { limits: { stall: { watchMargin: 0.2 } }, tagPatterns: { trap: 'TR-###' } }).expect(200);
    await patch(designer, { limits: { stall: { watchMargin: null } }, tagPatterns: { trap: null } }).expect(200);
    expect(await settings()).toMatchObject({ limits: {}, tagPatterns: {} });
  });

  it('refuse a limit that there is not and one out of range, naming the place', async () => {
    const designer = server.as('designer');
    const unknown = (await patch(designer, { limits: { velocity: { warnMS: 20 } } }).expect(400)).body as Problem;
    expect(unknown.errors?.[0]?.pointer).toMatch(/^\/limits\/velocity/);
    const low = (await patch(designer, { limits: { velocity: { watchMS: -1 } } }).expect(400)).body as Problem;
    expect(low.errors?.[0]?.pointer).toBe('/limits/velocity/watchMS');
    expect(await settings()).toMatchObject({ limits: {} });
  });

  it.each(['TR', 'TR-#-#', '**-#', 'TR-#######', 'TR-#\n', ''])('refuse the pattern %j', async (pattern) => {
    await patch(server.as('designer'), { tagPatterns: { trap: pattern } }).expect(400);
    expect(await settings()).toMatchObject({ tagPatterns: {} });
  });

  it('are not for whoever only reads, comments, reads gauges or signs', async () => {
    for (const who of ['viewer', 'commissioning', 'reviewer'] as const) {
      await patch(server.as(who), { ambientTemperatureK: 300 }).expect(403);
    }
    await patch(server.as('outsider'), { ambientTemperatureK: 300 }).expect(404);
  });

  it('stand in the log with what was changed, and not when nothing was', async () => {
    await patch(server.as('designer'), { ambientTemperatureK: 300 }).expect(200);
    await patch(server.as('designer'), { ambientTemperatureK: 300 }).expect(200);
    const log = await server.as('administrator').get(`/api/sites/${server.siteId}/audit?action=site.settings`);
    expect((log.body as AuditPage).entries).toMatchObject([
      { personName: 'designer', details: { ambientTemperatureK: 300 } },
    ]);
  });
});

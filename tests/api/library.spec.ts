import type { AuditPage, LibraryModel, Problem, SavedLibraryModel } from '@riseback/contracts';
import { ROLES, roleMay } from '@riseback/contracts';
import { beforeEach, describe, expect, it } from 'vitest';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { sendBatch, batchOf, makeNetwork, SMALL } from './network-samples';
import { TestServer, type Client } from './test-server';

const MARL: SavedLibraryModel = {
  name: 'Marl B15',
  trapType: 'invertedBucket',
  orificeDiameterM: 0.0032,
  maximumDifferentialPa: 1_034_000,
  bodyPressurePa: 1_800_000,
  bodyTemperatureK: 473.15,
  maximumBackPressureFraction: 0.9,
  capacity: [
    { differentialPa: 50_000, flowKgS: 0.06 },
    { differentialPa: 100_000, flowKgS: 0.08 },
  ],
};

let server: TestServer;
let designer: Client;
let path = '';
beforeEach(() => {
  server = new TestServer();
  designer = server.as('designer');
  path = `/api/sites/${server.siteId}/library`;
});

const add = async (model: SavedLibraryModel = MARL): Promise<LibraryModel> =>
  (await designer.post(path, model).expect(201)).body as LibraryModel;
const save = (client: Client, id: string, version: number, model: SavedLibraryModel) =>
  client
    .send('put', `${path}/${id}`)
    .set('If-Match', `"${String(version)}"`)
    .send(model);
const newest = async (id: string): Promise<LibraryModel> =>
  (await designer.get(`${path}/${id}`).expect(200)).body as LibraryModel;

describe('the trap library of a site', () => {
  it('begins empty and gives back what was added, with who and when', async () => {
    expect((await designer.get(path).expect(200)).body).toEqual([]);
    const response = await designer.post(path, MARL).expect(201);
    const model = response.body as LibraryModel;
    expect(model).toEqual({
      ...MARL,
      id: model.id,
      version: 1,
      createdBy: 'designer',
      createdAt: server.now().toISOString(),
    });
    expect(response.headers).toMatchObject({
      location: `${path}/${model.id}`,
      etag: '"1"',
    });
    expect((await server.as('viewer').get(path).expect(200)).body).toEqual([model]);
    expect(await newest(model.id)).toEqual(model);
  });

  it('keeps every version when a model is saved again', async () => {
    const first = await add();
    server.pass(60_000);
    const wider = { ...MARL, orificeDiameterM: 0.004 };
    const response = await save(server.as('administrator'), first.id, 1, wider).expect(200);
    expect(response.headers['etag']).toBe('"2"');
    expect(response.body).toMatchObject({
      ...wider,
      version: 2,
      createdBy: 'administrator',
    });
    const versions = (await designer.get(`${path}/${first.id}/versions`).expect(200)).body as LibraryModel[];
    expect(versions).toEqual([response.body, first]);
    expect((await designer.get(path)).body).toEqual([response.body]);
  });

  it('makes no version of a save that changes nothing', async () => {
    const first = await add();
    expect((await save(designer, first.id, 1, MARL).expect(200)).body).toEqual(first);
    expect((await designer.get(`${path}/${first.id}/versions`)).body).toHaveLength(1);
  });

  it('drops a key that a later version leaves out', async () => {
    const { id } = await add();
    const { capacity: _, ...without } = MARL;
    await save(designer, id, 1, without).expect(200);
    expect(await newest(id)).not.toHaveProperty('capacity');
  });

  it('retires a model and takes it back, each as a version', async () => {
    const { id } = await add();
    await save(designer, id, 1, { ...MARL, retired: true }).expect(200);
    expect(await newest(id)).toMatchObject({ version: 2, retired: true });
    await save(designer, id, 2, MARL).expect(200);
    expect(await newest(id)).not.toHaveProperty('retired');
  });

  it('has its rows changed and deleted by nobody', async () => {
    await add();
    const sqlite = server.db.$client;
    expect(() => sqlite.exec("update library_models set name = 'x'")).toThrow(/never changed/);
    expect(() => sqlite.exec('delete from library_models')).toThrow(/never deleted/);
  });
});

describe('two people at one model', () => {
  it('the later one gets 412 with what is there now, and loses nothing of theirs', async () => {
    const { id } = await add();
    await save(server.as('administrator'), id, 1, {
      ...MARL,
      name: 'Marl B15 mk 2',
    }).expect(200);
    const refused = await save(designer, id, 1, {
      ...MARL,
      orificeDiameterM: 0.005,
    }).expect(412);
    expect(refused.body).toMatchObject({
      type: '/problems/stale-version',
      currentVersion: 2,
      current: {
        id,
        version: 2,
        name: 'Marl B15 mk 2',
        createdBy: 'administrator',
      },
    });
    expect(await newest(id)).toMatchObject({ version: 2 });
  });

  it('of fifty at once on one version exactly one wins', async () => {
    const { id } = await add();
    const answers = await Promise.all(
      Array.from({ length: 50 }, (_, i) => save(designer, id, 1, { ...MARL, orificeDiameterM: 0.004 + i * 1e-5 })),
    );
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 412)).toHaveLength(49);
    expect(await newest(id)).toMatchObject({ version: 2 });
  });

  it('a save says which version it was made on', async () => {
    const { id } = await add();
    await designer.send('put', `${path}/${id}`).send(MARL).expect(428);
    await designer.send('put', `${path}/${id}`).set('If-Match', '*').send(MARL).expect(400);
  });
});

describe('what is refused', () => {
  it('a name that another model has, unless one of them is retired', async () => {
    const { id } = await add();
    const refused = await designer.post(path, { ...MARL, name: 'MARL b15' }).expect(409);
    expect((refused.body as Problem).detail).toContain('another name');
    await save(designer, id, 1, { ...MARL, retired: true }).expect(200);
    await add();
    await save(designer, id, 2, MARL).expect(409);
  });

  it.each<[string, object, string]>([
    ['a misspelt key', { ...MARL, orifice: 3 }, '/orifice'],
    ['no name', { ...MARL, name: ' ' }, '/name'],
    ['points out of order', { ...MARL, capacity: MARL.capacity?.toReversed() }, '/capacity'],
    ['a capacity of nothing', { ...MARL, capacity: [{ differentialPa: 1, flowKgS: 0 }] }, '/capacity/0/flowKgS'],
    ['an id of its own', { ...MARL, id: 'M1' }, '/id'],
  ])('%s, with its place', async (_what, body, pointer) => {
    const refused = await designer.post(path, body).expect(400);
    expect((refused.body as Problem).errors).toEqual([expect.objectContaining({ pointer })]);
    expect((await designer.get(path)).body).toEqual([]);
  });

  it('a model of another site, as if it did not exist', async () => {
    const { id } = await add();
    const elsewhere = `/api/sites/${server.otherSiteId}/library/${id}`;
    const outsider = server.as('outsider');
    await outsider.get(elsewhere).expect(404);
    await outsider.get(`${elsewhere}/versions`).expect(404);
    await outsider.send('put', elsewhere).set('If-Match', '"1"').send(MARL).expect(404);
    await outsider.get(path).expect(404);
    await server.as('stranger').get(path).expect(404);
  });

  it.each(ROLES)('a change by someone who may not draw: %s', async (role) => {
    const may = roleMay(role, 'draw');
    const client = server.as(role);
    await client.get(path).expect(200);
    await client.post(path, { ...MARL, name: `by ${role}` }).expect(may ? 201 : 403);
    const { id } = await add();
    await save(client, id, 1, { ...MARL, retired: true }).expect(may ? 200 : 403);
  });
});

describe('the log', () => {
  it('tells each step in the transaction that made it', async () => {
    const { id } = await add();
    await save(designer, id, 1, { ...MARL, orificeDiameterM: 0.004 });
    await save(designer, id, 2, {
      ...MARL,
      orificeDiameterM: 0.004,
      retired: true,
    });
    await save(designer, id, 3, { ...MARL, orificeDiameterM: 0.004 });
    const { entries } = (
      await server.as('administrator').get(`/api/sites/${server.siteId}/audit?subject=${id}`).expect(200)
    ).body as AuditPage;
    expect(entries.map(({ action, details }) => [action, details['version']])).toEqual([
      ['library.reinstate', 4],
      ['library.retire', 3],
      ['library.save', 2],
      ['library.add', 1],
    ]);
    expect(entries[0]?.details['name']).toBe('Marl B15');
  });

  it('and the model stand or fall together', async () => {
    server.db.$client.exec(
      "create trigger full before insert on audit begin select raise(abort, 'the log is full'); end",
    );
    await designer.post(path, MARL).expect(500);
    expect((await designer.get(path)).body).toEqual([]);
  });
});

describe('a network’s copy', () => {
  it('keeps where it came from through storing, undo and other edits; the file does not tell', async () => {
    const model = await add();
    const networkId = await makeNetwork(designer, server.siteId, SMALL);
    const copy = {
      id: 'M1',
      name: model.name,
      capacity: model.capacity,
      libraryId: model.id,
      libraryVersion: 1,
    };
    const take = batchOf([
      { op: 'add', in: 'trapModels', ordinal: 0, value: copy },
      { op: 'set', in: 'nodes', id: 'T1', key: 'trapModel', to: 'M1' },
    ]);
    await sendBatch(designer, networkId, 1, take).expect(200);
    const rename = batchOf([
      {
        op: 'set',
        in: 'trapModels',
        id: 'M1',
        key: 'name',
        from: model.name,
        to: 'Ours',
      },
    ]);
    await sendBatch(designer, networkId, 2, rename).expect(200);
    const row = server.db.$client
      .prepare('select name, library_id, library_version, properties from trap_models')
      .get();
    expect(row).toEqual({
      name: 'Ours',
      library_id: model.id,
      library_version: 1,
      properties: JSON.stringify({ capacity: model.capacity }),
    });
    // read anew: the server itself answers from memory
    const document = new NetworkRepository(server.db).document(networkId);
    expect(document?.trapModels.get('M1')?.value).toEqual({
      ...copy,
      name: 'Ours',
    });
    const file = (await designer.get(`/api/networks/${networkId}/file`).expect(200)).body as { trapModels: object[] };
    expect(file.trapModels).toEqual([{ id: 'M1', name: 'Ours', capacity: model.capacity }]);
  });
});

import { createHash } from 'node:crypto';
import { gzipSync } from 'node:zlib';
import {
  type AuditPage,
  type NetworkPlan,
  PLAN_LIMITS,
  type Problem,
  ROLES,
  roleMay,
  type StalePlan,
} from '@riseback/contracts';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { contentHash } from '../../server/src/platform/db/content-hash';
import { jpegOf, pngClaiming, pngOf } from '../fixtures/images';
import { EventReader, listening } from './event-reader';
import { makeNetwork } from './network-samples';
import { type Client, TestServer } from './test-server';

let server: TestServer;
let designer: Client;
let path = '';
beforeEach(async () => {
  server = new TestServer();
  designer = server.as('designer');
  path = `/api/networks/${await makeNetwork(designer, server.siteId)}/plan`;
});
afterEach(() => {
  server.close();
});

const PNG = pngOf(3, 2);
const PLACED = { x: -40, y: 20.5, unitsPerPixel: 0.75, metresPerUnit: 0.05, opacity: 0.4 };

interface Sent {
  readonly by?: Client;
  readonly version?: number;
  readonly type?: string;
  readonly query?: string;
}
function upload(content: Buffer, { by = designer, version = 0, type = 'image/png', query = '' }: Sent = {}) {
  const request = by.send('put', `${path}/image${query}`).set('If-Match', `"${String(version)}"`);
  return request.set('Content-Type', type).send(content);
}
const place = (placement: object, version: number, by = designer) =>
  by
    .send('put', path)
    .set('If-Match', `"${String(version)}"`)
    .send(placement);
const remove = (version: number, by = designer) => by.send('delete', path).set('If-Match', `"${String(version)}"`);
const planOf = ({ body }: { body: unknown }) => body as NetworkPlan;
const read = async (by = designer) => (await by.get(path).expect(200)).body as NetworkPlan;
const imageOf = ({ plan }: NetworkPlan) => `${path}/image/${plan?.fileId ?? ''}`;
const detailOf = (response: { body: unknown }) => (response.body as Problem).detail ?? '';
const countOf = (table: 'files' | 'plans') => server.db.$client.prepare(`select count(*) from ${table}`).pluck().get();

describe('the plan under a drawing', () => {
  it('is none at first, and what was put there is given back byte for byte, with who put it there', async () => {
    expect(await read()).toEqual({ version: 0 });
    const response = await upload(PNG, { query: '?name=Hall%20ground%20floor.png&x=10&y=-20&unitsPerPixel=2' }).expect(
      200,
    );
    expect(response.headers['etag']).toBe('"1"');
    const stored = await read(server.as('viewer'));
    expect(stored).toEqual(response.body);
    expect(stored).toMatchObject({
      version: 1,
      plan: { name: 'Hall ground floor.png', mediaType: 'image/png', widthPx: 3, heightPx: 2, sizeBytes: PNG.length },
    });
    expect(stored.plan).toMatchObject({ x: 10, y: -20, unitsPerPixel: 2, opacity: 0.5, uploadedBy: 'designer' });
    const image = await server.as('viewer').get(imageOf(stored)).expect(200);
    expect(image.headers['content-type']).toBe('image/png');
    expect(Buffer.compare(image.body as Buffer, PNG)).toBe(0);
  });

  it('may be a JPEG, whose size is read from its frame and not from what stands before it', async () => {
    const stored = planOf(await upload(jpegOf(), { type: 'image/jpeg' }).expect(200));
    expect(stored.plan).toMatchObject({ mediaType: 'image/jpeg', widthPx: 8, heightPx: 8 });
  });

  it('is served as what it is and nothing else, under a name made anew, and never stored on the way', async () => {
    const stored = planOf(
      await upload(PNG, { query: `?name=${encodeURIComponent('a"; filename=b.html')}` }).expect(200),
    );
    const { headers } = await server.as('viewer').get(imageOf(stored)).expect(200);
    expect(headers['content-disposition']).toBe('inline; filename="plan.png"');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['cache-control']).toBe('no-store');
    expect(headers['cross-origin-resource-policy']).toBe('same-origin');
  });

  it('keeps nothing of what hangs behind the end of the image', async () => {
    const stored = planOf(await upload(Buffer.concat([PNG, Buffer.from('<script>')])).expect(200));
    expect(stored.plan?.sizeBytes).toBe(PNG.length);
    const turned = await upload(Buffer.concat([jpegOf(), Buffer.alloc(999, 7)]), { version: 1, type: 'image/jpeg' });
    expect((turned.body as NetworkPlan).plan?.sizeBytes).toBe(jpegOf().length);
  });

  it('is placed, and another image takes its place with all that was set; the one before is gone', async () => {
    const first = (await upload(PNG).expect(200)).body as NetworkPlan;
    const placed = await place(PLACED, 1).expect(200);
    expect((placed.body as NetworkPlan).plan).toMatchObject(PLACED);
    const second = (await upload(pngOf(9, 9), { version: 2 }).expect(200)).body as NetworkPlan;
    expect(second).toMatchObject({ version: 3, plan: { ...PLACED, widthPx: 9 } });
    await designer.get(imageOf(first)).expect(404);
    expect(countOf('files')).toBe(1);
  });

  it('loses its scale when that is taken out', async () => {
    await upload(PNG).expect(200);
    await place(PLACED, 1).expect(200);
    const { metresPerUnit: _scale, ...without } = PLACED;
    expect((await place(without, 2).expect(200)).body).not.toHaveProperty('plan.metresPerUnit');
  });

  it('is taken away with its image, and versions go on after it', async () => {
    const there = (await upload(PNG).expect(200)).body as NetworkPlan;
    const stored = planOf(await remove(1).expect(200));
    expect(stored).toEqual({ version: 2 });
    expect(await read()).toEqual({ version: 2 });
    await designer.get(imageOf(there)).expect(404);
    expect([countOf('files'), countOf('plans')]).toEqual([0, 1]);
    await remove(2).expect(404);
    await place(PLACED, 2).expect(404);
    await upload(PNG, { version: 1 }).expect(412);
    expect((await upload(PNG, { version: 2 }).expect(200)).body).toMatchObject({ version: 3 });
  });

  it('touches neither the network’s version nor a single element', async () => {
    const network = path.replace('/plan', '');
    const before = (await designer.get(network).expect(200)).text;
    await upload(PNG).expect(200);
    await place(PLACED, 1).expect(200);
    expect((await designer.get(network).expect(200)).text).toBe(before);
  });

  it('belongs to what a backup holds', async () => {
    const before = contentHash(server.db.$client);
    await upload(PNG).expect(200);
    expect(contentHash(server.db.$client)).not.toBe(before);
  });
});

describe('a file that cannot be a plan', () => {
  const svg = Buffer.from('<?xml version="1.0"?><svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>');
  it.each([
    { name: 'an SVG called a PNG', content: svg, says: 'It is an SVG' },
    { name: 'a page called a PNG', content: Buffer.from('<!doctype html><script>'), says: 'It is a page' },
    { name: 'a PDF called a PNG', content: Buffer.from('%PDF-1.7\n'), says: 'It is a PDF' },
    { name: 'a GIF called a PNG', content: Buffer.from('GIF89a\u0001\0\u0001\0'), says: 'It is a GIF' },
    { name: 'nothing at all', content: Buffer.alloc(0), says: 'It is empty' },
    { name: 'a JPEG called a PNG', content: jpegOf(), says: 'says image/png, but this is a JPEG' },
  ])('is refused by its content: $name', async ({ content, says }) => {
    const response = await upload(content).expect(415);
    expect(detailOf(response)).toContain(says);
    expect(countOf('files')).toBe(0);
  });

  it.each(['image/svg+xml', 'application/pdf', 'application/json', 'text/html', 'multipart/form-data; boundary=x'])(
    'is refused by its header before it is read: %s',
    async (type) => {
      const response = await upload(PNG, { type }).expect(415);
      expect(detailOf(response)).toContain('image/png or image/jpeg');
    },
  );

  it.each([
    { type: 'image/png', whole: pngOf(40, 40, (x, y) => (x * y) % 256) },
    { type: 'image/jpeg', whole: jpegOf() },
  ])('is refused when it is cut off anywhere: $type', async ({ type, whole }) => {
    for (let end = 0; end < whole.length; end += Math.max(1, Math.floor(whole.length / 25))) {
      const { status } = await upload(whole.subarray(0, end), { type });
      expect([415, 422], String(end)).toContain(status);
    }
    expect(detailOf(await upload(whole.subarray(0, -1), { type }).expect(422))).toContain('not whole');
    await upload(whole, { type }).expect(200);
  });

  it('is refused when its head is nonsense or holds no picture', async () => {
    const spoilt = Buffer.from(PNG);
    spoilt.writeUInt8(77, 8 + 8 + 9);
    expect(detailOf(await upload(spoilt).expect(422))).toContain('head of this PNG');
    const empty = Buffer.concat([PNG.subarray(0, 33), PNG.subarray(-12)]);
    expect(detailOf(await upload(empty).expect(422))).toContain('no picture');
    await upload(pngClaiming(0, 5)).expect(422);
    await upload(Buffer.from([0xff, 0xd8, 0xff, 0xd9]), { type: 'image/jpeg' }).expect(422);
  });

  it('is refused with more pixels than a browser should unpack, however few its bytes', async () => {
    expect(detailOf(await upload(pngClaiming(8_000, 5_001)).expect(422))).toContain('8000 by 5001 pixels');
    await upload(pngClaiming(PLAN_LIMITS.sidePx + 1, 1)).expect(422);
    await upload(pngClaiming(8_000, 5_000)).expect(200);
  });

  it('is refused when it is too large, packed or not', async () => {
    const large = Buffer.concat([PNG, Buffer.alloc(PLAN_LIMITS.bytes)]);
    expect(detailOf(await upload(large).expect(413))).toContain('8 MB');
    const packed = designer.send('put', `${path}/image`).set('If-Match', '"0"').set('Content-Encoding', 'gzip');
    await packed.set('Content-Type', 'image/png').send(gzipSync(large)).expect(413);
    expect(countOf('files')).toBe(0);
  });

  it.each(['../../etc/passwd', 'C:\\plans\\hall.png', 'a\nb', '\u202egnp.exe', ' ', 'n'.repeat(121)])(
    'is refused for a name that is more than a name: %j',
    async (name) => {
      const { errors } = (await upload(PNG, { query: `?name=${encodeURIComponent(name)}` }).expect(400))
        .body as Problem;
      expect(new Set(errors?.map(({ pointer }) => pointer))).toEqual(new Set(['name']));
    },
  );

  it.each(['x=1e9', 'y=NaN', 'unitsPerPixel=0', 'unitsPerPixel=-1', 'x=1&x=2'])(
    'is refused at a place like %s',
    async (query) => {
      await upload(PNG, { query: `?${query}` }).expect(400);
    },
  );
});

describe('who may', () => {
  it.each(ROLES)('%s sees the plan, and changes it only with the permission to draw', async (role) => {
    const there = (await upload(PNG).expect(200)).body as NetworkPlan;
    const client = server.as(role);
    expect(await read(client)).toEqual(there);
    await client.get(imageOf(there)).expect(200);
    const expected = roleMay(role, 'draw') ? 200 : 403;
    await place(PLACED, 1, client).expect(expected);
    await upload(PNG, { by: client, version: expected === 200 ? 2 : 1 }).expect(expected);
    await remove(expected === 200 ? 3 : 1, client).expect(expected);
  });

  it('nobody else: a stranger, a person of another site and somebody not signed in find nothing', async () => {
    const there = (await upload(PNG).expect(200)).body as NetworkPlan;
    for (const [who, status] of [
      ['stranger', 404],
      ['outsider', 404],
      ['anonymous', 401],
    ] as const) {
      const client = server.as(who);
      await client.get(path).expect(status);
      await client.get(imageOf(there)).expect(status);
      await place(PLACED, 1, client).expect(status);
      await upload(PNG, { by: client, version: 1 }).expect(status);
      await remove(1, client).expect(status);
    }
    expect(await read()).toEqual(there);
  });

  it('an image is had through its own network only, also where there is another plan', async () => {
    const mine = planOf(await upload(PNG).expect(200));
    for (const [client, siteId] of [
      [designer, server.siteId],
      [server.as('outsider'), server.otherSiteId],
    ] as const) {
      const second = `/api/networks/${await makeNetwork(client, siteId)}/plan/image`;
      const request = client.send('put', second).set('If-Match', '"0"').set('Content-Type', 'image/png');
      await request.send(PNG).expect(200);
      await client.get(`${second}/${mine.plan?.fileId ?? ''}`).expect(404);
    }
  });

  it('a body that is too large is not even read for a role that is too small', async () => {
    const large = Buffer.alloc(4 * PLAN_LIMITS.bytes);
    await upload(large, { by: server.as('viewer') }).expect(403);
  });
});

describe('two people at one plan', () => {
  it('need the version they have seen, and the later one is shown what the other did', async () => {
    await upload(PNG).expect(200);
    await designer.send('put', path).send(PLACED).expect(428);
    await designer.send('delete', path).expect(428);
    const admin = server.as('administrator');
    await place(PLACED, 1, admin).expect(200);
    const refused = (await place({ ...PLACED, x: 99 }, 1).expect(412)).body as Problem & StalePlan;
    expect(refused).toMatchObject({ currentVersion: 2, current: { version: 2, plan: PLACED } });
    await upload(PNG, { version: 1 }).expect(412);
    await remove(1).expect(412);
    expect((await read()).plan).toMatchObject(PLACED);
  });

  it('are told of each change while they have the network open', async () => {
    const { http, origin } = await listening(server);
    const reader = await EventReader.open(origin, server.as('viewer'), path.split('/').at(-2) ?? '');
    await reader.until(() => reader.of('people').length > 0, 'the stream is open');
    await upload(PNG).expect(200);
    await remove(1).expect(200);
    await reader.until(() => reader.of('plan').length === 2, 'both changes are told');
    expect(reader.of('plan').map(({ data }) => data)).toEqual([{ version: 1 }, { version: 2 }]);
    reader.close();
    http.close();
  });
});

describe('the log', () => {
  it('holds each change of a plan with the hash of the image, and none that was refused', async () => {
    await upload(PNG, { query: '?name=hall.png' }).expect(200);
    await upload(Buffer.from('GIF89a'), { version: 1 }).expect(415);
    await place(PLACED, 7).expect(412);
    await place(PLACED, 1).expect(200);
    await remove(2).expect(200);
    const page = (await server.as('administrator').get(`/api/sites/${server.siteId}/audit`).expect(200))
      .body as AuditPage;
    const ofPlan = page.entries.filter(({ action }) => action.startsWith('plan.'));
    expect(ofPlan.map(({ action }) => action)).toEqual(['plan.remove', 'plan.place', 'plan.upload']);
    const sha256 = createHash('sha256').update(PNG).digest('hex');
    expect(ofPlan[2]?.details).toMatchObject({ name: 'hall.png', widthPx: 3, heightPx: 2, sha256 });
  });

  it('and the plan are written together or not at all', async () => {
    server.db.$client.exec("create trigger stop before insert on audit begin select raise(abort, 'no'); end");
    await upload(PNG).expect(500);
    expect([countOf('files'), countOf('plans')]).toEqual([0, 0]);
  });
});

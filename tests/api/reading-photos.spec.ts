import { createHash, randomUUID } from 'node:crypto';
import { PHOTO_LIMITS, type Problem, type Reading } from '@riseback/contracts';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { jpegOf, pngClaiming, pngOf } from '../fixtures/images';
import { makeNetwork } from './network-samples';
import { ReadingBench } from './reading-samples';
import type { Who } from './test-server';

let bench: ReadingBench;
let reading: Reading;
let roundId = '';
beforeEach(async () => {
  bench = new ReadingBench();
  await bench.begin();
  roundId = (await bench.round()).id;
  reading = await bench.take(roundId);
});
afterEach(() => bench.end());

const sqlite = () => bench.server.db.$client;
const count = () => sqlite().prepare('select count(*) from reading_photos').pluck().get();
const path = (photoId: string, readingId = reading.id) => bench.path(`/readings/${readingId}/photos/${photoId}`);

interface Sent {
  readonly id?: string;
  readonly by?: Who;
  readonly type?: string;
  readonly of?: string;
}
function put(content: Buffer, { id = randomUUID(), by = 'commissioning', type = 'image/jpeg', of }: Sent = {}) {
  return bench.as(by).send('put', path(id, of)).set('Content-Type', type).send(content);
}

describe('a photograph beside a reading', () => {
  it('is stored as it is and shown as nothing but an image', async () => {
    const [jpeg, png] = [randomUUID(), randomUUID()];
    await put(jpegOf(), { id: jpeg }).expect(200);
    const answer = await put(pngOf(3, 2), { id: png, type: 'image/png' }).expect(200);
    expect((answer.body as Reading).photoIds).toEqual([jpeg, png]);
    expect((await bench.get(roundId)).readings[0]?.photoIds).toEqual([jpeg, png]);
    const shown = await bench.as('viewer').get(path(jpeg)).expect(200);
    expect(Buffer.compare(shown.body as Buffer, jpegOf())).toBe(0);
    expect(shown.headers).toMatchObject({
      ...{ 'content-type': 'image/jpeg', 'content-disposition': 'inline; filename="reading.jpg"' },
      ...{ 'x-content-type-options': 'nosniff', 'cache-control': 'no-store' },
    });
    const other = await bench.as('viewer').get(path(png)).expect(200);
    expect(other.headers).toMatchObject({ 'content-disposition': 'inline; filename="reading.png"' });
    const stored = sqlite().prepare('select sha256 from reading_photos where id = ?').pluck().get(jpeg);
    expect(stored).toBe(createHash('sha256').update(jpegOf()).digest('hex'));
    const logged = sqlite().prepare("select details from audit where action = 'reading.photo'").pluck().all();
    expect(logged.map((row) => JSON.parse(String(row)) as object)).toMatchObject([
      { roundId, photoId: jpeg, mediaType: 'image/jpeg', sizeBytes: jpegOf().length },
      { photoId: png },
    ]);
  });

  it('keeps nothing of what hangs behind the end of the image', async () => {
    const id = randomUUID();
    await put(Buffer.concat([jpegOf(), Buffer.from('<script>')]), { id }).expect(200);
    const shown = await bench.as('viewer').get(path(id)).expect(200);
    expect(Buffer.compare(shown.body as Buffer, jpegOf())).toBe(0);
  });

  it('sent many times at once is stored once, and another under its id is refused', async () => {
    const id = randomUUID();
    await Promise.all(Array.from({ length: 10 }, () => put(jpegOf(), { id }).expect(200)));
    await put(pngOf(1, 1), { id, type: 'image/png' }).expect(409);
    const other = await bench.take(roundId);
    await put(jpegOf(), { id, of: other.id }).expect(409);
    expect(count()).toBe(1);
  });

  it.each<[string, Buffer, string, number]>([
    ['a page', Buffer.from('<html><script>alert(1)</script>'), 'image/png', 415],
    ['an SVG', Buffer.from('<svg xmlns="http://www.w3.org/2000/svg"/>'), 'image/png', 415],
    ['an SVG said to be one', Buffer.from('<svg/>'), 'image/svg+xml', 415],
    ['a PNG said to be a JPEG', pngOf(2, 2), 'image/jpeg', 415],
    ['nothing', Buffer.alloc(0), 'image/png', 415],
    ['half a PNG', pngOf(9, 9).subarray(0, 40), 'image/png', 422],
    ['more pixels than a screen can hold', pngClaiming(PHOTO_LIMITS.sidePx, PHOTO_LIMITS.sidePx), 'image/png', 422],
    ['a line too long', pngClaiming(PHOTO_LIMITS.sidePx + 1, 1), 'image/png', 422],
    ['too many bytes', Buffer.concat([pngOf(2, 2), Buffer.alloc(PHOTO_LIMITS.bytes)]), 'image/png', 413],
  ])('that is %s is refused', async (_what, content, type, status) => {
    const refused = await put(content, { type }).expect(status);
    expect((refused.body as Problem).detail).not.toBe('');
    expect(count()).toBe(0);
  });

  it(`is one of ${PHOTO_LIMITS.ofAReading} at most`, async () => {
    for (let i = 0; i < PHOTO_LIMITS.ofAReading; i += 1) await put(jpegOf()).expect(200);
    const refused = await put(jpegOf()).expect(422);
    expect((refused.body as Problem).detail).toContain(`${PHOTO_LIMITS.ofAReading} photographs at most`);
    expect(count()).toBe(PHOTO_LIMITS.ofAReading);
  });

  it('comes after its reading, also when the round is closed meanwhile', async () => {
    const early = await put(jpegOf(), { of: randomUUID() }).expect(404);
    expect((early.body as Problem).detail).toContain('send the reading first');
    await bench.close(roundId).expect(200);
    await put(jpegOf()).expect(200);
  });

  it.each<[Who, number, number]>([
    ['viewer', 403, 200],
    ['commissioning', 200, 200],
    ['stranger', 404, 404],
    ['outsider', 404, 404],
  ])('is put there and seen as the role allows: %s, %i and %i', async (by, written, seen) => {
    const id = randomUUID();
    await put(jpegOf(), { id }).expect(200);
    await put(jpegOf(), { by }).expect(written);
    await bench.as(by).get(path(id)).expect(seen);
  });

  it('of another reading or network is not there', async () => {
    const id = randomUUID();
    await put(jpegOf(), { id }).expect(200);
    const other = await bench.take(roundId);
    await bench.staff.get(path(id, other.id)).expect(404);
    await bench.staff.get(path(randomUUID())).expect(404);
    await bench.staff.get(path('none')).expect(400);
    const network = await makeNetwork(bench.as('designer'), bench.server.siteId);
    const elsewhere = `/api/networks/${network}/readings/${reading.id}/photos/`;
    await bench.staff.get(elsewhere + id).expect(404);
    const upload = bench.staff.send('put', elsewhere + randomUUID()).set('Content-Type', 'image/jpeg');
    await upload.send(jpegOf()).expect(404);
  });

  it('is never changed or deleted, even by who reaches the database', async () => {
    await put(jpegOf()).expect(200);
    expect(() => sqlite().exec("update reading_photos set content = x'00'")).toThrow('never changed');
    expect(() => sqlite().exec('delete from reading_photos')).toThrow('never deleted');
  });
});

import { randomUUID } from 'node:crypto';
import type { Problem, Reading } from '@riseback/contracts';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { KEPT_SOLVES } from '../../server/src/solve/solve-repository';
import { EventReader, listening } from './event-reader';
import { batchOf, makeNetwork, raise, sendBatch } from './network-samples';
import { ReadingBench } from './reading-samples';
import type { Who } from './test-server';

const MINUTE = 60_000;
const DAY = 24 * 60 * MINUTE;

let bench: ReadingBench;
beforeEach(async () => {
  bench = new ReadingBench();
  await bench.begin();
});
afterEach(() => bench.end());

const sqlite = () => bench.server.db.$client;
const count = (table: string) => sqlite().prepare(`select count(*) from ${table}`).pluck().get();
const log = () =>
  sqlite()
    .prepare("select action, subject from audit where action like 'round.%' or action like 'reading.%' order by seq")
    .raw()
    .all();
const editGauges = (version: number, key: string, from: unknown, to: unknown, id = 'G1') =>
  sendBatch(
    bench.staff,
    bench.networkId,
    version,
    batchOf([{ op: 'set', in: 'gauges', id, key, from, to } as Parameters<typeof batchOf>[0][number]]),
  ).expect(200);

describe('a round', () => {
  it('is begun on a version and in a case, listed, read and closed', async () => {
    const round = await bench.round({ title: '' });
    expect(round).toMatchObject({
      ...{ name: '2026-03-02', networkVersion: 1, caseId: 'night', personName: 'commissioning', read: 0, notRead: 0 },
      ...{ networkId: bench.networkId, startedAt: bench.at(), readings: [] },
    });
    expect(round.closedAt).toBeUndefined();
    const reading = await bench.take(round.id);
    await bench.take(round.id, { gaugeId: 'G2', whyNot: 'noAccess' });
    bench.server.pass(MINUTE);
    const closed = await bench.close(round.id).expect(200);
    expect(closed.body).toMatchObject({ closedAt: bench.at(), read: 1, notRead: 1 });
    const later = await bench.round();
    expect(await bench.list()).toMatchObject([
      { id: later.id, name: 'Monday' },
      { id: round.id, read: 1, notRead: 1 },
    ]);
    expect((log() as string[][]).map(([action]) => action)).toEqual([
      ...['round.begin', 'reading.take', 'reading.take', 'round.close', 'round.begin'],
    ]);
    expect(log()[1]).toEqual(['reading.take', reading.id]);
  });

  it('sent again is one round, and another under its id is refused', async () => {
    const body = bench.newRound();
    const first = await bench.sendRound(body).expect(201);
    const again = await bench.sendRound(body).expect(201);
    expect(again.body).toEqual(first.body);
    await bench.sendRound({ ...body, title: 'Tuesday' }).expect(409);
    const other = await makeNetwork(bench.as('designer'), bench.server.siteId);
    await bench.staff.post(`/api/networks/${other}/rounds`, { ...body, caseId: '' }).expect(409);
    expect(count('rounds')).toBe(1);
    expect(log()).toHaveLength(1);
  });

  it('is of a version and a case that there are', async () => {
    await bench.sendRound(bench.newRound({ networkVersion: 2 })).expect(404);
    const refused = await bench.sendRound(bench.newRound({ caseId: 'noon' })).expect(422);
    expect(refused.body).toMatchObject({ errors: [{ pointer: '/caseId' }] });
    // results are made of the cases where there are any
    await bench.sendRound(bench.newRound({ caseId: '' })).expect(422);
    const plain = await makeNetwork(bench.as('designer'), bench.server.siteId);
    const path = `/api/networks/${plain}/rounds`;
    await bench.staff.post(path, bench.newRound()).expect(422);
    await bench.staff.post(path, bench.newRound({ caseId: '' })).expect(201);
  });
});

describe('a reading', () => {
  it('holds what was sent, the gauge as it was, and both times', async () => {
    const round = await bench.round();
    const body = bench.newReading({ note: 'Needle trembles.\nTapped it.', takenAt: bench.at(-MINUTE) });
    const { id, gaugeId, valuePa, note, takenAt, deviceId, deviceSeq } = body;
    const answer = await bench.send(round.id, body).expect(201);
    expect(answer.body).toEqual({
      ...{ id, gaugeId, valuePa, note, takenAt, deviceId, deviceSeq, receivedAt: bench.at() },
      ...{ personId: 'commissioning', personName: 'commissioning', photoIds: [] },
      gauge: {
        ...{ id: 'G1', tag: 'PI-1', node: 'J1', elevationM: 3.5, rangeLowPa: 0, rangeHighPa: 200_000, accuracy: 0.01 },
        ...{ waterLeg: false, retired: false },
      },
    });
    expect((await bench.get(round.id)).readings).toEqual([answer.body]);
  });

  it('needs its id in the header, and in words', async () => {
    const { id } = await bench.round();
    const body = bench.newReading();
    const refused = await bench.send(id, body, bench.staff, randomUUID()).expect(400);
    expect((refused.body as Problem).detail).toContain('Idempotency-Key');
    await bench.staff.post(bench.path(`/rounds/${id}/readings`), body).expect(400);
    expect(count('readings')).toBe(0);
  });

  it('says a value or why there is none, not both', async () => {
    const { id } = await bench.round();
    const { valuePa: _value, ...neither } = bench.newReading();
    await bench.send(id, neither).expect(400);
    await bench.send(id, { ...bench.newReading(), whyNot: 'broken' }).expect(400);
    for (const whyNot of ['noAccess', 'unsafe', 'notFound', 'shutOff', 'broken', 'other'] as const) {
      expect(await bench.take(id, { whyNot })).toMatchObject({ whyNot });
    }
  });

  it('sent twenty times at once is stored once, and answers alike each time, also to who takes the device over', async () => {
    const round = await bench.round();
    const body = bench.newReading();
    const answers = await Promise.all(Array.from({ length: 20 }, () => bench.send(round.id, body).expect(201)));
    bench.server.pass(40 * DAY);
    const later = await bench.send(round.id, body, bench.as('designer')).expect(201);
    for (const { body: answer } of [...answers, later]) expect(answer).toEqual(answers[0]?.body);
    expect(count('readings')).toBe(1);
    expect(log()).toHaveLength(2);
  });

  it.each([
    ['value', { valuePa: 47_000 }],
    ['note', { note: 'another' }],
    ['time', { takenAt: '2026-03-02T07:00:00.000Z' }],
    ['gauge', { gaugeId: 'G2' }],
    ['number', { deviceSeq: 99 }],
    ['device', { deviceId: '00000000-0000-4000-8000-000000000000' }],
  ])('under a known id with another %s is refused', async (_what, other) => {
    const { id } = await bench.round();
    const body = bench.newReading();
    await bench.send(id, body).expect(201);
    await bench.send(id, { ...body, ...other }).expect(409);
    const elsewhere = await bench.round();
    await bench.send(elsewhere.id, body).expect(409);
    expect((await bench.get(id)).readings).toMatchObject([{ valuePa: 48_000, note: '' }]);
  });

  it('has a number of its own on its device', async () => {
    const { id } = await bench.round();
    const { deviceSeq } = await bench.take(id);
    await bench.send(id, bench.newReading({ deviceSeq })).expect(409);
    await bench.send(id, bench.newReading({ deviceSeq, deviceId: randomUUID() })).expect(201);
  });

  it('was taken within the last thirty days, and not in the future', async () => {
    const { id } = await bench.round();
    const body = bench.newReading({ takenAt: bench.at(5 * MINUTE + 1) });
    const early = await bench.send(id, body).expect(400);
    expect((early.body as Problem).detail).toMatch(/in the future.*clock/);
    expect(early.body).toMatchObject({ errors: [{ pointer: '/takenAt' }] });
    bench.server.pass(1);
    // nothing of it was stored: the same goes through once the time has come
    await bench.send(id, body).expect(201);
    const late = await bench.send(id, bench.newReading({ takenAt: bench.at(-30 * DAY - 1) })).expect(400);
    expect((late.body as Problem).detail).toMatch(/30 days ago.*note/);
    await bench.send(id, bench.newReading({ takenAt: bench.at(-30 * DAY) })).expect(201);
    await bench.sendRound(bench.newRound({ startedAt: bench.at(6 * MINUTE) })).expect(400);
    await bench.close(id, bench.staff, bench.at(-MINUTE)).expect(400);
  });

  it('of no gauge, of a retired one, or in no round is refused in words', async () => {
    const { id } = await bench.round();
    const unknown = await bench.send(id, bench.newReading({ gaugeId: 'G9' })).expect(404);
    expect((unknown.body as Problem).detail).toContain('no gauge G9');
    const retired = await bench.send(id, bench.newReading({ gaugeId: 'G3' })).expect(409);
    expect((retired.body as Problem).detail).toContain('PI-3 is retired');
    const early = await bench.send(randomUUID(), bench.newReading()).expect(404);
    expect((early.body as Problem).detail).toContain('send the round first');
  });

  it('has the gauge of the round’s version, and of one added since the gauge as it stands', async () => {
    const { id } = await bench.round();
    await editGauges(1, 'elevationM', 3.5, 3.9);
    await editGauges(2, 'retired', false, true);
    await editGauges(3, 'retired', true, false, 'G3');
    const added = { id: 'G4', node: 'R1', elevationM: 2, waterLeg: false, retired: false };
    const batch = batchOf([{ op: 'add', in: 'gauges', ordinal: 3, value: added }]);
    await sendBatch(bench.staff, bench.networkId, 4, batch).expect(200);
    expect((await bench.take(id)).gauge).toMatchObject({ elevationM: 3.5, retired: false });
    expect((await bench.take(id, { gaugeId: 'G3' })).gauge).toMatchObject({ tag: 'PI-3', retired: false });
    expect((await bench.take(id, { gaugeId: 'G4' })).gauge).toEqual(added);
    const { id: next } = await bench.round({ networkVersion: 5 });
    await bench.send(next, bench.newReading()).expect(409);
  });
});

describe('fifty readings from a device that had no signal', () => {
  it('with requests that came twice, not at all or out of order are each stored once, in order, with their own time', async () => {
    const { id } = await bench.round();
    const start = bench.server.now().getTime();
    const taken = Array.from({ length: 50 }, (_none, i) =>
      bench.newReading({
        gaugeId: i % 3 === 0 ? 'G2' : 'G1',
        takenAt: new Date(start - (60 - i) * MINUTE).toISOString(),
        ...(i % 7 === 0 ? { whyNot: 'noAccess' as const } : { valuePa: 1_000 * i }),
      }),
    );
    // what becomes of each try: one in four is lost on its way there, one in four on its way back, one in four is sent at once again
    let state = 20_260_302;
    const next = () => (state = (state * 48_271) % 2_147_483_647);
    let waiting = taken;
    let tries = 0;
    while (waiting.length > 0) {
      const sent = waiting.map((body) => ({ body, order: next(), fate: next() % 4 }));
      sent.sort((a, b) => a.order - b.order);
      const answered = new Set<string>();
      await Promise.all(
        sent.map(async ({ body, fate }) => {
          tries += 1;
          if (fate === 0) return;
          await bench.send(id, body).expect(201);
          if (fate === 1) return;
          if (fate === 2) await bench.send(id, body).expect(201);
          answered.add(body.id);
        }),
      );
      waiting = waiting.filter((body) => !answered.has(body.id));
    }
    expect(tries).toBeGreaterThan(80);
    const { readings, read, notRead } = await bench.get(id);
    const shown = ({ id: reading, takenAt, deviceSeq, gaugeId, valuePa, whyNot }: Omit<Reading, 'gauge'>) => ({
      ...{ reading, takenAt, deviceSeq, gaugeId, valuePa, whyNot },
    });
    expect(readings.map(shown)).toEqual(taken.map((body) => shown({ ...body } as unknown as Reading)));
    expect([read, notRead]).toEqual([2, 0]);
    expect(count('readings')).toBe(50);
    expect(log()).toHaveLength(51);
  }, 20_000);
});

describe('a correction', () => {
  it('takes the place of a reading, which stays', async () => {
    const { id } = await bench.round();
    const wrong = await bench.take(id, { valuePa: 84_000 });
    const right = await bench.take(id, { valuePa: 48_000, replaces: wrong.id });
    const unread = await bench.take(id, { gaugeId: 'G2', valuePa: 1 });
    await bench.take(id, { gaugeId: 'G2', whyNot: 'broken', replaces: unread.id });
    const round = await bench.get(id);
    expect(round).toMatchObject({ read: 1, notRead: 1 });
    expect(round.readings.map(({ valuePa, whyNot, replaces }) => [valuePa ?? whyNot, replaces])).toEqual([
      [84_000, undefined],
      [48_000, wrong.id],
      [1, undefined],
      ['broken', unread.id],
    ]);
    expect((log() as string[][])[2]).toEqual(['reading.correct', right.id]);
  });

  it('is made of the newest only, and the refusal names it', async () => {
    const { id } = await bench.round();
    const first = await bench.take(id);
    const second = await bench.take(id, { replaces: first.id });
    const refused = await bench.send(id, bench.newReading({ replaces: first.id })).expect(409);
    expect(refused.body).toMatchObject({ replacedBy: second.id });
    expect((refused.body as Problem).detail).toContain(second.id);
    await bench.take(id, { replaces: second.id });
  });

  it('is of the same round and gauge, and waits for what it corrects', async () => {
    const { id } = await bench.round();
    const first = await bench.take(id);
    await bench.send(id, bench.newReading({ replaces: first.id, gaugeId: 'G2' })).expect(409);
    const elsewhere = await bench.round();
    await bench.send(elsewhere.id, bench.newReading({ replaces: first.id })).expect(409);
    const late = bench.newReading();
    const correction = bench.newReading({ replaces: late.id });
    expect((await bench.send(id, correction).expect(409)).body).toMatchObject({ awaited: late.id });
    await bench.send(id, late).expect(201);
    await bench.send(id, correction).expect(201);
  });

  it('is all that a closed round takes, also of a gauge that is gone since, with the gauge as it was', async () => {
    const { id } = await bench.round();
    const first = await bench.take(id);
    const added = { id: 'G4', node: 'R1', elevationM: 2, waterLeg: false, retired: false };
    const add = batchOf([{ op: 'add', in: 'gauges', ordinal: 3, value: added }]);
    await sendBatch(bench.staff, bench.networkId, 1, add).expect(200);
    const ofAdded = await bench.take(id, { gaugeId: 'G4' });
    await bench.close(id).expect(200);
    const refused = await bench.send(id, bench.newReading()).expect(409);
    expect((refused.body as Problem).detail).toMatch(/closed.*another round/);
    const remove = batchOf([{ op: 'remove', in: 'gauges', id: 'G4' }]);
    await sendBatch(bench.staff, bench.networkId, 2, remove).expect(200);
    const corrected = await bench.take(id, { replaces: ofAdded.id, gaugeId: 'G4' });
    expect(corrected).toMatchObject({ replaces: ofAdded.id, gauge: added });
    // the answer to what was taken before got lost
    await bench.send(id, { ...bench.newReading(), ...pick(first) }).expect(201);
  });
});

describe('a closed round', () => {
  it('closed once more stays as it is', async () => {
    const { id } = await bench.round();
    const first = await bench.close(id).expect(200);
    bench.server.pass(MINUTE);
    const again = await bench.close(id, bench.as('designer')).expect(200);
    expect(again.body).toEqual(first.body);
    expect(log()).toHaveLength(2);
  });
});

describe('readings', () => {
  it.each<[Who, number]>([
    ['viewer', 403],
    ['reviewer', 403],
    ['commissioning', 201],
    ['designer', 201],
    ['administrator', 201],
    ['stranger', 404],
    ['outsider', 404],
  ])('are taken by whose role has them: %s, %i', async (who, status) => {
    const { id } = await bench.round();
    const client = bench.as(who);
    await bench.sendRound(bench.newRound(), client).expect(status);
    await bench.send(id, bench.newReading(), client).expect(status);
    await bench.close(id, client).expect(status === 201 ? 200 : status);
    const seen = status === 404 ? 404 : 200;
    await client.get(bench.path('/rounds')).expect(seen);
    await client.get(bench.path(`/rounds/${id}`)).expect(seen);
  });

  it('of another network are not there', async () => {
    const { id } = await bench.round();
    const other = await makeNetwork(bench.as('designer'), bench.server.siteId);
    await bench.staff.get(`/api/networks/${other}/rounds/${id}`).expect(404);
    expect((await bench.staff.get(`/api/networks/${other}/rounds`).expect(200)).body).toEqual([]);
    await bench.staff.post(`/api/networks/${other}/rounds/${id}/closing`, { closedAt: bench.at() }).expect(404);
    const body = bench.newReading();
    const path = `/api/networks/${other}/rounds/${id}/readings`;
    await bench.staff.post(path, body).set('Idempotency-Key', body.id).expect(404);
  });

  it('have what they were read against for good: its results outlive those of versions in between', async () => {
    await bench.round();
    const designer = bench.as('designer');
    const results = (version: number) => designer.get(bench.path(`/results?version=${version}`)).expect(200);
    for (let version = 1; version <= KEPT_SOLVES + 4; version += 1) {
      bench.server.pass(1_000);
      await results(version);
      await sendBatch(designer, bench.networkId, version, batchOf([raise(version, version - 1)])).expect(200);
    }
    await results(KEPT_SOLVES + 5);
    const stored = sqlite().prepare(
      'select version from edits join solves using (network_id, solver_hash) order by version',
    );
    expect(stored.pluck().all()).toEqual([1, ...Array.from({ length: KEPT_SOLVES }, (_none, i) => i + 6)]);
  });

  it('and rounds are never changed or deleted, even by who reaches the database', async () => {
    const { id } = await bench.round();
    const { id: reading } = await bench.take(id);
    await bench.take(id, { replaces: reading });
    const run = (sql: string) => () => sqlite().exec(sql);
    expect(run('update readings set value_pa = 1')).toThrow('never changed');
    expect(run('delete from readings')).toThrow('never deleted');
    expect(run("update rounds set title = 'x'")).toThrow('closed once and otherwise never changed');
    expect(run("update rounds set title = 'x', closed_at = started_at")).toThrow('otherwise never changed');
    expect(run('delete from rounds')).toThrow('never deleted');
    await bench.close(id).expect(200);
    expect(run('update rounds set closed_at = null')).toThrow('closed once');
    expect(run("update rounds set closed_at = '2026'")).toThrow('closed once');
    const copy = (columns: string) =>
      run(`insert into readings select ${columns}, note, taken_at, received_at, device_id, device_seq + 9, replaces, person_id
        from readings where replaces is not null`);
    expect(copy("'a', round_id, gauge_id, gauge, value_pa, why_not")).toThrow(
      'UNIQUE constraint failed: readings.replaces',
    );
    expect(copy("'a', round_id, gauge_id, gauge, null, null")).toThrow('readings_value');
    expect(copy("'a', round_id, gauge_id, gauge, 1, 'broken'")).toThrow('readings_value');
  });

  it('are told to those who have the network open, and what changed nothing is not', async () => {
    const { http, origin } = await listening(bench.server);
    const reader = await EventReader.open(origin, bench.as('viewer'), bench.networkId);
    try {
      const body = bench.newRound();
      await bench.sendRound(body).expect(201);
      await bench.sendRound(body).expect(201);
      const reading = bench.newReading();
      await bench.send(body.id, reading).expect(201);
      await bench.send(body.id, reading).expect(201);
      await bench.close(body.id).expect(200);
      await bench.close(body.id).expect(200);
      await bench.round({ id: randomUUID() });
      await reader.until(() => reader.of('rounds').length >= 4, 'the rounds are told');
      expect(reader.of('rounds').map(({ data }) => (data as { roundId: string }).roundId === body.id)).toEqual([
        ...[true, true, true, false],
      ]);
    } finally {
      reader.close();
      bench.server.app.endStreams();
      http.close();
    }
  });
});

/** What the device had sent of a reading. */
function pick({ id, gaugeId, valuePa, note, takenAt, deviceId, deviceSeq }: Reading) {
  return { id, gaugeId, note, takenAt, deviceId, deviceSeq, ...(valuePa === undefined ? {} : { valuePa }) };
}

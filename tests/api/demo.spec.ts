import { randomUUID } from 'node:crypto';
import { agreementOf } from '@riseback/diagnosis';
import { solveNetwork, isRefusal } from '@riseback/solver';
import { readNetworkFile, toFile, type NetworkFile, type Position } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { DEMO_PEOPLE } from '../../server/demo/demo-people';
import { seedDemo } from '../../server/demo/seed-demo';
import ternQuay from '../../server/demo/tern-quay.json';
import { NetworkRepository } from '../../server/src/networks/network-repository';
import { firstBrokenAuditRow } from '../../server/src/platform/db/audit-check';
import { openDatabase, type Database } from '../../server/src/platform/db/database';
import { RoundRepository } from '../../server/src/readings/round-repository';
import { SigningKey } from '../../server/src/revisions/signing-key';
import { verifyRevision } from '../../server/src/revisions/verification';
import { VerifyingKeys } from '../../server/src/revisions/verifying-keys';
import { ENGINE_VERSION } from '../../server/src/solve/engine-version';
import { solveCases } from '../../server/src/solve/solve-cases';
import type { SolvePort } from '../../server/src/solve/solve-port';

function plant(): NetworkFile {
  const read = readNetworkFile(ternQuay);
  if (!read.ok) throw new Error(JSON.stringify(read.errors));
  return read.file;
}

function partsWith(db: Database) {
  const solver: SolvePort = {
    solve: (_key, job) => Promise.resolve({ end: 'finished', outcomes: solveCases(job), solveMs: 1 }),
  };
  const now = () => new Date('2026-03-02T08:00:00.000Z');
  const hashPassword = () => Promise.resolve('hash');
  return { db, solver, key: SigningKey.generate(), hashPassword, newId: randomUUID, now };
}

const count = (db: Database, table: string) => db.$client.prepare(`select count(*) from ${table}`).pluck().get();

describe('seeding the demo', () => {
  it('fills a new database once, with results', async () => {
    const db = openDatabase(':memory:');
    const parts = partsWith(db);
    expect(await seedDemo(parts)).toBe(true);
    expect(await seedDemo(parts)).toBe(false);
    expect(await Promise.all([seedDemo(parts), seedDemo(parts)])).toEqual([false, false]);
    expect(count(db, 'sites')).toBe(1);
    expect(count(db, 'people')).toBe(6);
    expect(count(db, 'memberships')).toBe(5);
    expect(count(db, 'networks')).toBe(1);
    expect(count(db, 'nodes')).toBe(plant().nodes.length);
    const present = db.$client.prepare('select version, solver_hash from networks').get();
    const solve = 'select count(*) from solves join networks using (solver_hash) where state = ?';
    expect(present).toMatchObject({ version: 5 });
    expect(db.$client.prepare(solve).pluck().get('finished')).toBe(1);
  });

  it('ends with the very network of its file', async () => {
    const db = openDatabase(':memory:');
    await seedDemo(partsWith(db));
    const id = String(db.$client.prepare('select id from networks').pluck().get());
    const document = new NetworkRepository(db).document(id);
    if (document === undefined) throw new Error('the demo has a network');
    expect(toFile(document)).toEqual(plant());
  });

  it('has a revision that the reviewer signed and one under review, and both verify', async () => {
    const db = openDatabase(':memory:');
    const parts = partsWith(db);
    await seedDemo(parts);
    const keys = new VerifyingKeys([parts.key.publicKey]);
    const rows = db.$client.prepare('select id, letter from revisions order by letter').all() as { id: string }[];
    expect(rows).toMatchObject([{ letter: 'A' }, { letter: 'B' }]);
    const states = 'select state from revision_events where revision_id = ? order by seq';
    const [a, b] = rows.map(({ id }) => db.$client.prepare(states).pluck().all(id));
    expect(a).toEqual(['draft', 'underReview', 'approved']);
    expect(b).toEqual(['draft', 'underReview']);
    for (const { id } of rows) {
      const how = { db, keys, heads: () => [], solver: parts.solver, engineVersion: ENGINE_VERSION };
      expect(await verifyRevision(id, how)).toMatchObject({ sound: true });
    }
  });

  it('has a month of weekly rounds, in the last of which a gauge moved far more than the plant as it is said to be run', async () => {
    const db = openDatabase(':memory:');
    const parts = partsWith(db);
    await seedDemo(parts);
    const networkId = String(db.$client.prepare('select id from networks').pluck().get());
    const rounds = new RoundRepository(db);
    const weeks = rounds.ofNetwork(networkId).reverse();
    expect(weeks.map(({ networkVersion, caseId }) => [networkVersion, caseId])).toEqual(
      Array.from({ length: 5 }, () => [5, 'design']),
    );
    const now = parts.now().toISOString();
    const versionAt = String(db.$client.prepare('select at from edits where version = 5').pluck().get());
    let last = versionAt;
    for (const { id, startedAt, closedAt } of weeks) {
      for (const time of [startedAt, ...rounds.readings.ofRound(id).map(({ takenAt }) => takenAt), closedAt ?? '']) {
        expect(time > last || time === startedAt).toBe(true);
        last = time;
      }
    }
    expect(last < now && firstBrokenAuditRow(db) === undefined).toBe(true);

    const file = plant();
    const solved = solveNetwork(file, { caseId: 'design', partial: true, bands: true });
    if (isRefusal(solved)) throw new Error(solved.problem.detail);
    const results = { file, result: solved };
    const [first, ...later] = weeks.map(({ id }) => ({
      readings: rounds.readings.ofRound(id).map(({ valuePa, replaces, ...reading }) => ({
        ...reading,
        ...(valuePa === null ? {} : { valuePa }),
        ...(replaces === null ? {} : { replaces }),
      })),
    }));
    if (first === undefined) throw new Error('the demo has rounds');
    const words = later.map((round) =>
      [...agreementOf(round, results, { round: first, results }).values()].map((row) =>
        row.status === 'judged' ? (row.sinceBaseline?.word ?? '') : row.status,
      ),
    );
    const inOrder = Array.from({ length: 6 }, () => 'agrees');
    expect(words).toEqual([inOrder, inOrder, inOrder, ['disagrees', 'notRead', ...inOrder.slice(2)]]);
    for (const row of agreementOf(first, results).values()) expect(row).toMatchObject({ word: 'agrees' });
  });

  it('happens once when two starts meet', async () => {
    const db = openDatabase(':memory:');
    const parts = partsWith(db);
    const seeded = await Promise.all([seedDemo(parts), seedDemo(parts)]);
    expect(seeded.filter(Boolean)).toHaveLength(1);
    expect(count(db, 'sites')).toBe(1);
  });

  it('leaves nothing behind when it fails half-way', async () => {
    const db = openDatabase(':memory:');
    const parts = partsWith(db);
    // the last that it makes are the rounds
    const now = () => {
      if (count(db, 'rounds') === 4) throw new Error('half-way');
      return parts.now();
    };
    await expect(seedDemo({ ...parts, now })).rejects.toThrow('half-way');
    for (const table of ['sites', 'people', 'memberships', 'networks', 'rounds', 'audit'])
      expect(count(db, table)).toBe(0);
  });

  it('gives each role one person, and the stranger none', () => {
    expect(DEMO_PEOPLE.map(({ role }) => role).sort()).toEqual(
      ['administrator', 'commissioning', 'designer', 'reviewer', 'viewer', undefined].sort(),
    );
  });
});

describe('the demo plant', () => {
  it('has the traps, pipes and lifts of the scenario', () => {
    const { nodes, pipes } = plant();
    expect(nodes.filter(({ kind }) => kind === 'trap')).toHaveLength(30);
    expect(pipes).toHaveLength(46);
    // the two lifts over the loading road, 22 ft and 12 ft
    const rises = pipes.map((pipe) => Math.max(...(pipe.route ?? []).map(({ riseM }) => riseM)));
    expect(rises.filter((rise) => rise > 3).sort()).toEqual([3.6576, 6.7056]);
  });

  it('fails in its design case for reasons that an engineer knows', () => {
    const solved = solveNetwork(plant(), { caseId: 'design', partial: false });
    if (isRefusal(solved)) throw new Error(solved.problem.detail);
    const failed = new Map(
      solved.traps.map(({ id, checks }) => [
        id,
        checks.filter(({ verdict }) => verdict === 'fail').map(({ code }) => code),
      ]),
    );
    // from the walk made by hand for this plant: the disc trap with more than 0.8 of its inlet behind it, the heater at
    // 15 psig that cannot drain, the trap too small for the differential left to it, the seat rated under the safety valve
    expect(failed.get('TX1')).toContain('backPressureFraction');
    expect(failed.get('TH4')).toContain('differential');
    expect(failed.get('TB2')).toContain('capacity');
    expect(failed.get('TM2')).toContain('orificeRating');
  });
});

describe('the demo’s drawing', () => {
  const { nodes, pipes } = plant();
  const spots = new Map(nodes.map(({ id, position }) => [id, position ?? { x: Number.NaN, y: Number.NaN }]));
  const spot = (id: string): Position => spots.get(id) ?? { x: Number.NaN, y: Number.NaN };
  const runs = pipes.flatMap(({ id, from, to, bends = [] }) => {
    const points = [spot(from), ...bends, spot(to)];
    return points.slice(1).map((end, i) => ({ id, ends: [from, to], start: points[i] ?? end, end }));
  });

  it('stands on the grid of 20, with room for every tag', () => {
    for (const { x, y } of [...spots.values(), ...pipes.flatMap(({ bends = [] }) => bends)]) {
      expect([x % 20, y % 20]).toEqual([0, 0]);
    }
    const list = [...spots.values()];
    for (const [i, a] of list.entries()) {
      for (const b of list.slice(i + 1))
        expect(Math.max(Math.abs(a.x - b.x), Math.abs(a.y - b.y))).toBeGreaterThanOrEqual(80);
    }
  });

  it('runs its pipes at right angles and through no symbol', () => {
    for (const { id, ends, start, end } of runs) {
      expect((start.x === end.x) !== (start.y === end.y), id).toBe(true);
      for (const [node, { x, y }] of spots) {
        if (ends.includes(node)) continue;
        const clear =
          x < Math.min(start.x, end.x) - 20 ||
          x > Math.max(start.x, end.x) + 20 ||
          y < Math.min(start.y, end.y) - 20 ||
          y > Math.max(start.y, end.y) + 20;
        expect(clear, `${id} at ${node}`).toBe(true);
      }
    }
  });

  it('crosses no pipe with another: only drains into one junction share their last steps', () => {
    for (const [i, a] of runs.entries()) {
      for (const b of runs.slice(i + 1)) {
        if (a.ends.some((end) => b.ends.includes(end))) continue;
        const apart =
          Math.max(a.start.x, a.end.x) < Math.min(b.start.x, b.end.x) ||
          Math.max(b.start.x, b.end.x) < Math.min(a.start.x, a.end.x) ||
          Math.max(a.start.y, a.end.y) < Math.min(b.start.y, b.end.y) ||
          Math.max(b.start.y, b.end.y) < Math.min(a.start.y, a.end.y);
        expect(apart, `${a.id} and ${b.id}`).toBe(true);
      }
    }
  });
});

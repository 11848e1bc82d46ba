import type { CaseOutcome, NetworkResults, NetworkSummary } from '@riseback/contracts';
import type { EditOp } from '@riseback/network';
import { afterEach, describe, expect, it } from 'vitest';
import { solveCases } from '../../server/src/solve/solve-cases';
import type { SolveEnd, SolveJob, SolvePort } from '../../server/src/solve/solve-port';
import { KEPT_SOLVES } from '../../server/src/solve/solve-repository';
import { batchOf, makeNetwork, raise, sendBatch, SMALL } from './network-samples';
import { TestServer, type Client } from './test-server';

interface HeldJob {
  readonly key: string;
  readonly job: SolveJob;
  readonly end: (end?: SolveEnd) => void;
}

/**
 * A solver whose jobs end when the test says so: `jobs` holds all for pressures that it was ever given, `bandJobs` those for bands, which
 * end at once unless they are held too.
 */
class HeldSolver implements SolvePort {
  readonly jobs: HeldJob[] = [];
  readonly bandJobs: HeldJob[] = [];
  holdsBands = false;

  solve(key: string, job: SolveJob): Promise<SolveEnd> {
    return new Promise((resolve) => {
      const solved = (): SolveEnd => ({ end: 'finished', outcomes: solveCases(job), solveMs: job.bands ? 40 : 2 });
      const held = { key, job, end: (end = solved()) => resolve(end) };
      (job.bands ? this.bandJobs : this.jobs).push(held);
      if (job.bands && !this.holdsBands) held.end();
    });
  }
}

const servers: TestServer[] = [];
afterEach(() => {
  for (const server of servers.splice(0)) server.close();
});

function withHeldSolver(): { server: TestServer; solver: HeldSolver; designer: Client } {
  const solver = new HeldSolver();
  const server = new TestServer({ solver });
  servers.push(server);
  return { server, solver, designer: server.as('designer') };
}

function resultsPath(id: string, version?: number): string {
  return `/api/networks/${id}/results${version === undefined ? '' : `?version=${version}`}`;
}

async function until(condition: () => boolean): Promise<void> {
  while (!condition()) await new Promise((resolve) => setTimeout(resolve, 5));
}

const MOVE: EditOp = { op: 'set', in: 'nodes', id: 'T1', key: 'position', from: { x: 0, y: 0 }, to: { x: 40, y: 20 } };

describe('results', () => {
  it('are those of the version, in all its cases', async () => {
    const { server, solver, designer } = withHeldSolver();
    const cases = [
      { id: 'full', name: 'Full' },
      { id: 'open', name: 'Open', overrides: [{ node: 'T1', state: 'failedOpen' }] },
    ];
    const id = await makeNetwork(designer, server.siteId, { ...SMALL, cases });
    expect(solver.jobs[0]).toMatchObject({ key: id, job: { caseIds: ['full', 'open'], partial: true } });
    const asked = designer.get(resultsPath(id, 1)).expect(200);
    setTimeout(() => solver.jobs[0]?.end(), 50);
    const results = (await asked).body as NetworkResults;
    expect(results).toMatchObject({
      state: 'finished',
      version: 1,
      solveMs: 2,
      finishedAt: server.now().toISOString(),
    });
    const outcomes: CaseOutcome[] = results.state === 'finished' ? results.cases : [];
    expect(outcomes.map(({ caseId, status }) => ({ caseId, status }))).toEqual([
      { caseId: 'full', status: 'solved' },
      { caseId: 'open', status: 'refused' },
    ]);
    const again = await server.as('viewer').get(resultsPath(id)).expect(200);
    expect(again.body).toEqual(results);
  });

  it('answer 202 when the solve takes longer than the request waits, and 200 later', async () => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    const waiting = await designer.get(resultsPath(id, 1)).expect(202);
    expect(waiting.body).toEqual({ state: 'waiting', version: 1 });
    solver.jobs[0]?.end();
    await designer.get(resultsPath(id, 1)).expect(200);
    expect(solver.jobs).toHaveLength(1);
  });

  it('say what failed, and an edit that leads to the same input tries again', async () => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end({ end: 'failed', detail: 'It broke.' });
    const failed = await designer.get(resultsPath(id)).expect(200);
    expect(failed.body).toMatchObject({ state: 'failed', version: 1, problem: { status: 503, detail: 'It broke.' } });
    const [listed] = (await designer.get(`/api/sites/${server.siteId}/networks`)).body as NetworkSummary[];
    expect(listed?.solve).toEqual({ state: 'failed' });
    await sendBatch(designer, id, 1, batchOf([MOVE])).expect(200);
    solver.jobs[1]?.end();
    expect((await designer.get(resultsPath(id)).expect(200)).body).toMatchObject({ state: 'finished', version: 2 });
  });

  it('of a version that the network never had are not found', async () => {
    const { server, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    await designer.get(resultsPath(id, 2)).expect(404);
    await designer.get(resultsPath(id, 0)).expect(400);
  });

  it('are waited for no longer once the solver has closed', async () => {
    const server = new TestServer({ solver: { solve: () => Promise.resolve({ end: 'superseded' }) } });
    servers.push(server);
    const designer = server.as('designer');
    const id = await makeNetwork(designer, server.siteId);
    await designer.get(resultsPath(id)).expect(202);
  });

  it('of a version that was superseded before its solve began are computed for whoever asks', async () => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end({ end: 'superseded' });
    await sendBatch(designer, id, 1, batchOf([raise(1)])).expect(200);
    const asked = designer.get(resultsPath(id, 1)).expect(200);
    setTimeout(() => solver.jobs[2]?.end(), 50);
    expect((await asked).body).toMatchObject({ state: 'finished', version: 1 });
    const trap = solver.jobs[2]?.job.file.nodes.find((node) => node.id === 'T1');
    expect(trap?.elevationM).toBe(0);
    expect(solver.jobs[2]?.key).not.toBe(id);
  });
});

describe('bands that are to come', () => {
  const pressures = (id: string) => `${resultsPath(id, 1)}&bands=later`;
  const trapOf = (body: unknown) => {
    const results = body as NetworkResults;
    const outcome = results.state === 'finished' ? results.cases[0] : undefined;
    return outcome?.status === 'solved' ? outcome.result.traps[0] : undefined;
  };

  it('hold up nobody who asks for pressures, and are there for who asks for the whole', async () => {
    const { server, solver, designer } = withHeldSolver();
    solver.holdsBands = true;
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end();
    const first = await designer.get(pressures(id)).expect(200);
    expect(first.body).toMatchObject({ state: 'finished', version: 1, solveMs: 2, bandsToCome: true });
    expect(trapOf(first.body)).not.toHaveProperty('spread');
    const asked = designer.get(resultsPath(id, 1)).expect(200);
    setTimeout(() => solver.bandJobs[0]?.end(), 50);
    const whole = (await asked).body as NetworkResults;
    expect(whole).not.toHaveProperty('bandsToCome');
    expect(whole).toMatchObject({ solveMs: 2 });
    expect(trapOf(whole)?.backPressurePa).toBe(trapOf(first.body)?.backPressurePa);
    expect(trapOf(whole)?.credible).toBeDefined();
    // whoever asks for pressures once the whole is there gets the whole
    expect((await designer.get(pressures(id)).expect(200)).body).toEqual(whole);
    expect([solver.jobs.length, solver.bandJobs.length]).toEqual([1, 1]);
  });

  it('are never stored half: what is superseded before them is solved again for whoever asks', async () => {
    const { server, solver, designer } = withHeldSolver();
    solver.holdsBands = true;
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end();
    const asked = designer.get(resultsPath(id, 1)).expect(202);
    await until(() => solver.bandJobs.length === 1);
    setTimeout(() => solver.bandJobs[0]?.end({ end: 'superseded' }), 50);
    expect((await asked).body).toEqual({ state: 'waiting', version: 1 });
    expect(server.db.$client.prepare('select count(*) from solves').pluck().get()).toBe(0);
    const again = designer
      .get(resultsPath(id, 1))
      .expect(200)
      .then((answer) => answer);
    await until(() => solver.jobs.length === 2);
    solver.holdsBands = false;
    solver.jobs[1]?.end();
    expect(trapOf((await again).body)?.spread).toBeDefined();
  });

  it('and fail leave the pressures, which say so', async () => {
    const { server, solver, designer } = withHeldSolver();
    solver.holdsBands = true;
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end();
    await until(() => solver.bandJobs.length === 1);
    solver.bandJobs[0]?.end({ end: 'failed', detail: 'Too slow.' });
    const body: unknown = (await designer.get(resultsPath(id, 1)).expect(200)).body;
    expect(body).toMatchObject({ state: 'finished', cases: [{ status: 'solved' }] });
    const [outcome] = (body as Extract<NetworkResults, { state: 'finished' }>).cases;
    const warnings = outcome?.status === 'solved' ? outcome.result.warnings : [];
    expect(warnings.map(({ code }) => code)).toContain('bandsLeftOut');
  });
});

describe('a network without receivers', () => {
  it('is solved as far as it goes, and says what was left out', async () => {
    const { server, solver, designer } = withHeldSolver();
    const lonely = { id: 'T2', kind: 'trap', elevationM: 0, inletPressurePa: 3e5, loadKgS: 0.1 };
    const id = await makeNetwork(designer, server.siteId, { ...SMALL, nodes: [...SMALL.nodes, lonely] });
    solver.jobs[0]?.end();
    const answer = await designer.get(resultsPath(id)).expect(200);
    expect(answer.body).toMatchObject({ cases: [{ status: 'solved', result: { partial: true, leftOut: ['T2'] } }] });
  });
});

describe('the hash of what is solved', () => {
  const renamed: EditOp = { op: 'set', in: 'network', key: 'name', from: 'Small', to: 'Other' };
  const tagged: EditOp = { op: 'set', in: 'nodes', id: 'T1', key: 'tag', from: 'TR-1', to: 'TR-9' };
  const bent: EditOp = { op: 'set', in: 'pipes', id: 'L1', key: 'bends', to: [{ x: 10, y: 0 }] };
  const noted: EditOp = { op: 'set', in: 'pipes', id: 'L1', key: 'note', to: 'hot' };
  const gauged: EditOp = { op: 'add', in: 'gauges', ordinal: 0, value: { id: 'G1', node: 'J1', elevationM: 1 } };
  it.each([
    { name: 'a moved symbol', op: MOVE },
    { name: 'a new name', op: renamed },
    { name: 'a new tag', op: tagged },
    { name: 'a bend', op: bent },
    { name: 'a note', op: noted },
    { name: 'a gauge', op: gauged },
  ])('stays, and nothing is solved, after $name', async ({ op }) => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end();
    const before = (await designer.get(resultsPath(id)).expect(200)).body as NetworkResults;
    await sendBatch(designer, id, 1, batchOf([op])).expect(200);
    const after = (await designer.get(resultsPath(id)).expect(200)).body as NetworkResults;
    expect(after).toEqual({ ...before, version: 2 });
    expect(solver.jobs).toHaveLength(1);
  });

  it.each<{ name: string; op: EditOp }>([
    { name: 'an elevation', op: raise(1) },
    { name: 'a load', op: { op: 'set', in: 'nodes', id: 'T1', key: 'loadKgS', from: 0.05, to: 0.06 } },
    { name: 'a length', op: { op: 'set', in: 'pipes', id: 'L1', key: 'lengthM', from: 6, to: 7 } },
    { name: 'a case', op: { op: 'add', in: 'cases', ordinal: 0, value: { id: 'c', name: 'C' } } },
    {
      name: 'the site',
      op: {
        op: 'set',
        in: 'network',
        key: 'site',
        from: SMALL.site,
        to: { ...SMALL.site, atmosphericPressurePa: 95_000 },
      },
    },
  ])('changes with $name', async ({ op }) => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    await sendBatch(designer, id, 1, batchOf([op])).expect(200);
    expect(solver.jobs).toHaveLength(2);
    const [listed] = (await designer.get(`/api/sites/${server.siteId}/networks`)).body as NetworkSummary[];
    expect(listed?.solve).toEqual({ state: 'stale' });
  });

  it('comes back with an undo, whose results are there at once', async () => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    solver.jobs[0]?.end();
    const before = (await designer.get(resultsPath(id)).expect(200)).body as NetworkResults;
    await sendBatch(designer, id, 1, batchOf([raise(1)])).expect(200);
    await sendBatch(designer, id, 2, batchOf([raise(0, 1)], 'undo')).expect(200);
    const after = (await designer.get(resultsPath(id)).expect(200)).body as NetworkResults;
    expect(after).toEqual({ ...before, version: 3 });
    expect(solver.jobs).toHaveLength(2);
  });
});

describe('stored solves', () => {
  it('are pruned to the newest of each network', async () => {
    const { server, solver, designer } = withHeldSolver();
    const id = await makeNetwork(designer, server.siteId);
    const other = await makeNetwork(designer, server.siteId);
    for (const { end } of solver.jobs) end();
    for (let version = 1; version <= KEPT_SOLVES + 5; version += 1) {
      server.pass(1_000);
      await sendBatch(designer, id, version, batchOf([raise(version, version - 1)])).expect(200);
      solver.jobs.at(-1)?.end();
      await designer.get(resultsPath(id)).expect(200);
    }
    const count = (networkId: string) =>
      server.db.$client.prepare('select count(*) from solves where network_id = ?').pluck().get(networkId);
    expect(count(id)).toBe(KEPT_SOLVES);
    expect(count(other)).toBe(1);
    expect(server.db.$client.prepare('select count(*) from solve_results').pluck().get()).toBe(KEPT_SOLVES + 1);
  });
});

import type { Problem, SolveResult } from '@riseback/contracts';
import { relativeError } from '@riseback/numerics';
import { afterAll, describe, expect, it } from 'vitest';
import { SMALL } from './network-samples';
import { TestServer } from './test-server';

const server = new TestServer();
afterAll(() => {
  server.close();
});
const viewer = server.as('viewer');

describe('POST /api/solve', () => {
  it('answers anyone signed in what stands against each trap', async () => {
    const answer = await server.as('stranger').post('/api/solve', SMALL).expect(200);
    const result = answer.body as SolveResult;
    expect(result).toMatchObject({ case: '', converged: true });
    // 139,408 Pa = 101,325 + static 34,474 + friction 27 + flash 3,583: the acceptance figures of this network, within 0.2 %.
    // The static part is 10 ft at half a psi per foot (common practice).
    const [trap] = result.traps;
    expect(relativeError(trap?.backPressurePa ?? 0, 139_408)).toBeLessThan(2e-3);
    expect(relativeError(trap?.staticPa ?? 0, 34_474)).toBeLessThan(2e-3);
    expect(trap?.receiverPressurePa).toBe(101_325);
    await server.as('anonymous').post('/api/solve', SMALL).expect(401);
  });

  it('takes the named case, else the first', async () => {
    const cases = [
      { id: 'half', name: 'Half', loadFactor: 0.5 },
      { id: 'full', name: 'Full' },
    ];
    const flow = (body: unknown) => (body as SolveResult).pipes[0]?.massFlowKgS;
    const first = await viewer.post('/api/solve', { ...SMALL, cases }).expect(200);
    expect(first.body).toMatchObject({ case: 'half' });
    expect(flow(first.body)).toBe(0.025);
    const full = await viewer.post('/api/solve?case=full', { ...SMALL, cases }).expect(200);
    expect(flow(full.body)).toBe(0.05);
    const unknown = await viewer.post('/api/solve?case=other', { ...SMALL, cases }).expect(400);
    expect((unknown.body as Problem).detail).toContain('other');
  });

  it.each([
    { name: 'an unknown key', file: { ...SMALL, colour: 'red' }, pointer: '/colour' },
    {
      name: 'a trap that fails open through no known orifice',
      file: { ...SMALL, cases: [{ id: 'open', name: 'Open', overrides: [{ node: 'T1', state: 'failedOpen' }] }] },
      pointer: '/cases/0/overrides/0',
    },
    { name: 'a trap that reaches no receiver', file: { ...SMALL, pipes: [SMALL.pipes[0]] }, pointer: '/nodes/0' },
  ])('refuses what can be seen without computing: $name', async ({ file, pointer }) => {
    const refused = await viewer.post('/api/solve', file).expect(400);
    expect(refused.headers['content-type']).toContain('application/problem+json');
    expect((refused.body as Problem).errors?.map((error) => error.pointer)).toContain(pointer);
  });

  it('answers 200 with converged false where there is no solution', async () => {
    // 10 kg/s of flashing condensate through 2 mm: no pressure within the steam tables drives it
    const pipes = SMALL.pipes.map(({ size: _, ...pipe }) => ({ ...pipe, insideDiameterM: 0.002 }));
    const nodes = SMALL.nodes.map((node) => (node.kind === 'trap' ? { ...node, loadKgS: 10 } : node));
    const answer = await viewer.post('/api/solve', { ...SMALL, nodes, pipes }).expect(200);
    expect(answer.body).toMatchObject({ converged: false, problem: { type: '/problems/no-solution' } });
  });

  it('stores nothing', async () => {
    await server.as('designer').post('/api/solve', SMALL).expect(200);
    expect(server.db.$client.prepare('select count(*) from networks').pluck().get()).toBe(0);
    expect(server.db.$client.prepare('select count(*) from solves').pluck().get()).toBe(0);
  });

  it('says 503 when the solve was stopped', async () => {
    const stopped = new TestServer({
      fileSolver: {
        solveText: () => Promise.resolve({ end: 'failed', detail: 'The solve took more than 10 s and was stopped.' }),
      },
    });
    const refused = await stopped.as('viewer').post('/api/solve', SMALL).expect(503);
    expect(refused.body).toMatchObject({
      type: '/problems/solve-failed',
      detail: expect.stringContaining('10 s') as string,
    });
    stopped.close();
  });
});

import type { NetworkResults } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { withUnchangedKept } from './kept-results';

type Finished = Extract<NetworkResults, { state: 'finished' }>;

/** Made anew at each call, as an answer of the server is. */
function results(secondPa: number, version = 1): Finished {
  const node = (id: string, pressurePa: number) => ({
    id,
    pressurePa,
    temperatureK: 400,
    enthalpyJKg: 5e5,
    quality: 0.1,
    massFlowKgS: 0.2,
  });
  const warning = {
    code: 'slug',
    element: 'P1',
    verdict: 'watch' as const,
    message: 'Slugs ride up.',
    text: ['Slugs ride up.'],
  };
  const result = {
    case: '',
    converged: true,
    iterations: 1,
    nodes: [node('A', 1.2e5), node('B', secondPa)],
    pipes: [],
    traps: [],
    warnings: [warning],
  };
  return {
    state: 'finished',
    version,
    solverHash: String(version),
    engineVersion: '1',
    finishedAt: '2026-12-01T00:00:00Z',
    solveMs: 1,
    cases: [{ caseId: '', status: 'solved', result }],
  };
}

function resultOf({ cases: [outcome] }: Finished) {
  if (outcome?.status !== 'solved') throw new Error('the case is not solved');
  return outcome.result;
}

describe('withUnchangedKept', () => {
  it('hands out the same objects where nothing is said anew, and the new ones elsewhere', () => {
    const before = results(1.3e5);
    const now = results(1.4e5, 2);
    const kept = withUnchangedKept(now, before);
    expect(kept).toEqual(now);
    expect(resultOf(kept).nodes[0]).toBe(resultOf(before).nodes[0]);
    expect(resultOf(kept).nodes[1]).toBe(resultOf(now).nodes[1]);
    expect(resultOf(kept).warnings[0]).toBe(resultOf(before).warnings[0]);
  });

  it('has nothing to keep of the first results, nor of a case that was refused', () => {
    const now = results(1.3e5);
    expect(withUnchangedKept(now, null)).toBe(now);
    const problem = { type: 'about:blank', title: 'Refused', status: 422, detail: 'No way down.', errors: [] };
    const refused: Finished = { ...now, cases: [{ caseId: '', status: 'refused', problem }] };
    expect(resultOf(withUnchangedKept(now, refused)).nodes[0]).toBe(resultOf(now).nodes[0]);
  });
});

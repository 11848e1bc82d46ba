import type { SolveResult } from '@riseback/contracts';
import { findings } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import type { ListContext } from './columns/column';
import { listContext } from './list-context';
import { findingSummary } from './row-findings';
import { trialDocument } from './testing/trial-document';

const document = trialDocument();
const trap = {
  id: 'T1',
  backPressurePa: 2e5,
  receiverPressurePa: 101_325,
  staticPa: 50_000,
  frictionPa: 40_000,
  flashPa: 8_675,
  differentialPa: 418_432,
  handCheck: { staticPa: 50_000, backPressurePa: 151_325 },
  walk: ['L1', 'L2'],
  notChecked: [],
  checks: [
    { code: 'differential', verdict: 'pass', message: '', text: [''] },
    { code: 'backPressureFraction', verdict: 'watch', message: '', text: ['Near the limit.'] },
    { code: 'capacity', verdict: 'fail', message: '', text: ['It passes ', { quantity: 'massFlow', si: 0.1 }, '.'] },
  ],
} satisfies SolveResult['traps'][number];
const result: SolveResult = {
  case: 'design',
  converged: true,
  iterations: 1,
  nodes: [],
  pipes: [],
  traps: [trap],
  warnings: [{ code: 'velocity', element: 'L1', verdict: 'watch', message: '', text: ['Fast.'] }],
  partial: true,
  leftOut: ['T2'],
};

function context(change: Partial<Parameters<typeof listContext>[0]> = {}): ListContext {
  return listContext({
    document,
    units: { system: 'us', atmosphericPressurePa: 101_325 },
    topology: findings(document),
    outcome: { caseId: 'design', status: 'solved', result },
    result,
    traps: new Map([['T1', trap]]),
    pipes: new Map(),
    nodes: new Map(),
    ...change,
  });
}

describe('what stands against an element', () => {
  it('is named with the worst first, in the units of the person', () => {
    const [worst, second, ...rest] = context().findings.get('T1') ?? [];
    expect(worst).toMatchObject({ status: 'fail', word: 'Capacity' });
    // 0.1 kg/s × 3600 s/h × 2.20462 lb/kg
    expect(worst?.sentences).toEqual(['It passes 794 lb/h.']);
    expect(second).toMatchObject({ status: 'watch', code: 'backPressureFraction' });
    expect(rest).toEqual([]);
    expect(findingSummary(context().findings.get('T1') ?? [])).toBe('Capacity +1');
    expect(context().findings.get('L1')).toMatchObject([{ status: 'watch', word: 'Velocity' }]);
  });

  it('includes what is wrong with the drawing', () => {
    expect(context().findings.get('T2')).toMatchObject([{ status: 'fail', code: 'cutOff' }]);
  });
});

describe('why there is no result', () => {
  it('is that it cannot reach a receiver, that it is new, or that the case cannot be solved', () => {
    expect(context().waiting('T1')).toBeNull();
    expect(context().waiting('T2')).toMatchObject({ words: 'Waiting for a way to a receiver' });
    expect(context().waiting('J1')).toMatchObject({ words: 'Waiting for the solve' });
    const problem = { type: 'about:blank', title: 'No', status: 400, detail: 'failedOpen is not available yet' };
    const refused = context({ result: null, outcome: { caseId: 'design', status: 'refused', problem } });
    expect(refused.waiting('T1')).toEqual({
      words: 'Case not solved',
      sentence: 'Case not solved: failedOpen is not available yet.',
    });
  });
});

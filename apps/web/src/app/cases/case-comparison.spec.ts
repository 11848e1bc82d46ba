import type { CaseOutcome, SolveResult, TrapResult, Verdict } from '@riseback/contracts';
import { fromFile, inOrder, NetworkFileShape } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { worstOfCases } from '@riseback/figures';
import { compareCases, ordered } from './case-comparison';

const units = { system: 'si', atmosphericPressurePa: 100_000 } as const;
const document = fromFile(
  NetworkFileShape.parse({
    format: 'riseback-network',
    version: 1,
    name: 'Three traps',
    nodes: ['TR-10', 'TR-9', 'TR-11'].map((tag, i) => ({
      id: `T${String(i)}`,
      kind: 'trap',
      tag,
      elevationM: 0,
      inletPressurePa: 6e5,
      loadKgS: 0.05,
    })),
    cases: [
      { id: 'design', name: 'Design', overrides: [] },
      { id: 'half', name: 'Half load', loadFactor: 0.5, overrides: [{ node: 'T1', state: 'isolated' }] },
      { id: 'open', name: 'Open', overrides: [] },
    ],
  }),
);
const cases = inOrder(document.cases).map(([, { value }]) => value);

const trap = (id: string, backPressurePa: number, verdict?: Verdict): TrapResult => ({
  id,
  backPressurePa,
  receiverPressurePa: 1e5,
  staticPa: 0,
  frictionPa: 0,
  flashPa: 0,
  differentialPa: 0,
  handCheck: { staticPa: 0, backPressurePa: 1e5 },
  walk: [],
  checks: verdict === undefined ? [] : [{ code: 'capacity', verdict, message: '', text: [] }],
  notChecked: [],
});
const solved = (caseId: string, traps: TrapResult[], more: Partial<SolveResult> = {}): CaseOutcome => ({
  caseId,
  status: 'solved',
  result: { case: caseId, converged: true, iterations: 1, nodes: [], pipes: [], traps, warnings: [], ...more },
});
const outcomes = [
  solved('design', [trap('T0', 1.5e5, 'watch'), trap('T1', 1.6e5, 'pass')]),
  solved('half', [trap('T0', 1.2e5, 'pass'), trap('T1', 1.4e5)]),
  {
    caseId: 'open',
    status: 'refused',
    problem: { type: '/problems/invalid', title: 'Cannot be solved', status: 400, detail: 'T2 has no orifice' },
  } satisfies CaseOutcome,
];
const compared = compareCases(
  document,
  cases,
  new Map(outcomes.map((outcome) => [outcome.caseId, outcome])),
  worstOfCases(outcomes),
  units,
);

describe('compareCases', () => {
  it('heads each case with its counts, or with why it has no result', () => {
    expect(compared.heads).toEqual([
      { id: 'design', name: 'Design', load: '100 %', counts: { traps: 2, fail: 0, watch: 1 }, refusal: '' },
      { id: 'half', name: 'Half load', load: '50 %', counts: { traps: 2, fail: 0, watch: 0 }, refusal: '' },
      { id: 'open', name: 'Open', load: '100 %', counts: null, refusal: 'T2 has no orifice' },
    ]);
  });

  it('prints what stands behind each trap in each case, with its verdict and what the case sets', () => {
    const row = compared.traps.find(({ id }) => id === 'T1');
    expect(row?.cells.map(({ status, backPressure, changes }) => [status, backPressure, changes])).toEqual([
      ['pass', '60.0', ''],
      ['none', '40.0', 'isolated'],
      ['none', '', ''],
    ]);
    expect(row?.worst).toMatchObject({ caseName: 'Design', backPressure: '60.0', status: 'pass' });
  });

  it('puts the worst first and traps without a result last, or goes by tag as a person counts', () => {
    expect(ordered(compared.traps, 'worst').map(({ tag }) => tag)).toEqual(['TR-10', 'TR-9', 'TR-11']);
    expect(ordered(compared.traps, 'tag').map(({ tag }) => tag)).toEqual(['TR-9', 'TR-10', 'TR-11']);
  });

  it('says of a case without a solution what the solver said', () => {
    const problem = { type: '/problems/no-solution', title: 'No solution', status: 422, detail: 'At L3: too hot' };
    const stuck = solved('design', [trap('T0', 9e5, 'fail')], { converged: false, problem });
    const { heads, traps } = compareCases(document, cases.slice(0, 1), new Map([['design', stuck]]), null, units);
    expect(heads[0]).toMatchObject({ counts: null, refusal: 'At L3: too hot' });
    expect(traps[0]).toMatchObject({ worst: null, cells: [{ backPressure: '' }] });
  });
});

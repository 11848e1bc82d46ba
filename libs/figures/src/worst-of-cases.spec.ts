import type { CaseOutcome, NodeResult, PipeResult, SolveResult, TrapResult, Verdict } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { countVerdicts } from './verdict';
import { worstOfCases } from './worst-of-cases';

const trap = (id: string, backPressurePa: number, ...verdicts: Verdict[]): TrapResult => ({
  id,
  backPressurePa,
  receiverPressurePa: 101_325,
  staticPa: 0,
  frictionPa: 0,
  flashPa: backPressurePa - 101_325,
  differentialPa: 6e5 - backPressurePa,
  handCheck: { staticPa: 0, backPressurePa: 101_325 },
  walk: [`L-${id}`],
  checks: verdicts.map((verdict) => ({ code: 'capacity', verdict, message: '', text: [] })),
  notChecked: [],
});
const node = (id: string, pressurePa: number): NodeResult => ({
  id,
  pressurePa,
  temperatureK: 400,
  enthalpyJKg: 5e5,
  quality: 0.1,
  massFlowKgS: 0.1,
});
const pipe = (id: string, upstreamPressurePa: number, mixtureVelocityMS: number): PipeResult => ({
  id,
  massFlowKgS: 0.1,
  upstreamPressurePa,
  downstreamPressurePa: 101_325,
  staticPa: 0,
  frictionPa: 0,
  flashPa: upstreamPressurePa - 101_325,
  upstreamQuality: 0.1,
  downstreamQuality: 0.1,
  liquidVelocityMS: 1,
  mixtureVelocityMS,
});
const warning = (element: string, verdict: 'watch' | 'fail', code = 'velocity') => ({
  code,
  element,
  verdict,
  message: '',
  text: [],
});
const solved = (caseId: string, result: Partial<SolveResult>): CaseOutcome => ({
  caseId,
  status: 'solved',
  result: { case: caseId, converged: true, iterations: 1, nodes: [], pipes: [], traps: [], warnings: [], ...result },
});
const refused = (caseId: string): CaseOutcome => ({
  caseId,
  status: 'refused',
  problem: { type: '/problems/not-available', title: 'Not available', status: 400 },
});

/** The case and back pressure that stand for each trap. */
function standing(...outcomes: CaseOutcome[]): Record<string, [string | undefined, number]> {
  const worst = worstOfCases(outcomes);
  return Object.fromEntries(
    (worst?.result.traps ?? []).map(({ id, backPressurePa }) => [id, [worst?.caseOf.get(id), backPressurePa]]),
  );
}

describe('worstOfCases', () => {
  it('lets the worst verdict count before the highest pressure', () => {
    expect(
      standing(
        solved('design', { traps: [trap('T1', 3e5, 'watch', 'pass'), trap('T2', 2e5, 'pass')] }),
        solved('turndown', { traps: [trap('T1', 2e5, 'pass', 'fail'), trap('T2', 1.5e5, 'watch')] }),
      ),
    ).toEqual({ T1: ['turndown', 2e5], T2: ['turndown', 1.5e5] });
  });

  it('takes the highest back pressure among equal verdicts, the earlier case among equals altogether', () => {
    expect(
      standing(
        solved('design', { traps: [trap('T1', 2e5, 'fail'), trap('T2', 2e5, 'pass')] }),
        solved('start-up', { traps: [trap('T1', 2.5e5, 'fail'), trap('T2', 2e5, 'pass')] }),
      ),
    ).toEqual({ T1: ['start-up', 2.5e5], T2: ['design', 2e5] });
  });

  it('never lets a trap that is shut off and not checked stand for one that runs', () => {
    expect(
      standing(
        solved('isolated', { traps: [trap('T1', 4e5)] }),
        solved('design', { traps: [trap('T1', 2e5, 'pass')] }),
      ),
    ).toEqual({ T1: ['design', 2e5] });
  });

  it('counts what the solver found about a trap with its checks', () => {
    const outcomes = [
      solved('design', { traps: [trap('T1', 3e5, 'pass')] }),
      solved('open', { traps: [trap('T1', 2e5, 'pass')], warnings: [warning('T1', 'watch', 'blowThrough')] }),
    ];
    expect(standing(...outcomes)).toEqual({ T1: ['open', 2e5] });
    const worst = worstOfCases(outcomes);
    expect(worst === null ? null : countVerdicts(worst.result)).toEqual({ traps: 1, fail: 0, watch: 1 });
  });

  it('counts each trap once, by its worst', () => {
    const worst = worstOfCases([
      solved('a', { traps: [trap('T1', 2e5, 'fail'), trap('T2', 2e5, 'pass'), trap('T3', 2e5, 'pass')] }),
      solved('b', { traps: [trap('T1', 2e5, 'fail'), trap('T2', 2e5, 'watch'), trap('T3', 2e5, 'pass')] }),
    ]);
    expect(worst === null ? null : countVerdicts(worst.result)).toEqual({ traps: 3, fail: 1, watch: 1 });
  });

  it('keeps a trap’s node and findings with the case that stands for the trap', () => {
    const worst = worstOfCases([
      solved('a', {
        traps: [trap('T1', 2e5, 'fail')],
        nodes: [node('T1', 2e5)],
        warnings: [warning('T1', 'watch', 'a')],
      }),
      solved('b', {
        traps: [trap('T1', 3e5, 'pass')],
        nodes: [node('T1', 3e5)],
        warnings: [warning('T1', 'watch', 'b')],
      }),
    ]);
    expect(worst?.result.nodes).toEqual([node('T1', 2e5)]);
    expect(worst?.result.warnings.map(({ code }) => code)).toEqual(['a']);
  });

  it('shows junctions and pipes by what was found about them, then by pressure', () => {
    const worst = worstOfCases([
      solved('a', {
        nodes: [node('J1', 1.5e5)],
        pipes: [pipe('L1', 2e5, 40), pipe('L2', 1.2e5, 5)],
        warnings: [warning('L1', 'fail'), warning('', 'watch', 'whole')],
      }),
      solved('b', {
        nodes: [node('J1', 1.8e5)],
        pipes: [pipe('L1', 3e5, 30), pipe('L2', 1.4e5, 6)],
        warnings: [warning('L1', 'watch')],
      }),
    ]);
    expect(worst?.result.nodes).toEqual([node('J1', 1.8e5)]);
    expect(worst?.result.pipes).toEqual([pipe('L1', 2e5, 40), pipe('L2', 1.4e5, 6)]);
    expect(worst?.result.warnings).toEqual([warning('L1', 'fail'), warning('', 'watch', 'whole')]);
    expect(worst?.caseOf).toEqual(
      new Map([
        ['J1', 'b'],
        ['L1', 'a'],
        ['L2', 'b'],
      ]),
    );
  });

  it('names the cases that gave nothing: refused, or without a solution', () => {
    const stuck = solved('stuck', { converged: false, traps: [trap('T1', 9e5, 'fail')] });
    const worst = worstOfCases([refused('open'), solved('design', { traps: [trap('T1', 2e5, 'pass')] }), stuck]);
    expect(worst?.unanswered).toEqual(['open', 'stuck']);
    expect(worst?.caseOf.get('T1')).toBe('design');
    expect(worstOfCases([refused('open'), stuck])).toBeNull();
    expect(worstOfCases([])).toBeNull();
  });

  it('leaves out what every case left out', () => {
    const worst = worstOfCases([
      solved('a', { partial: true, leftOut: ['T1', 'T2'] }),
      solved('b', { partial: true, leftOut: ['T2'], traps: [trap('T1', 2e5, 'pass')] }),
    ]);
    expect(worst?.result).toMatchObject({ partial: true, leftOut: ['T2'] });
  });
});

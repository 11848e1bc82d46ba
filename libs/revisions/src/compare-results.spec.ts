import type { Verdict } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import {
  byEffect,
  type ComparedOutcome,
  type ComparedResult,
  compareResults,
  compareSolves,
  hasMoved,
  MOVED_PA,
} from './compare-results';

type Trap = readonly [id: string, backPressurePa: number, verdict?: Verdict];
type Finding = readonly [element: string, code: string, verdict: 'watch' | 'fail'];

function result(traps: readonly Trap[], findings: readonly Finding[] = []): ComparedResult {
  return {
    converged: true,
    traps: traps.map(([id, backPressurePa, verdict]) => ({
      id,
      backPressurePa,
      differentialPa: 6e5 - backPressurePa,
      checks: verdict === undefined ? [] : [{ verdict }],
    })),
    warnings: findings.map(([element, code, verdict]) => ({ element, code, verdict })),
  };
}

function solved(caseId: string, traps: readonly Trap[], findings: readonly Finding[] = []): ComparedOutcome {
  return { caseId, status: 'solved', result: result(traps, findings) };
}

describe('what became of results', () => {
  it('tells back pressure, differential and verdict before and after, and the change', () => {
    const { cases } = compareResults(
      [solved('design', [['T1', 3e5, 'fail']])],
      [solved('design', [['T1', 2.6e5, 'watch']])],
    );
    expect(cases).toEqual([
      {
        caseId: 'design',
        in: 'both',
        unsolvedBefore: undefined,
        unsolvedAfter: undefined,
        traps: [
          {
            id: 'T1',
            before: { caseId: 'design', backPressurePa: 3e5, differentialPa: 3e5, verdict: 'fail' },
            after: { caseId: 'design', backPressurePa: 2.6e5, differentialPa: 3.4e5, verdict: 'watch' },
            changePa: -4e4,
            turned: 'better',
          },
        ],
        findings: [],
      },
    ]);
  });

  it('puts turned verdicts first, the further the earlier, then the largest move either way', () => {
    const before = result([
      ['T1', 2e5, 'pass'],
      ['T2', 2e5, 'pass'],
      ['T3', 2e5, 'fail'],
      ['T4', 2e5, 'watch'],
      ['T5', 2e5, 'pass'],
    ]);
    const after = result([
      ['T1', 2.5e5, 'pass'],
      ['T2', 1.2e5, 'pass'],
      ['T3', 1.99e5, 'pass'],
      ['T4', 2.01e5, 'fail'],
      ['T5', 2e5, 'pass'],
    ]);
    expect(compareSolves(before, after).traps.map(({ id }) => id)).toEqual(['T3', 'T4', 'T2', 'T1', 'T5']);
  });

  it('takes the worst of the checks and of what was found about the trap for its verdict', () => {
    const before = result([['T1', 2e5, 'watch']]);
    const [trap] = compareSolves(before, result([['T1', 2e5, 'watch']], [['T1', 'chokedOutlet', 'fail']])).traps;
    expect(trap).toMatchObject({ before: { verdict: 'watch' }, after: { verdict: 'fail' }, turned: 'worse' });
  });

  it('knows traps and cases that only one of the two has, and why a case has no pressures', () => {
    const problem = { detail: 'No solution above absolute zero.' };
    const { cases } = compareResults(
      [solved('design', [['T1', 2e5]]), solved('old', [['T1', 2e5]]), { caseId: 'start', status: 'refused', problem }],
      [
        solved('new', []),
        solved('design', [['T2', 2e5]]),
        { caseId: 'start', status: 'solved', result: { ...result([['T1', 1]]), converged: false } },
      ],
    );
    expect(
      cases.map(({ caseId, in: there, unsolvedBefore, unsolvedAfter }) => [
        caseId,
        there,
        unsolvedBefore,
        unsolvedAfter,
      ]),
    ).toEqual([
      ['new', 'after', undefined, undefined],
      ['design', 'both', undefined, undefined],
      ['start', 'both', 'No solution above absolute zero.', 'No solution was found.'],
      ['old', 'before', undefined, undefined],
    ]);
    const [, design, start] = cases;
    expect(
      design?.traps.map(({ id, before, after, changePa, turned }) => [
        id,
        before?.caseId,
        after?.caseId,
        changePa,
        turned,
      ]),
    ).toEqual([
      ['T1', 'design', undefined, undefined, 'same'],
      ['T2', undefined, 'design', undefined, 'same'],
    ]);
    // what did not converge has numbers of its last attempt, which are nobody's pressures
    expect(start?.traps).toEqual([]);
  });

  it('holds each trap’s worst case before against its worst case after', () => {
    const { worst } = compareResults(
      [
        solved('design', [
          ['T1', 2e5, 'pass'],
          ['T2', 4e5, 'pass'],
        ]),
        solved('start', [
          ['T1', 1.5e5, 'fail'],
          ['T2', 3e5, 'pass'],
        ]),
      ],
      [
        solved('design', [
          ['T1', 2e5, 'pass'],
          ['T2', 3e5, 'watch'],
        ]),
        solved('start', [
          ['T1', 3e5, 'pass'],
          ['T2', 3.5e5, 'watch'],
        ]),
      ],
    );
    // the worse verdict before the higher pressure; of equal verdicts the higher pressure
    expect(worst.traps).toMatchObject([
      {
        id: 'T1',
        before: { caseId: 'start', verdict: 'fail' },
        after: { caseId: 'start', verdict: 'pass' },
        changePa: 1.5e5,
      },
      {
        id: 'T2',
        before: { caseId: 'design', verdict: 'pass' },
        after: { caseId: 'start', verdict: 'watch' },
        changePa: -5e4,
      },
    ]);
  });

  it('tells findings elsewhere than at traps that go, come, and change their weight', () => {
    const before = result(
      [['T1', 2e5]],
      [
        ['L1', 'velocity', 'watch'],
        ['L2', 'gradient', 'watch'],
        ['T1', 'slug', 'watch'],
        ['L4', 'momentum', 'watch'],
      ],
    );
    const after = result(
      [['T1', 2e5]],
      [
        ['L1', 'velocity', 'fail'],
        ['L3', 'gradient', 'watch'],
        ['L4', 'momentum', 'watch'],
      ],
    );
    expect(compareSolves(before, after).findings).toEqual([
      { element: 'L1', code: 'velocity', from: 'watch', to: 'fail' },
      { element: 'L2', code: 'gradient', from: 'watch', to: 'pass' },
      { element: 'L3', code: 'gradient', from: 'pass', to: 'watch' },
    ]);
  });

  it('says nothing is better or worse where one of the two was not judged', () => {
    expect(compareSolves(result([['T1', 2e5]]), result([['T1', 2e5, 'fail']])).traps[0]?.turned).toBe('apart');
  });

  it('counts a trap as moved from a tenth of a psi on', () => {
    const moved = (by: number) => compareSolves(result([['T1', 2e5]]), result([['T1', 2e5 + by]])).traps.map(hasMoved);
    // 1 psi is 6,894.757 293 Pa (NIST SP 811), a tenth of it 689.4757
    expect(MOVED_PA).toBe(689.475_729);
    expect(moved(689.4)).toEqual([false]);
    expect(moved(-689.5)).toEqual([true]);
  });

  it('compares in the same order whichever way it is asked, and not at all where nothing is to be seen', () => {
    const [a] = compareSolves(result([['T1', 2e5]]), result([['T1', 2e5 + 0.5]])).traps;
    const [b] = compareSolves(result([['T2', 2e5]]), result([['T2', 2e5]])).traps;
    expect(a && b && byEffect(a, b)).toBe(0);
  });
});

import { describe, expect, it } from 'vitest';
import type { SolveResult, TrapResult, Verdict } from '@riseback/contracts';
import { trialDocument } from '../lists/testing/trial-document';
import { effectsOf } from './effects';
import { turnWords } from './turns';

const document = trialDocument();
const words = { message: '', text: [] };

function trap(id: string, backPressurePa: number, verdict: Verdict): TrapResult {
  return {
    id,
    backPressurePa,
    receiverPressurePa: 101_325,
    staticPa: 0,
    frictionPa: 0,
    flashPa: 0,
    differentialPa: 1e5,
    handCheck: { staticPa: 0, backPressurePa: 101_325 },
    walk: [],
    checks: [{ code: 'differential', verdict, ...words }],
    notChecked: [],
  };
}

function result(traps: TrapResult[], warnings: [element: string, code: string][] = []): SolveResult {
  return {
    case: '',
    converged: true,
    iterations: 1,
    nodes: [],
    pipes: [],
    traps,
    warnings: warnings.map(([element, code]) => ({ element, code, verdict: 'watch', ...words })),
  };
}

describe('what a trial does', () => {
  it('puts turned verdicts first, then the largest move of the back pressure', () => {
    const before = result([trap('T1', 2e5, 'pass'), trap('T2', 2e5, 'fail')]);
    const { traps } = effectsOf(document, before, result([trap('T1', 1.2e5, 'pass'), trap('T2', 1.9e5, 'pass')]));
    expect(traps.map(({ tag, turned, changePa }) => [tag, turned, changePa])).toEqual([
      ['TR-10', 'better', -1e4],
      ['TR-2', 'same', -8e4],
    ]);
  });

  it('counts what is turned, better apart from worse', () => {
    const before = result([trap('T1', 2e5, 'pass'), trap('T2', 2e5, 'fail')]);
    const after = result([trap('T1', 2e5, 'watch'), trap('T2', 2e5, 'pass')]);
    expect(turnWords(effectsOf(document, before, after).turns)).toBe('Better: 1 fail to pass. Worse: 1 pass to watch.');
    expect(turnWords(effectsOf(document, before, before).turns)).toBe('No verdict is turned.');
  });

  it('has no change where one of the two has no result', () => {
    const { traps } = effectsOf(document, result([trap('T1', 2e5, 'pass')]), result([]));
    expect(traps.find(({ id }) => id === 'T1')).toMatchObject({ before: 'pass', after: 'none', changePa: undefined });
  });

  it('tells findings at pipes that go, come, and change their weight', () => {
    const before = result(
      [],
      [
        ['L1', 'velocity'],
        ['L2', 'gradient'],
        ['L1', 'momentum'],
      ],
    );
    const after = result(
      [],
      [
        ['L2', 'gradient'],
        ['L2', 'velocity'],
        ['L1', 'momentum'],
      ],
    );
    const heavier = {
      ...before,
      warnings: before.warnings.map((warning) => ({ ...warning, verdict: 'fail' as const })),
    };
    const told = (found: readonly { name: string; code: string; from: string; to: string }[]) =>
      found.map(({ name, code, from, to }) => [name, code, from, to]);
    expect(told(effectsOf(document, before, after).eased)).toEqual([['CR-1', 'velocity', 'watch', 'pass']]);
    expect(told(effectsOf(document, before, after).worsened)).toEqual([['CR-2', 'velocity', 'pass', 'watch']]);
    expect(told(effectsOf(document, heavier, after).eased)).toEqual([
      ['CR-1', 'velocity', 'fail', 'pass'],
      ['CR-1', 'momentum', 'fail', 'watch'],
      ['CR-2', 'gradient', 'fail', 'watch'],
    ]);
  });
});

import type { NetworkResults, TrapCheck, TrapResult } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { withBandsBefore } from './bands-before';

type Finished = Extract<NetworkResults, { state: 'finished' }>;

const check = (code: string, verdict: TrapCheck['verdict'], message = ''): TrapCheck => ({
  code,
  verdict,
  message,
  text: [message],
});
const BAND = { lowPa: 1.1e5, highPa: 2e5 };

function trap(checks: TrapCheck[], more: Partial<TrapResult> = {}): TrapResult {
  return {
    id: 'T1',
    backPressurePa: 1.5e5,
    receiverPressurePa: 1e5,
    staticPa: 5e4,
    frictionPa: 0,
    flashPa: 0,
    differentialPa: 3e5,
    handCheck: { staticPa: 5e4, backPressurePa: 1.5e5 },
    walk: ['L1'],
    checks,
    notChecked: [],
    ...more,
  };
}

function results(traps: TrapResult[], more: Partial<Finished> = {}): Finished {
  const result = { case: 'a', converged: true, iterations: 1, nodes: [], pipes: [], traps, warnings: [] };
  return {
    state: 'finished',
    version: 2,
    solverHash: 'h',
    engineVersion: '1',
    finishedAt: '2026-03-02T08:00:00.000Z',
    solveMs: 1,
    cases: [{ caseId: 'a', status: 'solved', result }],
    ...more,
  };
}

function trapIn({ cases: [outcome] }: Finished): TrapResult | undefined {
  return outcome?.status === 'solved' ? outcome.result.traps[0] : undefined;
}

const before = results([
  trap([check('capacity', 'watch', 'by the band'), check('bodyRating', 'watch', 'of before')], {
    spread: BAND,
    credible: BAND,
    backPressurePa: 1.4e5,
  }),
]);

describe('results whose bands are to come', () => {
  const first = results([trap([check('capacity', 'pass'), check('bodyRating', 'pass')])], { bandsToCome: true });

  it('keep their own pressures beside the bands and banded watches of before', () => {
    expect(trapIn(withBandsBefore(first, before))).toMatchObject({
      backPressurePa: 1.5e5,
      spread: BAND,
      credible: BAND,
      checks: [
        { code: 'capacity', verdict: 'watch', message: 'by the band' },
        { code: 'bodyRating', verdict: 'pass' },
      ],
    });
  });

  it('keep a fail of their own whatever was before', () => {
    const failing = results([trap([check('capacity', 'fail', 'now')])], { bandsToCome: true });
    expect(trapIn(withBandsBefore(failing, before))?.checks).toMatchObject([{ verdict: 'fail', message: 'now' }]);
  });

  it('stand alone where nothing was before, and where the trap is new', () => {
    expect(withBandsBefore(first, null)).toBe(first);
    const other = results([trap([], { id: 'T2' })], { bandsToCome: true });
    expect(trapIn(withBandsBefore(other, before))).not.toHaveProperty('spread');
  });
});

describe('whole results', () => {
  it('take nothing of before', () => {
    const whole = results([trap([check('capacity', 'pass')])]);
    expect(withBandsBefore(whole, before)).toBe(whole);
  });
});

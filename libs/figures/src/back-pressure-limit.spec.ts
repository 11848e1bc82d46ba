import type { TrapCheck, TrapResult } from '@riseback/contracts';
import type { Trap, TrapModel } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { backPressureLimit } from './back-pressure-limit';

const US = { system: 'us', atmosphericPressurePa: 100_000 } as const;
const trap: Trap = {
  id: 'T1',
  kind: 'trap',
  elevationM: 0,
  inletPressurePa: 500_000,
  loadKgS: 0.05,
  loadTolerance: 0.1,
  subcoolingK: 0,
  discharge: 'continuous',
  peakFactor: 1,
  sizingFactor: 2,
  service: { kind: 'constant' },
};
/** An ideal orifice: 0.1 kg/s at 1 bar, 0.2 at 4 bar, as the square root. */
const model: TrapModel = {
  id: 'M1',
  name: 'Seat 4',
  capacity: [
    { differentialPa: 100_000, flowKgS: 0.1 },
    { differentialPa: 400_000, flowKgS: 0.2 },
  ],
};
const check = (code: string, limit: number): TrapCheck => ({ code, verdict: 'pass', limit, message: '', text: [] });
const result = (...checks: TrapCheck[]): TrapResult => ({
  id: 'T1',
  backPressurePa: 200_000,
  receiverPressurePa: 200_000,
  staticPa: 0,
  frictionPa: 0,
  flashPa: 0,
  differentialPa: 300_000,
  handCheck: { staticPa: 0, backPressurePa: 200_000 },
  walk: [],
  checks,
  notChecked: [],
});

describe('backPressureLimit', () => {
  it('is where the capacity falls to what is needed', () => {
    // 0.15 kg/s passes at (0.15/0.1)² = 2.25 bar, so 5.00 − 2.25 bar may stand behind the trap
    const limit = backPressureLimit(result(check('capacity', 0.15)), trap, model, US);
    expect(limit?.word).toBe('2 × load');
    expect(limit?.pressurePa).toBeGreaterThan(274_999.9);
    expect(limit?.pressurePa).toBeLessThan(275_000.1);
  });

  it('is the share of the inlet that the check allows', () => {
    // half of 4 bar gauge above 1 bar
    expect(backPressureLimit(result(check('backPressureFraction', 0.5)), trap, undefined, US)).toEqual({
      pressurePa: 300_000,
      word: '50 % of inlet',
    });
  });

  it('is the least of both', () => {
    const both = result(check('backPressureFraction', 0.5), check('capacity', 0.15));
    expect(backPressureLimit(both, trap, model, US)?.word).toBe('2 × load');
  });

  it('is left out where nothing bounds it, and where even the open air would be too much', () => {
    expect(backPressureLimit(result(), trap, model, US)).toBeNull();
    expect(backPressureLimit(result(check('capacity', 0.3)), trap, model, US)).toBeNull();
    expect(backPressureLimit(result(check('capacity', 0.15)), trap, undefined, US)).toBeNull();
  });
});

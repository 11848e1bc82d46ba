import type { Gauge } from '@riseback/network';
import { relativeError } from '@riseback/numerics';
import { describe, expect, it } from 'vitest';
import { gaugeFindings } from './gauge-findings';
import { leastMarginPa } from './margin-above';
import type { GaugePrediction } from './predicted-at-gauge';

const SITE = { atmosphericPressurePa: 101_325, ambientTemperatureK: 293.15 };
const GAUGE: Gauge = {
  id: 'G1',
  node: 'J1',
  elevationM: 0,
  waterLeg: false,
  rangeLowPa: 0,
  rangeHighPa: 400_000,
  accuracy: 0.01,
  retired: false,
};

function predicted(gaugePa: number, halfWidthPa = 50_000): GaugePrediction {
  const pressurePa = 101_325 + gaugePa;
  return {
    tap: { at: 'node', node: 'J1', elevationM: 0 },
    pressurePa,
    by: 'solved',
    credible: { lowPa: pressurePa - halfWidthPa, highPa: pressurePa + halfWidthPa },
    below: [{ pipe: 'L1', share: 1 }],
  };
}

function codes(gauge: Partial<Gauge>, prediction?: GaugePrediction, leastMargin?: number): string[] {
  const found = gaugeFindings({ ...GAUGE, ...gauge }, { prediction, leastMarginPa: leastMargin }, SITE, '2026-03-01');
  return found.map(({ code }) => code);
}

describe('gaugeFindings', () => {
  it.each([
    { share: -0.01, expected: ['gaugeRange'] },
    { share: 0.1, expected: ['gaugeScale'] },
    { share: 0.25, expected: [] },
    { share: 0.5, expected: [] },
    { share: 0.75, expected: [] },
    { share: 0.9, expected: ['gaugeScale'] },
    { share: 1.01, expected: ['gaugeRange'] },
  ])('finds where on the scale it works: $share of it', ({ share, expected }) => {
    expect(codes({}, predicted(share * 400_000))).toEqual(expected);
  });

  it('takes the water leg off before it looks at the scale', () => {
    // a leg of 15 m takes 147 kPa off the 200 kPa at the tap: 53 kPa are an eighth of the scale
    expect(codes({ waterLeg: true, elevationM: 15 }, predicted(200_000))).toEqual(['gaugeScale']);
  });

  it('finds a grade that cannot decide: 1 % of 4 bar is known to 3,800 Pa', () => {
    expect(codes({}, predicted(200_000, 3_700))).toEqual(['gaugeGrade']);
    expect(codes({}, predicted(200_000, 3_900))).toEqual([]);
    expect(codes({}, predicted(200_000), 3_700)).toEqual(['gaugeGrade']);
    expect(codes({}, predicted(200_000), 3_900)).toEqual([]);
  });

  it('finds an overdue calibration from the day after', () => {
    expect(codes({ calibrationDueOn: '2026-03-01' })).toEqual([]);
    expect(codes({ calibrationDueOn: '2026-02-28' })).toEqual(['gaugeCalibration']);
  });

  it('says what is missing, and nothing of a gauge that was retired', () => {
    expect(codes({ accuracy: undefined }, predicted(200_000))).toEqual(['gaugeUnknown']);
    expect(codes({ accuracy: undefined, retired: true }, predicted(900_000))).toEqual([]);
  });
});

describe('leastMarginPa', () => {
  const trap = (id: string, walk: string[], value: number, limit: number) => ({
    id,
    walk,
    backPressurePa: 101_325 + 100_000,
    checks: [{ code: 'backPressureFraction', verdict: 'pass' as const, value, limit }],
  });

  it('is the least over the traps whose way passes: 0.4 of the inlet against 0.5 leaves a quarter of the back pressure', () => {
    const traps = [trap('T1', ['L1'], 0.4, 0.5), trap('T2', ['L1'], 0.2, 0.5), trap('T3', ['L9'], 0.49, 0.5)];
    expect(relativeError(leastMarginPa({ site: SITE }, traps, predicted(1)) ?? NaN, 25_000)).toBeLessThan(1e-12);
  });

  it('is not there where no trap on the way is within its limit', () => {
    expect(leastMarginPa({ site: SITE }, [trap('T1', ['L1'], 0.6, 0.5)], predicted(1))).toBeUndefined();
  });
});

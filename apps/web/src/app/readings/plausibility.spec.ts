import { Gauge } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { doubtAbout, isAskedAbout } from './plausibility';

// 0 to 4 bar in steps of 0.1 bar: the needle lies at a stop within 0.05 bar
const gauge = Gauge.parse({
  id: 'G1',
  node: 'J1',
  elevationM: 0,
  rangeLowPa: 0,
  rangeHighPa: 400_000,
  accuracy: 0.016,
  resolutionPa: 10_000,
});
// the band need not be as wide both ways
const expected = { dialPa: 60_000, abovePa: 10_000, belowPa: 20_000 };

describe('doubtAbout', () => {
  it.each([
    [405_001, 'aboveRange'],
    [400_000, 'atHighStop'],
    [395_000, 'farAboveExpected'],
    [4_000, 'atLowStop'],
    [-4_000, 'atLowStop'],
    [-6_000, 'belowRange'],
    [300_001, 'farAboveExpected'],
    [300_000, 'farOff'],
    [75_000, 'farOff'],
    [74_000, 'off'],
    [70_000, null],
    [40_000, null],
    [31_000, 'off'],
    [30_000, 'farOff'],
  ] as const)('%d Pa: %s', (valuePa, doubt) => {
    expect(doubtAbout(valuePa, gauge, expected)).toBe(doubt);
  });

  it('says nothing of the model where there is no prediction, and of the dial where no range is known', () => {
    expect(doubtAbout(300_001, gauge, undefined)).toBeNull();
    const bare = Gauge.parse({ id: 'G2', node: 'J1', elevationM: 0 });
    expect(doubtAbout(1e7, bare, undefined)).toBeNull();
    expect(doubtAbout(300_001, bare, { dialPa: 60_000 })).toBe('farAboveExpected');
  });

  it('takes a needle at its lower stop for what it is where about nothing is expected', () => {
    expect(doubtAbout(0, gauge, { dialPa: 3_000, abovePa: 8_000, belowPa: 8_000 })).toBeNull();
    expect(doubtAbout(0, gauge, undefined)).toBe('atLowStop');
  });

  it('does not speak of multiples where next to nothing is expected', () => {
    expect(doubtAbout(30_000, gauge, { dialPa: 2_000 })).toBeNull();
  });

  it('asks about slips and stops, not about findings', () => {
    expect(isAskedAbout('farAboveExpected')).toBe(true);
    expect(isAskedAbout('atHighStop')).toBe(true);
    expect(isAskedAbout('farOff')).toBe(false);
  });
});

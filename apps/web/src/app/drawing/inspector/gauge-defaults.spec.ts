import type { Gauge, NetworkDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { sampleDocument } from '../model/sample-network';
import { gaugeDefaults } from './gauge-defaults';
import { accuracyOfGrade, askedGaugeFields, gaugeFields } from './gauge-fields';

const LAST: Gauge = {
  id: 'G1',
  tag: 'PI-4',
  node: 'T1',
  elevationM: 1,
  waterLeg: true,
  rangeLowPa: 0,
  rangeHighPa: 400_000,
  accuracy: 0.016,
  retired: false,
};

function withGauges(...gauges: Gauge[]): NetworkDocument {
  return { ...sampleDocument(), gauges: new Map(gauges.map((value, ordinal) => [value.id, { ordinal, value }])) };
}

describe('what a new gauge is filled with', () => {
  it('is the next tag, the height of its tap and the dial of the last, and it says where from', () => {
    // half-way up the three metres that L4 rises from J2 to R1
    const { values, hints } = gaugeDefaults({ pipe: 'L4', distanceM: 3 }, withGauges(LAST));
    expect(values).toEqual({
      tag: 'PI-5',
      distanceM: 3,
      elevationM: 2.5,
      waterLeg: true,
      rangeLowPa: 0,
      rangeHighPa: 400_000,
      accuracy: 0.016,
    });
    expect(hints).toMatchObject({ elevationM: 'As its tap', accuracy: 'As PI-4' });
  });

  it('takes nothing from a gauge that was retired', () => {
    const { values } = gaugeDefaults({ node: 'T1' }, withGauges({ ...LAST, retired: true }));
    expect(values).toEqual({ tag: 'PI-5', elevationM: 1.2192 });
  });
});

describe('fields of a gauge', () => {
  it('ask for a distance on a pipe only', () => {
    const keys = (onPipe: boolean) => askedGaugeFields(onPipe).map(({ key }) => key);
    expect(keys(true)).toContain('distanceM');
    expect(keys(false)).not.toContain('distanceM');
    expect(gaugeFields(LAST).map(({ key }) => key)).not.toContain('distanceM');
  });

  it('take the wider limit of a grade: A holds 2 % on its whole scale', () => {
    expect(accuracyOfGrade('asme-A')).toBe(0.02);
    expect(accuracyOfGrade('en-0.6')).toBe(0.006);
    expect(accuracyOfGrade('none')).toBeUndefined();
  });
});

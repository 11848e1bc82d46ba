import type { Gauge, NetworkDocument } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { drawnGauges, shareNearest } from './drawn-gauges';
import { drawnNetwork } from './drawn-network';
import { gaugeName } from './gauge-name';
import { gaugeIdOf, gaugeKey } from './gauge-keys';
import { sampleDocument } from './sample-network';

const US = { system: 'us', atmosphericPressurePa: 101_325 } as const;
const FT_M = 0.3048;
const PSI_PA = 6894.757;

function gauge(id: string, place: Partial<Gauge>): Gauge {
  return { id, elevationM: 1, waterLeg: false, retired: false, ...place };
}

function withGauges(...gauges: Gauge[]): NetworkDocument {
  return { ...sampleDocument(), gauges: new Map(gauges.map((value, ordinal) => [value.id, { ordinal, value }])) };
}

function places(document: NetworkDocument) {
  return [...drawnGauges(document, drawnNetwork(document)).values()];
}

describe('drawnGauges', () => {
  it('taps a pipe at its distance, above a level run', () => {
    // L3 is 6 m long and runs 200 units from (0, 100) to (200, 100)
    const [drawn] = places(withGauges(gauge('G1', { pipe: 'L3', distanceM: 1.5 })));
    expect(drawn).toMatchObject({ id: 'gauge:G1', tap: { x: 50, y: 100 }, towards: { x: 0, y: -1 } });
  });

  it('stands at the right of a pipe that runs upright', () => {
    const [drawn] = places(withGauges(gauge('G1', { pipe: 'L1', distanceM: 3 })));
    expect(drawn).toMatchObject({ tap: { x: 0, y: 50 }, towards: { x: 1, y: 0 } });
  });

  it('takes a side of a node that no pipe and no other gauge has', () => {
    // J2 has pipes from above, from the left and to the right: below is free, then a corner
    const [first, second] = places(withGauges(gauge('G1', { node: 'J2' }), gauge('G2', { node: 'J2' })));
    expect(first?.towards).toEqual({ x: 0, y: 1 });
    expect(Math.abs(second?.towards.x ?? 0)).toBe(Math.SQRT1_2);
  });

  it('leaves out what taps nothing on the drawing', () => {
    expect(places(withGauges(gauge('G1', { node: 'J9' }), gauge('G2', { pipe: 'L9', distanceM: 0 })))).toEqual([]);
  });
});

describe('shareNearest', () => {
  it('is the share of the line at the point nearest to a place', () => {
    const line = [
      { x: 0, y: 0 },
      { x: 30, y: 0 },
      { x: 30, y: 10 },
    ];
    expect(shareNearest(line, { x: 10, y: 4 })).toBe(0.25);
    expect(shareNearest(line, { x: 36, y: 5 })).toBe(0.875);
    expect(shareNearest(line, { x: -9, y: -9 })).toBe(0);
  });
});

describe('gaugeName', () => {
  it('says tag, place, range and what else matters', () => {
    const g = gauge('G1', { tag: 'PI-3', pipe: 'L1', distanceM: 12 * FT_M, rangeLowPa: 0, rangeHighPa: 100 * PSI_PA });
    const document = withGauges(g);
    expect(gaugeName(g, document, true, US)).toBe(
      'PI-3, gauge, on CR-1, 12 ft from its start, 0 to 100 psig, selected',
    );
    expect(gaugeName(gauge('G2', { node: 'T1', waterLeg: true, retired: true }), document, false, US)).toBe(
      'G2, gauge, on TR-101, with a water leg, retired',
    );
  });
});

describe('names on the sheet', () => {
  it('keep gauges apart from elements of the same id', () => {
    expect(gaugeIdOf(gaugeKey('T1'))).toBe('T1');
    expect(gaugeIdOf('T1')).toBeUndefined();
  });
});

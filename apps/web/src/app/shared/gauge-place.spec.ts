import { emptyDocument, type NetworkDocument, type NetworkNode, type PipeRun } from '@riseback/network';
import { describe, expect, it } from 'vitest';
import { calendarDate } from './calendar-date';
import { findPlace, gaugePlaceName, gaugePlaceOps } from './gauge-place';

const NODES: readonly NetworkNode[] = [
  { id: 'J1', kind: 'junction', elevationM: 0, tag: 'LH-1' },
  { id: 'J2', kind: 'junction', elevationM: 0 },
];
const PIPE: PipeRun = {
  id: 'L1',
  tag: 'J2',
  from: 'J1',
  to: 'J2',
  lengthM: 5,
  insideDiameterM: 0.05,
  roughnessM: 4.57e-5,
  fittings: [],
  lossCoefficient: 0,
  heatLossWM: 0,
  checkValve: false,
};
const GAUGE = { id: 'G1', node: 'J1', elevationM: 0, waterLeg: false, retired: false };
const DOCUMENT: NetworkDocument = {
  ...emptyDocument('Places'),
  nodes: new Map(NODES.map((value, ordinal) => [value.id, { ordinal, value }])),
  pipes: new Map([['L1', { ordinal: 0, value: PIPE }]]),
  gauges: new Map([['G1', { ordinal: 0, value: GAUGE }]]),
};

describe('where a gauge stands', () => {
  it('is found by tag before id, whatever its letters’ case', () => {
    expect(findPlace(' lh-1 ', DOCUMENT)).toEqual({ node: 'J1' });
    expect(findPlace('j2', DOCUMENT)).toEqual({ pipe: 'L1' });
    expect(findPlace('l1', DOCUMENT)).toEqual({ pipe: 'L1' });
    expect(findPlace('X', DOCUMENT)).toBeUndefined();
  });

  it('is called as people call it', () => {
    expect(gaugePlaceName({ node: 'J1' }, DOCUMENT)).toBe('LH-1');
    expect(gaugePlaceName({ pipe: 'L9' }, DOCUMENT)).toBe('L9');
  });

  it('changes with all three keys at once, and names what it cannot find', () => {
    const moved = gaugePlaceOps('L1', GAUGE, DOCUMENT);
    expect(moved.ok && moved.ops.map(({ op, ...rest }) => ('key' in rest ? [rest.key, rest.to] : op))).toEqual([
      ['node', undefined],
      ['pipe', 'L1'],
      ['distanceM', 0],
    ]);
    const missing = gaugePlaceOps('X', GAUGE, DOCUMENT);
    expect(missing.ok ? '' : missing.reason).toMatch(/called X/);
  });
});

describe('calendarDate', () => {
  it.each([
    ['2026-3-1', '2026-03-01'],
    [' 2028-02-29 ', '2028-02-29'],
    ['2026-02-29', null],
    ['1.3.2026', null],
    ['', null],
  ])('%s is %s', (text, date) => {
    expect(calendarDate(text)).toBe(date);
  });
});

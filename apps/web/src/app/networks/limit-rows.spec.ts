import { describe, expect, it } from 'vitest';
import { limitGroups, withLimit } from './limit-rows';

describe('withLimit', () => {
  it('sets one limit beside others, and gives it back', () => {
    const one = withLimit({ momentum: { limitPa: 5 } }, 'velocity', 'watchMS', 20);
    expect(one).toEqual({ momentum: { limitPa: 5 }, velocity: { watchMS: 20 } });
    expect(withLimit(one, 'velocity', 'watchMS', undefined)).toEqual({ momentum: { limitPa: 5 } });
  });
});

describe('limitGroups', () => {
  it('shows the network’s own figure beside the default', () => {
    const velocity = limitGroups({ velocity: { failMS: 30 } }).find(({ code }) => code === 'velocity');
    expect(velocity?.rows.map(({ key, own, defaultSi }) => [key, own, defaultSi])).toEqual([
      ['watchMS', undefined, 25],
      ['failMS', 30, expect.closeTo(35.56, 1)],
      ['liquidMS', undefined, 2.1],
    ]);
  });

  it('asks for the least inlet as a gauge pressure, as a person gives it', () => {
    const rows = limitGroups({}).flatMap((group) => group.rows);
    expect(rows.find(({ key }) => key === 'minimumInletGaugePa')?.kind).toBe('gaugePressure');
  });
});

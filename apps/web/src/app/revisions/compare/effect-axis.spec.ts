import { describe, expect, it } from 'vitest';
import { AXIS_WIDTH, effectAxis, effectMark } from './effect-axis';

const units = { system: 'us', atmosphericPressurePa: 101_325 } as const;
/** NIST SP 811. */
const psig = (value: number) => 101_325 + value * 6_894.757_293;
const row = (before: number | undefined, after: number | undefined) => ({
  beforeSi: before === undefined ? undefined : psig(before),
  afterSi: after === undefined ? undefined : psig(after),
});

describe('one axis for all traps', () => {
  const axis = effectAxis([row(36.9, 31.1), row(3.2, undefined)], 'backPressurePa', units);

  it('begins at the atmosphere and ends past the highest, in round numbers', () => {
    expect(axis.ticks.map(({ label }) => label)).toEqual(['0', '10', '20', '30', '40']);
    expect(effectAxis([row(-2, 5)], 'backPressurePa', units).ticks[0]?.label).toBe('−2');
  });

  it('puts every value within its width, in proportion', () => {
    const [low, middle, high] = [0, 20, 40].map((value) => axis.at(psig(value)));
    expect(low).toBeGreaterThan(0);
    expect(high).toBeLessThan(AXIS_WIDTH);
    expect(Math.abs((low ?? 0) + (high ?? 0) - 2 * (middle ?? 0))).toBeLessThan(1e-6);
  });

  it('points the arrow the way it went, from the circle on, however short', () => {
    const fell = effectMark(row(36.9, 31.1), axis);
    expect(fell.circle).toBe(axis.at(psig(36.9)));
    expect(Number(/^M([\d.]+)/.exec(fell.head)?.[1])).toBeLessThan(fell.circle ?? 0);
    const rose = effectMark(row(20, 20.1), axis);
    expect(Number(/^M([\d.]+)/.exec(rose.head)?.[1])).toBeGreaterThan((rose.circle ?? 0) + 4);
  });

  it('draws the circle alone where nothing moved, and each alone where there is no other', () => {
    expect(effectMark(row(20, 20), axis)).toEqual({ circle: axis.at(psig(20)), shaft: '', head: '' });
    expect(effectMark(row(20, undefined), axis)).toMatchObject({ shaft: '', head: '' });
    expect(effectMark(row(undefined, 20), axis).circle).toBeUndefined();
    expect(effectMark(row(undefined, 20), axis).head).not.toBe('');
  });
});

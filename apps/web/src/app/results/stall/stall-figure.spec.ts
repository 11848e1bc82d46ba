import type { StallCurve } from '@riseback/solver';
import { describe, expect, it } from 'vitest';
import { STALL, stallFigure } from './stall-figure';

const SI = { system: 'si', atmosphericPressurePa: 100_000 } as const;

/** A straight steam space, 0 to 400 kPa gauge, so that every figure can be reckoned in the head. */
const curve: StallCurve = {
  backPressurePa: 200_000,
  stallFraction: 0.25,
  points: Array.from({ length: 5 }, (_, i) => ({ loadFraction: i / 4, steamPressurePa: 100_000 + i * 100_000 })),
};

describe('stallFigure', () => {
  it('marks the load at which the curve meets the back pressure', () => {
    const { stall, backY, stalledWidth } = stallFigure({ curve, loadFraction: 0.5 }, SI);
    const quarter = 0.25 * (STALL.right - STALL.left);
    expect(stall).toEqual({ x: STALL.left + quarter, text: '25 %' });
    expect(stalledWidth).toBe(quarter);
    expect(backY).toBe(STALL.bottom - (STALL.bottom - STALL.top) / 4);
  });

  it('stands the case on the curve, and says in words what is drawn', () => {
    const { load, sentence, rows } = stallFigure({ curve, loadFraction: 0.6 }, SI);
    expect(load.stalled).toBe(false);
    expect(rows.map((row) => Object.values(row).join(' '))).toEqual([
      '0 % 0.0 ',
      '25 % 100.0 stalls below',
      '50 % 200.0 ',
      '60 % 240.0 this case',
      '75 % 300.0 ',
      '100 % 400.0 ',
    ]);
    expect(sentence).toBe(
      'Steam space from 0.0 kPa g at no load to 400.0 kPa g at full load, against 100.0 kPa g of back pressure. ' +
        'It stalls below 25 % of full load. This case runs at 60 %, where the steam space has 240.0 kPa g.',
    );
  });

  it('knows an exchanger that never stalls, and one that always does', () => {
    const never = stallFigure({ curve: { ...curve, stallFraction: 0 }, loadFraction: 0.5 }, SI);
    expect([never.stall, never.stalledWidth, never.load.stalled]).toEqual([null, 0, false]);
    const always = stallFigure({ curve: { ...curve, stallFraction: 1.2 }, loadFraction: 1 }, SI);
    expect([always.stall, always.load.stalled]).toEqual([null, true]);
    expect(always.sentence).toContain('stalls at every load');
  });
});

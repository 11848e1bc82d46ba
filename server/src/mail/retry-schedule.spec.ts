import { describe, expect, it } from 'vitest';
import { nextTry } from './retry-schedule';

const MINUTE = 60_000;
const HOUR = 60 * MINUTE;
const MADE = new Date('2026-03-02T08:00:00.000Z');
const after = (ms: number) => new Date(MADE.getTime() + ms);
const waitMinutes = (failures: number, random: number) =>
  ((nextTry(failures, MADE, MADE, random)?.getTime() ?? NaN) - MADE.getTime()) / MINUTE;

describe('a mail that could not be sent is tried again', () => {
  it('after a minute, doubling to six hours', () => {
    const waits = [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 40].map((failures) => waitMinutes(failures, 0));
    expect(waits).toEqual([1, 2, 4, 8, 16, 32, 64, 128, 256, 360, 360, 360]);
  });

  it('a quarter later at most, so that those that failed together come apart', () => {
    expect(waitMinutes(1, 1)).toBe(1.25);
    expect(waitMinutes(12, 0.5)).toBe(405);
  });

  it('for three days', () => {
    expect(nextTry(20, MADE, after(72 * HOUR - 6 * HOUR), 0)).toEqual(after(72 * HOUR));
    expect(nextTry(20, MADE, after(72 * HOUR - 6 * HOUR + 1), 0)).toBeUndefined();
  });

  it('a few times in any case, though it had waited for a mail server for weeks', () => {
    const late = after(30 * 24 * HOUR);
    expect(nextTry(1, MADE, late, 0)).toEqual(new Date(late.getTime() + MINUTE));
    expect(nextTry(4, MADE, late, 0)).toBeDefined();
    expect(nextTry(5, MADE, late, 0)).toBeUndefined();
  });
});

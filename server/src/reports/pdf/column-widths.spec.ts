import { describe, expect, it } from 'vitest';
import { columnWidths } from './column-widths';

const sum = (widths: readonly number[]) => widths.reduce((a, b) => a + b, 0);

describe('columnWidths', () => {
  it('shares out evenly what is over', () => {
    const widths = columnWidths(
      [
        { natural: 20, least: 10 },
        { natural: 40, least: 10 },
      ],
      100,
    );
    expect(widths).toEqual([40, 60]);
  });

  it('takes what is missing from the widest, and from none below its least', () => {
    const wanted = [
      { natural: 30, least: 30 },
      { natural: 200, least: 40 },
      { natural: 90, least: 20 },
    ];
    const widths = columnWidths(wanted, 150);
    expect(Math.abs(sum(widths) - 150)).toBeLessThan(1e-6);
    expect(widths[0]).toBe(30);
    // both others give the same: 60 each
    expect(Math.abs((widths[1] ?? 0) - 60) + Math.abs((widths[2] ?? 0) - 60)).toBeLessThan(1e-6);
  });

  it('fills the page also where not even the least fit', () => {
    const widths = columnWidths(
      Array.from({ length: 40 }, () => ({ natural: 90, least: 30 })),
      600,
    );
    expect(Math.abs(sum(widths) - 600)).toBeLessThan(1e-6);
  });
});

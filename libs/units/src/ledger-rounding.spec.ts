import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { roundCumulatively, roundedSum } from './index';

/** Printed text back to a whole number of last places, so that sums are exact. */
function lastPlaces(printed: string, decimals: number): bigint {
  const digits = printed.replaceAll(',', '').replace('\u2212', '-');
  const [whole = '', decimal = ''] = digits.split('.');
  expect(decimal).toHaveLength(decimals);
  return BigInt(whole + decimal);
}

describe('cumulative rounding of a ledger column', () => {
  it('carries what rounding each entry by itself would lose', () => {
    // by hand: running totals 0.4, 0.8, 1.2 round to 0, 1, 1
    expect(roundCumulatively([0.4, 0.4, 0.4], 0)).toEqual(['0', '1', '0']);
    expect(roundedSum([0.4, 0.4, 0.4], 0)).toBe('1');
  });

  it('is not fooled by binary fractions', () => {
    expect(roundCumulatively([0.1, 0.2, -0.3], 1)).toEqual(['0.1', '0.2', '−0.3']);
    expect(roundedSum([0.1, 0.2, -0.3], 1)).toBe('0.0');
  });

  it('prints thousands and minus as everywhere else, and an empty column as nothing', () => {
    expect(roundCumulatively([1234.56, -2234.56], 1)).toEqual(['1,234.6', '−2,234.6']);
    expect(roundedSum([1234.56, -2234.56], 1)).toBe('−1,000.0');
    expect(roundCumulatively([], 2)).toEqual([]);
    expect(roundedSum([], 2)).toBe('0.00');
  });

  it('refuses what is not a number', () => {
    expect(() => roundCumulatively([1, Number.NaN], 1)).toThrow(RangeError);
    expect(() => roundedSum([Number.POSITIVE_INFINITY], 1)).toThrow(RangeError);
  });

  const columns = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { maxLength: 60 });
  const places = fc.integer({ min: 0, max: 4 });

  it('always adds up to the closing line, exactly', () => {
    fc.assert(
      fc.property(columns, places, (values, decimals) => {
        const entries = roundCumulatively(values, decimals).map((entry) => lastPlaces(entry, decimals));
        const total = entries.reduce((sum, entry) => sum + entry, 0n);
        expect(total).toBe(lastPlaces(roundedSum(values, decimals), decimals));
      }),
    );
  });

  it('moves no entry by more than one last place, nor changes its sign, and leaves zero alone', () => {
    fc.assert(
      fc.property(columns, places, (values, decimals) => {
        roundCumulatively(values, decimals).forEach((entry, index) => {
          const value = values[index] ?? 0;
          const printed = Number(lastPlaces(entry, decimals));
          expect(Math.abs(printed - value * 10 ** decimals)).toBeLessThan(1 + 1e-5);
          expect(printed * Math.sign(value)).toBeGreaterThanOrEqual(0);
          if (value === 0) expect(printed).toBe(0);
        });
      }),
    );
  });
});

import { describe, expect, it } from 'vitest';
import { printAccount, valueOf } from './printed-account';

/** In whole hundredths, so that sums are exact. */
const hundredths = (printed: string) => Math.round(valueOf(printed) * 100);
const sum = (numbers: readonly number[]) => numbers.reduce((a, b) => a + b, 0);

describe('printAccount', () => {
  it('adds up where roundings alone would not', () => {
    // 0.334 + 0.334 + 0.334 is 1.00, though each prints as 0.33
    const { columns, closing } = printAccount(0, [[0.334, 0.334, 0.334]], 2);
    expect(columns[0]).toEqual({ entries: ['0.33', '0.34', '0.33'], total: '1.00' });
    expect(closing).toBe('1.00');
  });

  it('lets the totals give way that were rounded farthest from theirs, so that the closing line adds up too', () => {
    // 15 + 11.0045 + 1.063 + 3.583 = 30.6505, but 15.00 + 11.00 + 1.06 + 3.58 = 30.64
    const { opening, columns, running, closing } = printAccount(
      15,
      [
        [0, 11.0045],
        [0.5, 0.563],
        [3, 0.583],
      ],
      2,
    );
    expect([opening, ...columns.map(({ total }) => total), closing]).toEqual([
      '15.00',
      '11.01',
      '1.06',
      '3.58',
      '30.65',
    ]);
    expect(columns[0]?.entries[0]).toBe('0.00');
    expect(running.at(-1)).toBe('30.65');
  });

  it('prints the lift of ten feet as five psi to the digit', () => {
    // half a psi a foot (common practice): 34,474 Pa over 6,894.757 Pa/psi (NIST SP 811)
    const account = printAccount(
      0,
      [
        [0, 34_474 / 6_894.757293168],
        [0.002, 0.002],
        [0.4, 0.12],
      ],
      2,
    );
    expect(account.columns[0]?.total).toBe('5.00');
  });

  it('adds up across and down for any numbers, within two in the last place of each', () => {
    let seed = 5;
    const random = () => (seed = (seed * 16_807) % 2_147_483_647) / 2_147_483_647;
    for (let trial = 0; trial < 300; trial += 1) {
      const lines = 1 + Math.floor(30 * random());
      const opening = 40 * random() - 3;
      const column = (share: number, scale: number, sign: number) =>
        Array.from({ length: lines }, () => (random() < share ? sign * scale * random() ** 2 : 0));
      const entries = [column(0.3, 12, random() < 0.2 ? -1 : 1), column(0.95, 0.2, 1), column(0.9, 1, 1)];
      const { opening: printedOpening, columns, running, closing } = printAccount(opening, entries, 2);

      columns.forEach((printed, i) => {
        expect(sum(printed.entries.map(hundredths))).toBe(hundredths(printed.total));
        printed.entries.forEach((entry, line) => {
          const given = entries[i]?.[line] ?? NaN;
          if (given === 0) expect(hundredths(entry)).toBe(0);
          expect(valueOf(entry) * given).toBeGreaterThanOrEqual(0);
          expect(Math.abs(valueOf(entry) - given)).toBeLessThan(0.0201);
        });
      });
      expect(hundredths(printedOpening) + sum(columns.map(({ total }) => hundredths(total)))).toBe(hundredths(closing));
      running.forEach((balance, line) => {
        const before = line === 0 ? printedOpening : (running[line - 1] ?? '');
        const added = sum(columns.map((printed) => hundredths(printed.entries[line] ?? '')));
        expect(hundredths(before) + added).toBe(hundredths(balance));
      });
      expect(Math.abs(valueOf(closing) - (opening + sum(entries.flat())))).toBeLessThan(0.00501);
      expect(running.at(-1)).toBe(closing);
    }
  });

  it('stands for an account without entries', () => {
    expect(printAccount(15, [[], [], []], 2)).toMatchObject({ opening: '15.00', closing: '15.00', running: [] });
  });
});

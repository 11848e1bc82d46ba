import { roundedSum } from '@riseback/units';
import { describe, expect, it } from 'vitest';
import { broughtForward, SHEET_LINES, sheetBreaks } from './brought-forward';
import type { LedgerRow } from './ledger-model';
import { printAccount, valueOf } from './printed-account';

describe('sheets of a long ledger', () => {
  it('keeps a way that fits with its foot on one sheet', () => {
    expect(sheetBreaks(SHEET_LINES.first - SHEET_LINES.foot)).toEqual([]);
    expect(sheetBreaks(0)).toEqual([]);
  });

  it('never overfills a sheet, never begins one with the closing line alone', () => {
    for (let lines = 1; lines <= 200; lines++) {
      const ends = [...sheetBreaks(lines), lines];
      ends.forEach((end, i) => {
        const held = end - (ends[i - 1] ?? 0);
        const room = i === 0 ? SHEET_LINES.first : SHEET_LINES.other;
        expect(held, `sheet ${String(i + 1)} of ${String(lines)} lines`).toBeGreaterThan(0);
        // the line carried forward needs a place too; on the last sheet the closing line and the foot do
        const taken = i === ends.length - 1 ? held + SHEET_LINES.foot : held + 1;
        expect(taken, `sheet ${String(i + 1)} of ${String(lines)} lines`).toBeLessThanOrEqual(room);
      });
    }
  });

  it('brings forward what the lines before add up to, digit by digit', () => {
    // thirds, whose own roundings do not add up
    const thirds = Array.from({ length: 40 }, (_, i) => (i % 7) / 3);
    const account = printAccount(15, [thirds, thirds.map((value) => value / 7), thirds.map(() => 0)], 2);
    const rows = thirds.map(
      (_, i) =>
        ({
          length: '12.5',
          up: i % 2 === 0 ? '3' : '',
          down: '',
          static: account.columns[0]?.entries[i],
          friction: account.columns[1]?.entries[i],
          flashSteam: '–',
          handAdds: '–',
          running: account.running[i],
          handRunning: '15.00',
        }) as LedgerRow,
    );
    for (const count of [1, 14, 39, 40]) {
      const forward = broughtForward({ rows, opening: account.opening }, count);
      const sum = roundedSum([valueOf(account.opening), valueOf(forward.static), valueOf(forward.friction)], 2);
      expect(forward.running).toBe(sum);
      expect(forward.length).toBe(roundedSum([12.5 * count], 1));
      expect(forward.flashSteam).toBe('–');
      expect(forward.rise).toBe(`+${String(3 * Math.ceil(count / 2))}`);
    }
  });
});

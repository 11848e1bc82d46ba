import { describe, expect, it } from 'vitest';
import type { ReportTable } from '../exports/report-table';
import { sharedRows } from './shared-rows';

const findings: ReportTable = {
  name: 'Findings',
  columns: ['Element', 'Check', 'Id'].map((title) => ({ title, unit: '' })),
  rows: [
    ['RT-1', 'Velocity', 'T1'],
    ['BL-1', 'Slug', 'T2'],
    ['RT-2', 'Velocity', 'T3'],
  ],
};

describe('rows that say the same', () => {
  it('stand once, at the place of the first, with their elements', () => {
    const { rows } = sharedRows(findings, 'Element', ['Id']);
    expect(rows.map(([element, check]) => [element, check])).toEqual([
      ['RT-1, RT-2', 'Velocity'],
      ['BL-1', 'Slug'],
    ]);
  });

  it('stay apart where anything else that counts differs', () => {
    expect(sharedRows(findings, 'Element', []).rows).toEqual(findings.rows);
  });

  it('name an element once', () => {
    const twice = { ...findings, rows: [...findings.rows, ['RT-1', 'Velocity', 'T1']] };
    expect(sharedRows(twice, 'Element', ['Id']).rows[0]?.[0]).toBe('RT-1, RT-2');
  });
});

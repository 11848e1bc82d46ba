import { describe, expect, it } from 'vitest';
import { BLOCK_LIMITS, readCopiedCells, readCsv, writeCsv } from './block-text';

describe('a block of cells', () => {
  it('keeps quotes, tabs and line ends within a cell, and its row numbers over blank rows', () => {
    const read = readCopiedCells('a\t"b ""c""\td\ne"\n\t\nf\tg');
    expect(read).toEqual({
      ok: true,
      block: {
        rows: [
          { number: 1, cells: ['a', 'b "c"\td\ne'] },
          { number: 3, cells: ['f', 'g'] },
        ],
      },
    });
  });

  it.each([
    ['commas', 'Tag,"Load, lb/h"\r\nTR-1,"1,040"\r\n'],
    ['semicolons', 'Tag;Load, lb/h\nTR-1;1,040\n'],
    ['tabs', 'Tag\tLoad, lb/h\nTR-1\t1,040'],
    ['semicolons in a cell further down', '\uFEFFTag,"Load, lb/h"\nTR-1,"1,040"\nTR-2;;;,'],
  ])('parts CSV by %s', (_, text) => {
    const read = readCsv(text);
    expect(read.ok && read.block.rows.slice(0, 2).map(({ cells }) => cells)).toEqual([
      ['Tag', 'Load, lb/h'],
      ['TR-1', '1,040'],
    ]);
  });

  it('writes numbers as numbers and no text as a formula', () => {
    expect(
      writeCsv([
        ['Tag', 'Elevation, ft'],
        ['-A1', -3],
        [undefined, 0.5],
      ]),
    ).toBe('\uFEFFTag,"Elevation, ft"\r\n\'-A1,-3\r\n,0.5\r\n');
  });

  it('says when it is too much or nothing', () => {
    expect(readCopiedCells('\t\n \t')).toMatchObject({ ok: false, title: 'There is nothing in it' });
    expect(readCopiedCells('x\n'.repeat(BLOCK_LIMITS.rows + 2))).toMatchObject({
      ok: false,
      detail: expect.stringContaining('5,000 rows') as string,
    });
    expect(readCopiedCells('x\t'.repeat(BLOCK_LIMITS.columns))).toMatchObject({
      ok: false,
      detail: expect.stringContaining('Row 1') as string,
    });
    expect(readCopiedCells('x'.repeat(BLOCK_LIMITS.cellCharacters + 1))).toMatchObject({ ok: false });
  });
});

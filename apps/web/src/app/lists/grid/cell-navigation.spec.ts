import { describe, expect, it } from 'vitest';
import { cellAfterKey, HEAD_ROW, scrollToShow } from './cell-navigation';

const extent = { rows: 100, columns: 12, page: 20 };

describe('keys in the grid (WAI-ARIA grid pattern)', () => {
  it.each([
    ['ArrowDown', false, { row: 5, column: 3 }, { row: 6, column: 3 }],
    ['ArrowUp', false, { row: 0, column: 3 }, { row: HEAD_ROW, column: 3 }],
    ['ArrowUp', false, { row: HEAD_ROW, column: 3 }, { row: HEAD_ROW, column: 3 }],
    ['ArrowLeft', false, { row: 5, column: 0 }, { row: 5, column: 0 }],
    ['ArrowRight', false, { row: 5, column: 11 }, { row: 5, column: 11 }],
    ['ArrowDown', true, { row: 5, column: 3 }, { row: 99, column: 3 }],
    ['Home', false, { row: 5, column: 3 }, { row: 5, column: 0 }],
    ['End', false, { row: 5, column: 3 }, { row: 5, column: 11 }],
    ['Home', true, { row: 5, column: 3 }, { row: 0, column: 0 }],
    ['End', true, { row: 5, column: 3 }, { row: 99, column: 11 }],
    ['PageDown', false, { row: 90, column: 3 }, { row: 99, column: 3 }],
    ['PageUp', false, { row: 5, column: 3 }, { row: 0, column: 3 }],
  ] as const)('%s (with Ctrl: %s)', (key, ctrl, from, to) => {
    expect(cellAfterKey({ key, ctrl }, from, extent)).toEqual(to);
  });

  it('leaves other keys alone', () => {
    expect(cellAfterKey({ key: 'Enter', ctrl: false }, { row: 0, column: 0 }, extent)).toBeNull();
  });

  it('stays on the heads of an empty list', () => {
    const empty = { ...extent, rows: 0 };
    expect(cellAfterKey({ key: 'ArrowDown', ctrl: false }, { row: HEAD_ROW, column: 0 }, empty)).toEqual({
      row: HEAD_ROW,
      column: 0,
    });
  });
});

describe('scrollToShow', () => {
  const region = { offset: 100, size: 300, coveredStart: 50 };

  it('scrolls only as far as it must', () => {
    expect(scrollToShow({ start: 160, end: 186 }, region)).toBe(100);
    expect(scrollToShow({ start: 140, end: 166 }, region)).toBe(90);
    expect(scrollToShow({ start: 390, end: 416 }, region)).toBe(116);
    expect(scrollToShow({ start: 20, end: 46 }, region)).toBe(0);
  });
});

import { describe, expect, it } from 'vitest';
import { FIELD, rowLetter, sheetAround, zoneOf } from './sheet-zones';

describe('zones', () => {
  it('letters run down without I and O, as ISO 5457 has them', () => {
    expect([0, 7, 8, 12, 13, 23, 24, 25].map(rowLetter)).toEqual(['A', 'H', 'J', 'N', 'P', 'Z', 'AA', 'AB']);
  });

  it('gives the letter of the row and the number of the column', () => {
    const sheet = sheetAround([]);
    expect(zoneOf({ x: 0, y: 0 }, sheet)).toBe('A1');
    expect(zoneOf({ x: FIELD.width * 1.5, y: FIELD.height * 2.5 }, sheet)).toBe('C2');
  });

  it('stays the same while one draws within the sheet', () => {
    const some = sheetAround([{ x: 100, y: 100 }]);
    const more = sheetAround([
      { x: 100, y: 100 },
      { x: 900, y: 500 },
    ]);
    expect(zoneOf({ x: 100, y: 100 }, more)).toBe(zoneOf({ x: 100, y: 100 }, some));
  });

  it('holds every point it is made around', () => {
    const points = [
      { x: -700, y: 40 },
      { x: 3000, y: 2000 },
    ];
    const { left, top, columns, rows } = sheetAround(points);
    for (const { x, y } of points) {
      expect(x > left && x < left + columns * FIELD.width && y > top && y < top + rows * FIELD.height).toBe(true);
    }
  });
});

import { describe, expect, it } from 'vitest';
import { cutLine, lineLength, longestPiece, pointAt, rightAngled } from './geometry';

const CORNER = [
  { x: 0, y: 0 },
  { x: 100, y: 0 },
  { x: 100, y: 50 },
];

describe('rightAngled', () => {
  it('leaves points in line as they are', () => {
    expect(
      rightAngled(
        [
          { x: 0, y: 0 },
          { x: 0, y: 40 },
        ],
        'upright',
      ),
    ).toEqual([
      { x: 0, y: 0 },
      { x: 0, y: 40 },
    ]);
  });

  it('puts one elbow between points across, on the way it starts', () => {
    const [from, to] = [
      { x: 0, y: 0 },
      { x: 60, y: 40 },
    ];
    expect(rightAngled([from, to], 'upright')).toEqual([from, { x: 0, y: 40 }, to]);
    expect(rightAngled([from, to], 'level')).toEqual([from, { x: 60, y: 0 }, to]);
  });

  it('has level and upright pieces only, whatever the bends', () => {
    const line = rightAngled(
      [
        { x: 0, y: 0 },
        { x: 30, y: 70 },
        { x: 90, y: 20 },
        { x: 90, y: 20 },
        { x: 10, y: 10 },
      ],
      'level',
    );
    const slanted = line.filter((point, i) => {
      const before = line[i - 1];
      return before !== undefined && before.x !== point.x && before.y !== point.y;
    });
    expect(slanted).toEqual([]);
  });
});

describe('along a line', () => {
  it('knows its length, its middle and the way it runs there', () => {
    expect(lineLength(CORNER)).toBe(150);
    expect(pointAt(CORNER, 0.5)).toEqual({ x: 75, y: 0, angleDeg: 0 });
    expect(pointAt(CORNER, 1)).toEqual({ x: 100, y: 50, angleDeg: 90 });
  });

  it('stays finite for a line of no length', () => {
    expect(
      pointAt(
        [
          { x: 5, y: 5 },
          { x: 5, y: 5 },
        ],
        0.5,
      ),
    ).toEqual({ x: 5, y: 5, angleDeg: 0 });
  });

  it('cuts out a part with the corners inside it', () => {
    expect(cutLine(CORNER, 1 / 3, 5 / 6)).toEqual([
      { x: 50, y: 0 },
      { x: 100, y: 0 },
      { x: 100, y: 25 },
    ]);
  });

  it('finds the longest level and upright piece', () => {
    expect(longestPiece(CORNER, 'level')).toEqual([CORNER[0], CORNER[1]]);
    expect(longestPiece(CORNER, 'upright')).toEqual([CORNER[1], CORNER[2]]);
    expect(longestPiece(CORNER.slice(0, 2), 'upright')).toBeUndefined();
  });
});

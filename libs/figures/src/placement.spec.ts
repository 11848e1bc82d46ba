import { describe, expect, it } from 'vitest';
import { GRID, nearestFreePoint, snapPoint } from './placement';

describe('nearestFreePoint', () => {
  it('takes the place itself, on the grid, where it is free', () => {
    expect(nearestFreePoint({ x: 43, y: 58 }, { nodes: [], lines: [] })).toEqual({ x: 40, y: 60 });
  });

  it('keeps clear of symbols and pipes and goes no farther than it must', () => {
    const nodes = [{ x: 0, y: 0 }];
    const lines = [
      [
        { x: -400, y: 40 },
        { x: 400, y: 40 },
      ],
    ];
    const free = nearestFreePoint({ x: 0, y: 0 }, { nodes, lines });
    expect(free).not.toEqual({ x: 0, y: 0 });
    expect(Math.hypot(free.x, free.y)).toBe(4 * GRID);
    expect(free.y).not.toBe(40);
  });

  it('gives the place itself when everything far and wide is taken', () => {
    const side = 70;
    const nodes = Array.from({ length: side * side }, (_, i) => ({
      x: ((i % side) - side / 2) * 2 * GRID,
      y: (Math.floor(i / side) - side / 2) * 2 * GRID,
    }));
    expect(nearestFreePoint({ x: 0, y: 0 }, { nodes, lines: [] })).toEqual({ x: 0, y: 0 });
  });

  it('snaps both ways', () => {
    expect(snapPoint({ x: 29, y: -31 })).toEqual({ x: 20, y: -40 });
  });
});

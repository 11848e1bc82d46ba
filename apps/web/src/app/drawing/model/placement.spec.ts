import { describe, expect, it } from 'vitest';
import { GRID, nearestFreePoint, nextTag, snapPoint } from './placement';

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

describe('nextTag', () => {
  it('counts up the last tag, keeping its letters and width', () => {
    expect(nextTag('trap', ['TR-008', 'TR-009'], new Set(['TR-008', 'TR-009']))).toBe('TR-010');
    expect(nextTag('trap', ['RT-1', 'DL75-3'], new Set(['RT-1', 'DL75-3']))).toBe('DL75-4');
  });

  it('passes over tags that something else has', () => {
    expect(nextTag('pipe', ['CR-1'], new Set(['CR-1', 'CR-2', 'CR-3']))).toBe('CR-4');
  });

  it('starts each kind somewhere, but leaves junctions nameless until one has a tag', () => {
    expect(nextTag('trap', [], new Set())).toBe('TR-101');
    expect(nextTag('receiver', ['North'], new Set(['North']))).toBe('R-1');
    expect(nextTag('junction', [], new Set())).toBe('');
    expect(nextTag('junction', ['H7'], new Set(['H7']))).toBe('H8');
  });
});

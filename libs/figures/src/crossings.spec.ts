import { describe, expect, it } from 'vitest';
import { crossings } from './crossings';

const line = (id: string, ...points: readonly (readonly [number, number])[]) => ({
  id,
  points: points.map(([x, y]) => ({ x, y })),
});

describe('crossings', () => {
  it('belong to the pipe that is drawn later', () => {
    const across = line('A', [0, 50], [100, 50]);
    const up = line('B', [40, 0], [40, 100]);
    expect([...crossings([across, up])]).toEqual([['B', [{ x: 40, y: 50, level: false }]]]);
    expect([...crossings([up, across])]).toEqual([['A', [{ x: 40, y: 50, level: true }]]]);
  });

  it('are none where pipes meet at an end or corner, or cross themselves', () => {
    const header = line('A', [0, 50], [100, 50]);
    expect(crossings([header, line('B', [40, 0], [40, 50])]).size).toBe(0);
    expect(crossings([header, line('C', [100, 50], [100, 100])]).size).toBe(0);
    expect(crossings([line('D', [0, 0], [100, 0], [100, 50], [50, 50], [50, -50])]).size).toBe(0);
  });
});

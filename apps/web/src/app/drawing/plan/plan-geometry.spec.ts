import { describe, expect, it } from 'vitest';
import { firstPlace, resized, samePlace, scaleBar, scaleOf } from './plan-geometry';

const SIZE = { widthPx: 800, heightPx: 400 };

describe('where a plan lies', () => {
  it('at first: under all that is drawn, with its middle in the middle of that', () => {
    const drawn = [
      { x: 100, y: 0 },
      { x: 900, y: 600 },
    ];
    const { x, y, unitsPerPixel } = firstPlace(SIZE, drawn);
    expect(unitsPerPixel).toBeGreaterThanOrEqual(600 / 400);
    expect(x + (800 * unitsPerPixel) / 2).toBe(500);
    expect(y + (400 * unitsPerPixel) / 2).toBe(300);
  });

  it('at first on an empty sheet, or under a single element: of a size that can be seen', () => {
    expect(firstPlace(SIZE, [])).toEqual({ x: 0, y: 0, unitsPerPixel: 1.5 });
    expect(firstPlace(SIZE, [{ x: 40, y: 40 }]).unitsPerPixel).toBe(1.5);
  });

  it('as the one before it did, as wide, whatever its pixels', () => {
    const before = { x: 7, y: 9, unitsPerPixel: 2, ...SIZE };
    expect(samePlace({ widthPx: 1_600, heightPx: 10 }, before)).toEqual({ x: 7, y: 9, unitsPerPixel: 1 });
  });

  it('wider shows the same plant: a wall of it keeps its length', () => {
    const plan = { x: 0, y: 0, unitsPerPixel: 1, metresPerUnit: 0.05, opacity: 1, ...SIZE };
    const wider = { ...plan, ...resized(plan, 2_400) };
    expect(wider.unitsPerPixel).toBe(3);
    expect(100 * wider.unitsPerPixel * (wider.metresPerUnit ?? 0)).toBeCloseTo(100 * 0.05, 12);
  });
});

describe('the scale', () => {
  it('is the distance over the units between two points', () => {
    expect(scaleOf({ x: 10, y: 10 }, { x: 40, y: 50 }, 12.5)).toBe(0.25);
  });

  it('is none for two points in one place, or no distance', () => {
    expect(scaleOf({ x: 1, y: 1 }, { x: 1, y: 1 }, 12)).toBeUndefined();
    expect(scaleOf({ x: 1, y: 1 }, { x: 2, y: 1 }, 0)).toBeUndefined();
    expect(scaleOf({ x: 1, y: 1 }, { x: 2, y: 1 }, -3)).toBeUndefined();
  });

  it.each([0.001, 0.0127, 0.05, 0.3, 2, 40])(
    'at %s m a unit has a bar of a round length that fits its corner',
    (scale) => {
      for (const zoom of [0.1, 0.55, 1, 4]) {
        for (const step of [1, 0.3048]) {
          const bar = scaleBar(scale, zoom, step);
          expect(bar?.width).toBeGreaterThanOrEqual(59);
          expect(bar?.width).toBeLessThanOrEqual(150.001);
          // as long on the screen as it says
          expect((((bar?.metres ?? 0) / scale) * zoom) / (bar?.width ?? 1)).toBeCloseTo(1, 9);
          const steps = (bar?.metres ?? 0) / step;
          expect(['1', '2', '5']).toContain(
            steps
              .toPrecision(6)
              .replace(/^0\.0*/, '')
              .charAt(0),
          );
        }
      }
    },
  );
});

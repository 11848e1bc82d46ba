import { describe, expect, it } from 'vitest';
import { centreToShow, fitView, symbolScale, toScreen, toSheet, ZOOM_RANGE } from './viewport';

const SIZE = { width: 1000, height: 600 };
const NONE = { left: 0, top: 0, right: 0, bottom: 0 };

describe('fitView', () => {
  it('is finite for no point, one point and points in one line', () => {
    for (const points of [
      [],
      [{ x: 30, y: 40 }],
      [
        { x: 0, y: 0 },
        { x: 500, y: 0 },
      ],
      [
        { x: 7, y: -900 },
        { x: 7, y: 900 },
      ],
    ]) {
      const { zoom, centre } = fitView(points, SIZE, NONE);
      expect(Number.isFinite(zoom) && Number.isFinite(centre.x) && Number.isFinite(centre.y)).toBe(true);
      expect(zoom).toBeGreaterThanOrEqual(ZOOM_RANGE.least);
    }
  });

  it('shows every point, clear of the inset', () => {
    const points = [
      { x: -200, y: 100 },
      { x: 2400, y: 1300 },
    ];
    const { zoom, centre } = fitView(points, SIZE, { ...NONE, top: 80 });
    const viewport = { ...SIZE, zoom, panX: SIZE.width / 2 - centre.x * zoom, panY: SIZE.height / 2 - centre.y * zoom };
    for (const point of points) {
      const { x, y } = toScreen(point, viewport);
      expect(x > 0 && x < SIZE.width && y > 80 && y < SIZE.height).toBe(true);
    }
  });
});

describe('the window', () => {
  const viewport = { ...SIZE, zoom: 2, panX: -100, panY: 50 };

  it('goes to the sheet and back', () => {
    expect(toSheet(toScreen({ x: 12, y: 34 }, viewport), viewport)).toEqual({ x: 12, y: 34 });
  });

  it('moves only when a place is out of sight, and no farther than needed', () => {
    expect(centreToShow({ x: 300, y: 100 }, viewport, 40)).toBeNull();
    const centre = centreToShow({ x: 600, y: 100 }, viewport, 40);
    expect(centre).not.toBeNull();
    const panX = SIZE.width / 2 - (centre?.x ?? 0) * 2;
    expect(toScreen({ x: 600, y: 100 }, { ...viewport, panX }).x).toBe(SIZE.width - 40);
  });

  it('keeps symbols between 0.8 and 1.6 of their size, and lets them shrink where they would cover each other', () => {
    expect([0.3, 0.5, 1, 4].map((zoom) => symbolScale(zoom) * zoom)).toEqual([0.8, 0.8, 1, 1.6]);
    expect(symbolScale(0.15) * 0.15).toBeCloseTo(0.4, 12);
  });
});

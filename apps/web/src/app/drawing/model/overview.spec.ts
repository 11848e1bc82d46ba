import { describe, expect, it } from 'vitest';
import { drawnNetwork, EMPTY_DRAWING } from './drawn-network';
import { boundsOf, mapOf, needsOverview } from './overview';
import { sampleDocument } from './sample-network';

const BOUNDS = boundsOf(drawnNetwork(sampleDocument()));
const WINDOW = { zoom: 1, panX: 100, panY: 100, width: 900, height: 600 };

describe('the overview', () => {
  it('covers everything that is drawn', () => {
    expect(BOUNDS).toEqual({ left: 0, top: 0, right: 400, bottom: 100 });
    expect(boundsOf(EMPTY_DRAWING)).toBeNull();
  });

  it('stands where something is out of sight and the window is large enough', () => {
    expect(needsOverview(BOUNDS, WINDOW)).toBe(false);
    expect(needsOverview(BOUNDS, { ...WINDOW, panX: -1 })).toBe(true);
    expect(needsOverview(BOUNDS, { ...WINDOW, zoom: 4 })).toBe(true);
    expect(needsOverview(BOUNDS, { ...WINDOW, panX: -1, width: 390 })).toBe(false);
    expect(needsOverview(null, WINDOW)).toBe(false);
  });

  it('keeps the network’s shape within its own size', () => {
    const { width, height } = mapOf({ left: 0, top: 0, right: 4000, bottom: 1000 });
    expect(width).toBeLessThanOrEqual(176);
    expect(height).toBeLessThanOrEqual(116);
    expect(mapOf({ left: 0, top: 0, right: 0, bottom: 0 }).width).toBeGreaterThan(0);
  });
});

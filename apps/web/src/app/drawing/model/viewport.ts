import type { Position } from '@riseback/network';

/** What part of the sheet is on the screen: screen = sheet × zoom + pan, in pixels of the canvas. */
export interface Viewport {
  readonly zoom: number;
  readonly panX: number;
  readonly panY: number;
  readonly width: number;
  readonly height: number;
}

/** Zoom and the place on the sheet that comes to the middle of the canvas. */
export interface View {
  readonly zoom: number;
  readonly centre: Position;
}

export interface Inset {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

export const ZOOM_RANGE = { least: 0.1, most: 4 } as const;
/** Fitting never blows a small network up beyond this. */
const MOST_FIT_ZOOM = 1.4;
const LABEL_ROOM = { most: 48, share: 0.06 } as const;

export function toScreen({ x, y }: Position, { zoom, panX, panY }: Viewport): Position {
  return { x: x * zoom + panX, y: y * zoom + panY };
}

export function toSheet({ x, y }: Position, { zoom, panX, panY }: Viewport): Position {
  return { x: (x - panX) / zoom, y: (y - panY) / zoom };
}

/**
 * The view that shows all points with room for their labels. One point, or points in one line, give a finite zoom; none give the
 * sheet's origin at its natural size.
 */
export function fitView(points: Iterable<Position>, size: { width: number; height: number }, inset: Inset): View {
  let [left, right, top, bottom] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const { x, y } of points) {
    [left, right, top, bottom] = [Math.min(left, x), Math.max(right, x), Math.min(top, y), Math.max(bottom, y)];
  }
  if (left === Infinity) return { zoom: 1, centre: { x: size.width / 2, y: size.height / 2 } };
  const room = Math.min(LABEL_ROOM.most, size.width * LABEL_ROOM.share);
  const width = Math.max(1, size.width - inset.left - inset.right - 2 * room);
  const height = Math.max(1, size.height - inset.top - inset.bottom - 2 * room);
  const wanted = Math.min(width / Math.max(1, right - left), height / Math.max(1, bottom - top), MOST_FIT_ZOOM);
  const zoom = clampZoom(wanted);
  return {
    zoom,
    centre: {
      x: (left + right) / 2 - (inset.left - inset.right) / 2 / zoom,
      y: (top + bottom) / 2 - (inset.top - inset.bottom) / 2 / zoom,
    },
  };
}

export function clampZoom(zoom: number): number {
  return Math.min(ZOOM_RANGE.most, Math.max(ZOOM_RANGE.least, zoom));
}

/** The centre that brings a place into sight with the least movement; null when it is in sight already. */
export function centreToShow(place: Position, viewport: Viewport, margin: number): Position | null {
  const { x, y } = toScreen(place, viewport);
  const dx = outside(x, margin, viewport.width - margin);
  const dy = outside(y, margin, viewport.height - margin);
  if (dx === 0 && dy === 0) return null;
  return toSheet({ x: viewport.width / 2 + dx, y: viewport.height / 2 + dy }, viewport);
}

/** Below this zoom symbols four grid steps apart would run into each other at the size they keep above it. */
const CROWDED_ZOOM = 0.3;

/**
 * Symbols keep between 0.8 and 1.6 of their size on the screen, and shrink with the sheet where it is so small that they would cover each
 * other; this is the factor on the sheet that does it.
 */
export function symbolScale(zoom: number): number {
  const least = 0.8 * Math.min(1, zoom / CROWDED_ZOOM);
  return Math.min(1.6, Math.max(least, zoom)) / zoom;
}

function outside(value: number, low: number, high: number): number {
  if (value < low) return value - low;
  return value > high ? value - high : 0;
}

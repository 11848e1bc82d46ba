import type { Position } from '@riseback/network';
import { type Bounds, mapOf } from '../model/overview';
import { fitView, toScreen, type View, type Viewport } from '../model/viewport';

/** What lies over the sheet at its upper left corner, px. */
const LEGEND = { width: 310, height: 92 } as const;
/** Legend and small map keep this far from the sheet's edge, with the symbol that must not lie under them, px. */
const ROOM = 12;
const NO_INSET = { left: 0, top: 0, right: 0, bottom: 0 } as const;

/** Everything, clear of the legend where the network would lie under it. */
export function fitClear(points: readonly Position[], size: { readonly width: number; readonly height: number }): View {
  const plain = fitView(points, size, NO_INSET);
  const pan = {
    panX: size.width / 2 - plain.centre.x * plain.zoom,
    panY: size.height / 2 - plain.centre.y * plain.zoom,
  };
  const covered = points.some((point) => underLegend(point, { ...size, zoom: plain.zoom, ...pan }));
  return covered ? fitView(points, size, { ...NO_INSET, top: LEGEND.height - 32 }) : plain;
}

/** Under the legend or the small map, where a focus would not be seen. @param overview what the map shows; null where there is none */
export function isCovered(place: Position, viewport: Viewport, overview: Bounds | null): boolean {
  if (underLegend(place, viewport)) return true;
  if (overview === null) return false;
  const { x, y } = toScreen(place, viewport);
  const map = mapOf(overview);
  const [left, top] = [viewport.width - map.width - ROOM, viewport.height - map.height - ROOM];
  return x > left && y > top && x < viewport.width && y < viewport.height;
}

function underLegend(place: Position, viewport: Viewport): boolean {
  const { x, y } = toScreen(place, viewport);
  // on a narrow sheet the legend lies over much of it, whatever is done
  return viewport.width > 2 * LEGEND.width && x >= 0 && y >= 0 && x < LEGEND.width && y < LEGEND.height;
}

import type { Position } from '@riseback/network';
import type { DrawnNetwork } from './drawn-network';
import { toSheet, type Viewport } from './viewport';

export interface Bounds {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** How large the small map may be, px. */
const LARGEST = { width: 176, height: 116 } as const;
/** Room around the network on the map, drawing units. */
const EDGE = 60;
/** A window smaller than this is wanted whole for the drawing, px. */
const LEAST_WINDOW = { width: 640, height: 380 } as const;

/** What everything that is drawn lies within; null for an empty sheet. */
export function boundsOf({ nodes, pipes }: DrawnNetwork): Bounds | null {
  let [left, top, right, bottom] = [Infinity, Infinity, -Infinity, -Infinity];
  const take = ({ x, y }: Position): void => {
    [left, right, top, bottom] = [Math.min(left, x), Math.max(right, x), Math.min(top, y), Math.max(bottom, y)];
  };
  for (const { at } of nodes.values()) take(at);
  for (const { points } of pipes.values()) points.forEach(take);
  return left === Infinity ? null : { left, top, right, bottom };
}

/** The part of the sheet in the window. */
export function windowOf(viewport: Viewport): Bounds {
  const { x: left, y: top } = toSheet({ x: 0, y: 0 }, viewport);
  const { x: right, y: bottom } = toSheet({ x: viewport.width, y: viewport.height }, viewport);
  return { left, top, right, bottom };
}

/** A map helps where part of the network is out of sight and the window has room for one. */
export function needsOverview(bounds: Bounds | null, viewport: Viewport): boolean {
  if (bounds === null || viewport.width < LEAST_WINDOW.width || viewport.height < LEAST_WINDOW.height) return false;
  const { left, top, right, bottom } = windowOf(viewport);
  return bounds.left < left || bounds.top < top || bounds.right > right || bounds.bottom > bottom;
}

/** The map of a network: what part of the sheet it shows, and how large it is on the screen, px. */
export function mapOf(bounds: Bounds): { readonly shown: Bounds; readonly width: number; readonly height: number } {
  const shown = {
    left: bounds.left - EDGE,
    top: bounds.top - EDGE,
    right: bounds.right + EDGE,
    bottom: bounds.bottom + EDGE,
  };
  const [width, height] = [shown.right - shown.left, shown.bottom - shown.top];
  const scale = Math.min(LARGEST.width / width, LARGEST.height / height);
  // a network in one line still gets a map that can be taken hold of
  return { shown, width: Math.max(40, width * scale), height: Math.max(24, height * scale) };
}

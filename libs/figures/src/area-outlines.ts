import type { DrawnNetwork } from './drawn-network';

export interface AreaOutline {
  readonly name: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Room between an area's outermost symbols and its outline. */
const ROOM = 46;

/** A dotted outline around the nodes of each area. */
export function areaOutlines({ nodes }: DrawnNetwork): AreaOutline[] {
  const boxes = new Map<string, { left: number; right: number; top: number; bottom: number }>();
  for (const { node, at } of nodes.values()) {
    if (node.area === undefined) continue;
    const box = boxes.get(node.area) ?? { left: at.x, right: at.x, top: at.y, bottom: at.y };
    boxes.set(node.area, {
      left: Math.min(box.left, at.x),
      right: Math.max(box.right, at.x),
      top: Math.min(box.top, at.y),
      bottom: Math.max(box.bottom, at.y),
    });
  }
  return [...boxes].map(([name, { left, right, top, bottom }]) => ({
    name,
    x: left - ROOM,
    y: top - ROOM,
    width: right - left + 2 * ROOM,
    height: bottom - top + 2 * ROOM,
  }));
}

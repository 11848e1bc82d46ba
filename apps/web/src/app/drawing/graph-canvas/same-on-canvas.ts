import type { Position } from '@riseback/network';
import type { CanvasLink, CanvasNode } from './graph-canvas';

interface OnCanvas {
  readonly nodes: readonly CanvasNode[];
  readonly links: readonly CanvasLink[];
}

/** Whether two states of the drawing have the same elements, in the same order, at the same places. */
export function sameOnCanvas(a: OnCanvas, b: OnCanvas): boolean {
  return same(a.nodes, b.nodes, sameNode) && same(a.links, b.links, sameLink);
}

const sameNode = (a: CanvasNode, b: CanvasNode): boolean => a.id === b.id && samePlace(a.at, b.at);

const sameLink = (a: CanvasLink, b: CanvasLink): boolean =>
  a.id === b.id && a.from === b.from && a.to === b.to && same(a.points, b.points, samePlace);

const samePlace = (a: Position, b: Position): boolean => a.x === b.x && a.y === b.y;

function same<T>(a: readonly T[], b: readonly T[], equal: (a: T, b: T) => boolean): boolean {
  if (a === b) return true;
  if (a.length !== b.length) return false;
  return a.every((item, i) => {
    const other = b[i];
    return other !== undefined && (item === other || equal(item, other));
  });
}

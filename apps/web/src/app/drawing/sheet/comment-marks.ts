import { type Box, pointAt } from '@riseback/figures';
import type { NodeView, PipeView } from '../model/element-views';
import { symbolScale } from '../model/viewport';

/** A number at an element that has open comments: a drop whose point is towards the element. */
export interface CommentMark {
  readonly elementId: string;
  /** The number of its first open comment; `+2` behind it for two more. */
  readonly words: string;
  /** Sheet coordinates times zoom, as labels have theirs. */
  readonly box: Box;
  readonly d: string;
}

/** From a node's middle to the point of the drop, right of it and above, clear of the selection's brackets; px at symbol scale 1. */
const REACH: Readonly<Record<NodeView['node']['kind'], readonly [number, number]>> = {
  trap: [15, 15],
  pumpedInlet: [15, 15],
  junction: [9, 9],
  receiver: [34, 26],
  flashVessel: [16, 38],
};
const HEIGHT = 18;
const LETTER_WIDTH = 7;
/** From a pipe's line to the point. */
const PIPE_GAP = 6;
/** Off the middle, where a lift's words, a check valve or the initials of someone else stand. */
const ALONG_PIPE = 0.38;

interface Views {
  readonly nodes: ReadonlyMap<string, NodeView>;
  readonly pipes: ReadonlyMap<string, PipeView>;
}

/** @param numbersAt numbers of the open comments by element */
export function commentMarks(
  numbersAt: ReadonlyMap<string, readonly number[]>,
  { nodes, pipes }: Views,
  zoom: number,
): CommentMark[] {
  return [...numbersAt].flatMap(([elementId, numbers]): CommentMark[] => {
    const [first] = numbers;
    const tip = tipAt(nodes.get(elementId), pipes.get(elementId), zoom);
    if (first === undefined || tip === null) return [];
    const words = numbers.length === 1 ? String(first) : `${String(first)} +${String(numbers.length - 1)}`;
    const width = Math.max(HEIGHT, words.length * LETTER_WIDTH + 8);
    const box = { x: tip.x, y: tip.y - HEIGHT, width, height: HEIGHT };
    return [{ elementId, words, box, d: drop(box) }];
  });
}

function tipAt(node: NodeView | undefined, pipe: PipeView | undefined, zoom: number): { x: number; y: number } | null {
  if (node !== undefined) {
    const scale = symbolScale(zoom) * zoom;
    const [x, y] = REACH[node.node.kind];
    return { x: node.at.x * zoom + x * scale, y: node.at.y * zoom - y * scale };
  }
  if (pipe === undefined) return null;
  const at = pointAt(pipe.drawn.points, ALONG_PIPE);
  return { x: at.x * zoom + PIPE_GAP, y: at.y * zoom - PIPE_GAP };
}

/** Round but for its lower left corner, which is the point. */
function drop({ x, y, width, height }: Box): string {
  const r = height / 2;
  return `M${x} ${y + height}V${y + r}A${r} ${r} 0 0 1 ${x + r} ${y}H${x + width - r}A${r} ${r} 0 0 1 ${x + width - r} ${y + height}Z`;
}

import type { Position } from '@riseback/network';
import type { Companion } from '../../networks/company';
import { pointAt } from '../../shared/geometry';
import { type Box, linePath } from '@riseback/figures';
import type { NodeView, PipeView } from '../model/element-views';
import { symbolScale } from '../model/viewport';

/** Round what someone else has selected, on the sheet; each of the others has a shape and a dash of their own. */
export interface CompanyOutline {
  readonly key: string;
  /** Which shape and dash. */
  readonly look: number;
  readonly d: string;
  /** Where the shape of a node stands; a pipe's line is in sheet coordinates already. */
  readonly at: Position | null;
  readonly initials: string;
  /** The box of the initials, sheet coordinates times zoom, as labels have theirs. */
  readonly tag: Box;
}

/** Half of a node's outline, clear of the corner brackets of one's own selection, px at symbol scale 1. */
const REACH: Readonly<Record<NodeView['node']['kind'], readonly [number, number]>> = {
  trap: [22, 22],
  pumpedInlet: [22, 22],
  junction: [17, 17],
  receiver: [43, 35],
  flashVessel: [24, 47],
};
/** Several people at one element: one outline outside the other. */
const STEP = 5;
/** As many kinds of outline as there are; the initials tell apart who shares one. */
const LOOKS = 3;
const LETTER_WIDTH = 8;
const TAG_HEIGHT = 15;
/** From a pipe to the initials below it. */
const TAG_GAP = 9;

interface Views {
  readonly nodes: ReadonlyMap<string, NodeView>;
  readonly pipes: ReadonlyMap<string, PipeView>;
}

export function companyOutlines(
  selecting: ReadonlyMap<string, readonly Companion[]>,
  { nodes, pipes }: Views,
  zoom: number,
): CompanyOutline[] {
  return [...selecting].flatMap(([id, others]) =>
    others.flatMap(({ personId, place, initials }, order): CompanyOutline[] => {
      const same = { key: `${id} ${personId}`, look: place % LOOKS, initials };
      const width = initials.length * LETTER_WIDTH + 6;
      const size = { width, height: TAG_HEIGHT };
      const node = nodes.get(id);
      const pipe = pipes.get(id);
      if (node !== undefined) {
        const [x, y] = REACH[node.node.kind].map((half) => half + order * STEP) as [number, number];
        const scale = symbolScale(zoom) * zoom;
        // under the lower left corner, beside those of others
        const left = node.at.x * zoom - x * scale + order * (width + 4);
        const tag = { x: left, y: node.at.y * zoom + y * scale + 1, ...size };
        return [{ ...same, d: shape(same.look, x, y), at: node.at, tag }];
      }
      if (pipe === undefined) return [];
      const { points } = pipe.drawn;
      const middle = pointAt(points, 0.5);
      const tag = { x: middle.x * zoom - width / 2 + order * (width + 4), y: middle.y * zoom + TAG_GAP, ...size };
      return [{ ...same, d: linePath(points), at: null, tag }];
    }),
  );
}

/** Square, with its corners cut, or with its corners rounded. */
function shape(look: number, x: number, y: number): string {
  const corner = Math.min(x, y) * 0.45;
  const [a, b] = [x - corner, y - corner];
  switch (look) {
    case 0:
      return `M${-x} ${-y}H${x}V${y}H${-x}Z`;
    case 1:
      return `M${-a} ${-y}H${a}L${x} ${-b}V${b}L${a} ${y}H${-a}L${-x} ${b}V${-b}Z`;
    default:
      return `M${-a} ${-y}H${a}Q${x} ${-y} ${x} ${-b}V${b}Q${x} ${y} ${a} ${y}H${-a}Q${-x} ${y} ${-x} ${b}V${-b}Q${-x} ${-y} ${-a} ${-y}Z`;
  }
}

import type { NodeKind, Position } from '@riseback/network';
import type { SymbolPart } from './node-symbols';
import { circlePath } from './shapes';

/** Radius of the dial, and how far its middle stands from what it taps, on the symbols' grid. */
export const GAUGE_DIAL = 8;
export const GAUGE_STEM = 19;

/** From a node's middle to the edge that a stem stands on, on the symbols' grid: sideways, and up or down. */
const EDGE: Readonly<Record<NodeKind, readonly [number, number]>> = {
  trap: [10, 10],
  junction: [3.4, 3.4],
  receiver: [32, 13],
  flashVessel: [13, 26],
  pumpedInlet: [10, 10],
};

/** How far from the middle of what it taps a gauge's stem begins. @param towards unit vector to the dial @param kind of the node; undefined on a pipe */
export function stemStart(towards: Position, kind: NodeKind | undefined): number {
  if (kind === undefined) return 0;
  const [aside, upright] = EDGE[kind];
  return Math.abs(towards.x) > Math.abs(towards.y) ? aside : upright;
}

/** A dial on a stem from its tap, about the middle of what it taps. */
export function gaugeSymbol(towards: Position, start: number): readonly SymbolPart[] {
  const [foot, neck, middle] = [start, start + GAUGE_STEM - GAUGE_DIAL, start + GAUGE_STEM];
  const at = (along: number): string => `${towards.x * along} ${towards.y * along}`;
  const [x, y] = [towards.x * middle, towards.y * middle];
  return [
    { d: `M${at(foot)}L${at(neck)}`, look: 'ink' },
    { d: circlePath(GAUGE_DIAL, x, y), look: 'paper' },
    {
      d: `M${x - 1.6} ${y + 2.4}L${x + 3.6} ${y - 4.4}M${x - 4.6} ${y + 3.6}h1.6M${x + 3} ${y + 3.6}h1.6`,
      look: 'thin',
    },
    ...(start === 0 ? [{ d: circlePath(2), look: 'mark' } as const] : []),
  ];
}

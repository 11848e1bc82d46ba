import { type Gauge, inOrder, type NetworkDocument, type Position } from '@riseback/network';
import { GAUGE_STEM, pointAt, stemStart } from '@riseback/figures';
import { type DrawnNetwork, pipesAt } from './drawn-network';
import { gaugeKey } from './gauge-keys';

/** A gauge with its place on the sheet. */
export interface DrawnGauge {
  /** Its name on the sheet, see gauge-keys. */
  readonly id: string;
  readonly gauge: Gauge;
  /** The middle of what it taps. */
  readonly tap: Position;
  /** Unit vector from there to the dial. */
  readonly towards: Position;
  /** Where its stem begins, from the tap, on the symbols' grid. */
  readonly stemStart: number;
  /** The dial, where it is pointed at and focused. */
  readonly at: Position;
}

/** A gauge that is being moved along its pipe, by its name on the sheet. */
export interface Sliding {
  readonly id: string;
  readonly distanceM: number;
}

const UP: Position = { x: 0, y: -1 };
const SIDES: readonly Position[] = [UP, { x: 1, y: 0 }, { x: -1, y: 0 }, { x: 0, y: 1 }];
const CORNERS: readonly Position[] = [
  { x: Math.SQRT1_2, y: -Math.SQRT1_2 },
  { x: -Math.SQRT1_2, y: -Math.SQRT1_2 },
  { x: Math.SQRT1_2, y: Math.SQRT1_2 },
  { x: -Math.SQRT1_2, y: Math.SQRT1_2 },
];

/** The gauges of a document on its drawing. At a node each takes a side that no pipe and no other gauge has. */
export function drawnGauges(
  document: NetworkDocument,
  network: DrawnNetwork,
  sliding?: Sliding,
): ReadonlyMap<string, DrawnGauge> {
  const gauges = new Map<string, DrawnGauge>();
  const taken = new Map<string, Position[]>();
  for (const [id, { value: gauge }] of inOrder(document.gauges)) {
    const distanceM = sliding?.id === gaugeKey(id) ? sliding.distanceM : gauge.distanceM;
    const place =
      gauge.node === undefined ? onPipe(gauge.pipe, distanceM, network) : atNode(gauge.node, network, taken);
    if (place === undefined) continue;
    const { tap, towards, start } = place;
    const reach = start + GAUGE_STEM;
    const at = { x: tap.x + towards.x * reach, y: tap.y + towards.y * reach };
    gauges.set(gaugeKey(id), { id: gaugeKey(id), gauge, tap, towards, stemStart: start, at });
  }
  return gauges;
}

interface Place {
  readonly tap: Position;
  readonly towards: Position;
  readonly start: number;
}

/** Above a level piece, at the right of an upright one. */
function onPipe(id = '', distanceM = 0, { pipes }: DrawnNetwork): Place | undefined {
  const drawn = pipes.get(id);
  if (drawn === undefined) return undefined;
  const { lengthM } = drawn.pipe;
  const { x, y, angleDeg } = pointAt(drawn.points, lengthM === 0 ? 0 : distanceM / lengthM);
  const level = Math.abs(Math.sin((angleDeg * Math.PI) / 180)) < Math.SQRT1_2;
  return { tap: { x, y }, towards: level ? UP : { x: 1, y: 0 }, start: 0 };
}

function atNode(id: string, network: DrawnNetwork, taken: Map<string, Position[]>): Place | undefined {
  const drawn = network.nodes.get(id);
  if (drawn === undefined) return undefined;
  const others = taken.get(id) ?? [];
  const busy = [...others, ...pipesAt(network, id).flatMap((pipe) => leavingTowards(network, pipe, id))];
  const isFree = (side: Position): boolean => busy.every((other) => side.x * other.x + side.y * other.y < 0.9);
  const towards = [...SIDES, ...CORNERS].find(isFree) ?? UP;
  taken.set(id, [...others, towards]);
  return { tap: drawn.at, towards, start: stemStart(towards, drawn.node.kind) };
}

/** The way in which a pipe leaves a node on the sheet. */
function leavingTowards({ pipes }: DrawnNetwork, pipeId: string, nodeId: string): Position[] {
  const drawn = pipes.get(pipeId);
  if (drawn === undefined) return [];
  const points = drawn.pipe.from === nodeId ? drawn.points : drawn.points.toReversed();
  const [from] = points;
  const next = points.find((point) => from !== undefined && (point.x !== from.x || point.y !== from.y));
  if (from === undefined || next === undefined) return [];
  const length = Math.hypot(next.x - from.x, next.y - from.y);
  return [{ x: (next.x - from.x) / length, y: (next.y - from.y) / length }];
}

/** How far along a line, as a share of its length, the point lies that is nearest to a place. */
export function shareNearest(points: readonly Position[], place: Position): number {
  let [best, passed, total] = [{ off: Infinity, along: 0 }, 0, 0];
  for (const [i, b] of points.entries()) {
    const a = points[i - 1];
    if (a === undefined) continue;
    const length = Math.hypot(b.x - a.x, b.y - a.y);
    if (length === 0) continue;
    const along = Math.min(
      length,
      Math.max(0, ((place.x - a.x) * (b.x - a.x) + (place.y - a.y) * (b.y - a.y)) / length),
    );
    const off = Math.hypot(
      place.x - a.x - ((b.x - a.x) * along) / length,
      place.y - a.y - ((b.y - a.y) * along) / length,
    );
    if (off < best.off) best = { off, along: passed + along };
    passed += length;
    total = passed;
  }
  return total === 0 ? 0 : best.along / total;
}

import type { Position } from '@riseback/network';
import { type DisplayUnits, formatQuantity, type QuantityKind } from '@riseback/units';
import { sizeWords } from '../model/accessible-name';
import { nameOf } from '../../shared/element-words';
import type { GaugeView } from '../model/gauge-views';
import type { Concern, NodeView, PipeView, Side } from '../model/element-views';
import { longestPiece, middle, pieces } from '../../shared/geometry';
import { type AreaOutline, type Box, GAUGE_DIAL, GAUGE_STEM, type LabelRequest } from '@riseback/figures';
import { symbolScale } from '../model/viewport';

export interface LabelLine {
  readonly text: string;
  readonly look: 'tag' | 'value' | 'name' | 'lift' | 'pipe' | 'area';
  readonly concern: Concern | null;
}

/** Where a label may stand: its box and how its lines are set in it. */
export interface LabelPlace extends Box {
  readonly align: 'start' | 'middle' | 'end';
}

export interface SheetLabel extends LabelRequest {
  readonly elementId: string;
  readonly lines: readonly LabelLine[];
  readonly candidates: readonly LabelPlace[];
}

/**
 * From which zoom on each kind of label shows; the text keeps its size, so there must be room for it. Values come before tags: what
 * stands against each trap is what the sheet is for, and four digits fit where a tag does not.
 */
const FROM_ZOOM = { values: 0.45, lifts: 0.45, tags: 0.7, gauges: 0.9, pipes: 1.4, cases: 1.4, flows: 2 } as const;
export const LINE_HEIGHT = 14;
const MARK_WIDTH = 15;
const GAP = 4;
/** Selected elements stand in brackets, which labels keep clear of. */
const ROOM_FOR_BRACKETS = 1.3;
/** Half of a symbol with its wash, px at symbol scale 1. */
const SYMBOL_REACH: Readonly<Record<NodeView['node']['kind'], Readonly<{ x: number; y: number }>>> = {
  trap: { x: 15, y: 15 },
  pumpedInlet: { x: 15, y: 15 },
  junction: { x: 9, y: 9 },
  receiver: { x: 36, y: 26 },
  flashVessel: { x: 17, y: 36 },
};

interface Subject {
  readonly nodes: Iterable<NodeView>;
  readonly pipes: Iterable<PipeView>;
  readonly gauges: Iterable<GaugeView>;
  readonly areas: readonly AreaOutline[];
  readonly selected: ReadonlySet<string>;
  /** Pointed at or focused: shows its label at any zoom. */
  readonly pointedAt: ReadonlySet<string>;
}

/**
 * Every label wanted at this zoom, in order of right. Places are sheet coordinates times zoom.
 * @param kind of the values, which are what is coloured
 */
export function sheetLabels(
  { nodes, pipes, gauges, areas, selected, pointedAt }: Subject,
  zoom: number,
  kind: QuantityKind,
  units: DisplayUnits,
): SheetLabel[] {
  const scale = symbolScale(zoom) * zoom;
  const wanted: (SheetLabel & { right: number })[] = areas.map((area) => ({ ...areaLabel(area, zoom), right: 3 }));
  for (const view of nodes) {
    const chosen = selected.has(view.id) || pointedAt.has(view.id);
    if (!chosen && zoom < nodeZoom(view)) continue;
    const lines = nodeLines(view, zoom, chosen, kind, units);
    if (lines.length === 0) continue;
    const candidates = nodePlaces(view, lines, chosen ? scale * ROOM_FOR_BRACKETS : scale, zoom);
    wanted.push({ key: `n:${view.id}`, elementId: view.id, lines, candidates, right: nodeRight(view, chosen) });
  }
  for (const view of pipes) {
    if (view.lift !== null && zoom >= FROM_ZOOM.lifts)
      wanted.push({ ...liftLabel(view, view.lift, zoom, units), right: 6 });
    const chosen = selected.has(view.id) || pointedAt.has(view.id);
    const tag = chosen || zoom >= FROM_ZOOM.pipes ? pipeLabel(view, zoom, units) : undefined;
    if (tag !== undefined) wanted.push({ ...tag, right: chosen ? 0 : 8 });
  }
  for (const view of gauges) {
    const chosen = selected.has(view.id) || pointedAt.has(view.id);
    if (chosen || zoom >= FROM_ZOOM.gauges) wanted.push({ ...gaugeLabel(view, scale, zoom), right: chosen ? 0 : 3 });
  }
  return wanted.sort((a, b) => a.right - b.right);
}

/** What labels must keep clear of: symbols and washes. */
export function labelObstacles(
  nodes: Iterable<NodeView>,
  pipes: Iterable<PipeView>,
  gauges: Iterable<GaugeView>,
  zoom: number,
): Box[] {
  const scale = symbolScale(zoom) * zoom;
  const boxes: Box[] = [];
  for (const view of nodes) {
    const { x, y } = reach(view, scale);
    boxes.push({ x: view.at.x * zoom - x, y: view.at.y * zoom - y, width: 2 * x, height: 2 * y });
  }
  for (const view of gauges) {
    const { x, y } = dialAt(view, scale, zoom);
    const reach = GAUGE_DIAL * scale;
    boxes.push({ x: x - reach, y: y - reach, width: 2 * reach, height: 2 * reach });
  }
  const half = 5 * scale;
  for (const { drawn } of pipes) {
    for (const [a, b] of pieces(drawn.points)) {
      const [left, top] = [Math.min(a.x, b.x) * zoom - half, Math.min(a.y, b.y) * zoom - half];
      boxes.push({
        x: left,
        y: top,
        width: Math.abs(b.x - a.x) * zoom + 2 * half,
        height: Math.abs(b.y - a.y) * zoom + 2 * half,
      });
    }
  }
  return boxes;
}

function nodeZoom({ node }: NodeView): number {
  if (node.kind === 'receiver' || node.kind === 'flashVessel') return 0;
  if (node.kind === 'junction') return node.tag === undefined ? FROM_ZOOM.pipes : FROM_ZOOM.tags;
  return FROM_ZOOM.values;
}

function nodeRight({ node, concern }: NodeView, chosen: boolean): number {
  if (chosen) return 0;
  if (concern === 'fail') return 1;
  if (concern === 'watch') return 2;
  if (node.kind === 'trap' || node.kind === 'pumpedInlet') return 4;
  return node.kind === 'junction' ? 7 : 5;
}

function nodeLines(
  view: NodeView,
  zoom: number,
  chosen: boolean,
  kind: QuantityKind,
  units: DisplayUnits,
): LabelLine[] {
  const { node, concern, shown } = view;
  const value = shown === undefined ? undefined : formatQuantity(shown, kind, units);
  const named = node.kind === 'junction' ? (chosen ? nameOf(node) : (node.tag ?? '')) : nameOf(node);
  const lines: LabelLine[] = [];
  const vessel = node.kind === 'receiver' || node.kind === 'flashVessel';
  if (named !== '' && (chosen || vessel || zoom >= FROM_ZOOM.tags || concern !== null)) {
    // without a value to stand beside, the status shape goes to the tag
    lines.push({ text: named, look: vessel ? 'name' : 'tag', concern: value === undefined ? concern : null });
  }
  if (value !== undefined && (chosen || node.kind !== 'junction' || zoom >= FROM_ZOOM.pipes)) {
    lines.push({ text: value, look: 'value', concern });
  }
  if (view.caseName !== '' && node.kind === 'trap' && (chosen || zoom >= FROM_ZOOM.cases)) {
    lines.push({ text: view.caseName, look: 'tag', concern: null });
  }
  if (zoom >= FROM_ZOOM.flows && node.kind === 'trap') {
    lines.push({
      text: formatQuantity(node.loadKgS, 'massFlow', units, { withUnit: true }),
      look: 'tag',
      concern: null,
    });
  }
  return lines;
}

/** A failing trap in a row of others finds room a line higher than they do; its tag says whose it is. */
function nodePlaces(view: NodeView, lines: readonly LabelLine[], scale: number, zoom: number): LabelPlace[] {
  const at = reach(view, scale);
  const near = sides(view).map((side) => beside(view.at, side, at, lines, zoom));
  if (view.concern !== 'fail') return near;
  const farther = { x: at.x, y: at.y + lines.length * LINE_HEIGHT };
  return [...near, beside(view.at, opposite(view.outlet), farther, lines, zoom)];
}

function sides({ outlet }: NodeView): Side[] {
  const outer = opposite(outlet);
  return [...new Set<Side>([outer, 'right', 'left', 'up', 'down', outlet])];
}

function beside(
  at: Position,
  side: Side,
  { x: rx, y: ry }: { x: number; y: number },
  lines: readonly LabelLine[],
  zoom: number,
): LabelPlace {
  const width = Math.max(...lines.map(lineWidth));
  const height = lines.length * LINE_HEIGHT;
  const [x, y] = [at.x * zoom, at.y * zoom];
  switch (side) {
    case 'up':
      return { x: x - width / 2, y: y - ry - GAP / 2 - height, width, height, align: 'middle' };
    case 'down':
      return { x: x - width / 2, y: y + ry + GAP / 2, width, height, align: 'middle' };
    case 'left':
      return { x: x - rx - GAP - width, y: y - height / 2, width, height, align: 'end' };
    case 'right':
      return { x: x + rx + GAP, y: y - height / 2, width, height, align: 'start' };
  }
}

function liftLabel(
  { id }: PipeView,
  lift: NonNullable<PipeView['lift']>,
  zoom: number,
  units: DisplayUnits,
): SheetLabel {
  const lines: LabelLine[] = [
    { text: `${formatQuantity(lift.riseM, 'length', units, { withUnit: true })} lift`, look: 'lift', concern: null },
  ];
  const [a, b] = lift.piece;
  // the staff stands at the right
  const [right, left] = [
    { x: 13 * zoom + 6, y: 8 },
    { x: 8, y: 8 },
  ];
  const places = [0.5, 0.35, 0.65, 0.2, 0.8].map((share) => ({ x: a.x, y: a.y + (b.y - a.y) * share }));
  return {
    key: `l:${id}`,
    elementId: id,
    lines,
    candidates: [
      ...places.map((at) => beside(at, 'right', right, lines, zoom)),
      ...places.map((at) => beside(at, 'left', left, lines, zoom)),
    ],
  };
}

/** Beside the dial, on the side away from what it taps first. */
function gaugeLabel(view: GaugeView, scale: number, zoom: number): SheetLabel {
  const lines: LabelLine[] = [{ text: nameOf(view.gauge), look: 'tag', concern: null }];
  const dial = dialAt(view, scale, zoom);
  const reach = (GAUGE_DIAL + 1) * scale;
  const { towards } = view;
  const outer: Side = towards.y < -0.5 ? 'up' : towards.y > 0.5 ? 'down' : towards.x > 0 ? 'right' : 'left';
  const order = [...new Set<Side>([outer, 'right', 'left', 'up', 'down'])];
  const at = { x: dial.x / zoom, y: dial.y / zoom };
  return {
    key: `g:${view.id}`,
    elementId: view.id,
    lines,
    candidates: order.map((side) => beside(at, side, { x: reach, y: reach }, lines, zoom)),
  };
}

/** The middle of a dial, sheet coordinates times zoom: stems keep the size of symbols. */
function dialAt({ tap, towards, stemStart }: GaugeView, scale: number, zoom: number): Position {
  const reach = (stemStart + GAUGE_STEM) * scale;
  return { x: tap.x * zoom + towards.x * reach, y: tap.y * zoom + towards.y * reach };
}

/** In the outline, at the corner that is free. */
function areaLabel({ name, x, y, width, height }: AreaOutline, zoom: number): SheetLabel {
  const lines: LabelLine[] = [{ text: name, look: 'area', concern: null }];
  const size = { width: Math.max(...lines.map(lineWidth)), height: LINE_HEIGHT };
  const [left, right] = [x * zoom + 10, (x + width) * zoom - 10 - size.width];
  const [top, bottom] = [y * zoom - LINE_HEIGHT / 2, (y + height) * zoom - LINE_HEIGHT / 2];
  return {
    key: `a:${name}`,
    elementId: '',
    lines,
    candidates: [
      { x: left, y: top, ...size, align: 'start' },
      { x: right, y: top, ...size, align: 'end' },
      { x: left, y: bottom, ...size, align: 'start' },
      { x: right, y: bottom, ...size, align: 'end' },
    ],
  };
}

function pipeLabel({ id, drawn }: PipeView, zoom: number, units: DisplayUnits): SheetLabel | undefined {
  const level = longestPiece(drawn.points, 'level');
  const piece = level ?? longestPiece(drawn.points, 'upright');
  if (piece === undefined) return undefined;
  const lines: LabelLine[] = [
    { text: `${nameOf(drawn.pipe)} ${shortSize(drawn.pipe, units)}`, look: 'pipe', concern: null },
  ];
  const at = middle(piece);
  const room = { x: 10, y: 7 };
  const order: Side[] = level === undefined ? ['right', 'left'] : ['down', 'up'];
  return { key: `p:${id}`, elementId: id, lines, candidates: order.map((side) => beside(at, side, room, lines, zoom)) };
}

/** 1-1/2″, or the bore. */
function shortSize(pipe: PipeView['drawn']['pipe'], units: DisplayUnits): string {
  return pipe.size === undefined ? sizeWords(pipe, units) : `${pipe.size.nps}″`;
}

function reach({ node }: NodeView, scale: number): { x: number; y: number } {
  const { x, y } = SYMBOL_REACH[node.kind];
  return { x: x * scale, y: y * scale };
}

/** Near enough for placing: Inter's digits and capitals at the sizes of the sheet. */
function lineWidth({ text, look, concern }: LabelLine): number {
  const perLetter = look === 'tag' || look === 'pipe' ? 6.2 : 7.2;
  return text.length * perLetter + (concern === null ? 0 : MARK_WIDTH);
}

function opposite(side: Side): Side {
  const across: Readonly<Record<Side, Side>> = { up: 'down', down: 'up', left: 'right', right: 'left' };
  return across[side];
}

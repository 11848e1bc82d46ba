import type { SolveResult, Verdict } from '@riseback/contracts';
import type { Position } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import type { AreaOutline } from './area-outlines';
import type { DrawnNetwork, DrawnNode, DrawnPipe } from './drawn-network';
import { boreWords } from './element-text';
import { nameOf } from './element-words';
import { longestPiece, middle, pieces } from './geometry';
import { type Box, type LabelRequest, placeLabels } from './label-placement';
import { liftOf } from './lift-of-pipe';
import { verdictShapes } from './node-symbols';
import type { Shape, TextShape } from './shapes';
import { trapVerdicts } from './verdict';

interface LabelsInput {
  readonly drawn: DrawnNetwork;
  readonly result: SolveResult | undefined;
  readonly areas: readonly AreaOutline[];
  readonly units: DisplayUnits;
  /** The sheet's edge, which no label may cross. */
  readonly edge: Box;
  /** Size of a unit of the symbols' grid, pt. */
  readonly symbol: number;
}

type Side = 'up' | 'down' | 'left' | 'right';

interface Line {
  readonly text: string;
  readonly style: Pick<TextShape, 'size' | 'weight' | 'ink'>;
  readonly concern?: Exclude<Verdict, 'pass'>;
}

interface Label extends LabelRequest {
  readonly lines: readonly Line[];
  readonly candidates: readonly (Box & { readonly anchor: TextShape['anchor'] })[];
  /** The lower, the sooner it is placed. */
  readonly right: number;
}

const STYLES = {
  tag: { size: 5.4, weight: 400, ink: 'ink2' },
  value: { size: 6.4, weight: 600, ink: 'ink' },
  name: { size: 6, weight: 600, ink: 'ink' },
  lift: { size: 5.8, weight: 600, ink: 'ink' },
  pipe: { size: 5, weight: 400, ink: 'ink3' },
  area: { size: 5.8, weight: 500, ink: 'ink2' },
} as const;
const LEADING = 1.18;
const GAP = 2;
const MARK = 7;
/** Half of a symbol with its wash, units of its grid. */
const REACH: Readonly<Record<DrawnNode['node']['kind'], Readonly<{ x: number; y: number }>>> = {
  trap: { x: 15, y: 15 },
  pumpedInlet: { x: 15, y: 15 },
  junction: { x: 5, y: 5 },
  receiver: { x: 36, y: 26 },
  flashVessel: { x: 17, y: 38 },
};

/** The labels of a drawing on paper, in order of right, each where it finds room. */
export function drawingLabels(input: LabelsInput): { readonly shapes: Shape[]; readonly leftOut: number } {
  const labels = wantedLabels(input)
    .map((label) => ({ ...label, candidates: label.candidates.filter((place) => within(place, input.edge)) }))
    .sort((a, b) => a.right - b.right);
  const taken = placeLabels(labels, obstacles(input));
  const shapes = labels.flatMap((label) => {
    const place = label.candidates[taken.get(label.key) ?? -1];
    return place === undefined ? [] : labelShapes(label, place);
  });
  return { shapes, leftOut: labels.filter(({ key }) => key.startsWith('n:') && !taken.has(key)).length };
}

function wantedLabels({ drawn, result, areas, units, symbol }: LabelsInput): Label[] {
  const pressures = new Map(result?.nodes.map(({ id, pressurePa }) => [id, pressurePa]));
  for (const { id, backPressurePa } of result?.traps ?? []) pressures.set(id, backPressurePa);
  const verdicts = result === undefined ? new Map<string, null>() : trapVerdicts(result);
  const nodes = [...drawn.nodes.values()].flatMap((node): Label[] => {
    const { kind } = node.node;
    if (kind === 'junction' && node.node.tag === undefined) return [];
    const verdict = verdicts.get(node.id) ?? null;
    const concern = verdict === null || verdict === 'pass' ? undefined : verdict;
    const pressurePa = pressures.get(node.id);
    const vessel = kind === 'receiver' || kind === 'flashVessel';
    const lines: Line[] = [{ text: nameOf(node.node), style: vessel ? STYLES.name : STYLES.tag }];
    if (pressurePa !== undefined) {
      const text = formatQuantity(pressurePa, 'pressure', units);
      const ink = concern ?? ('ink' as const);
      const mark = concern === undefined ? {} : { concern };
      lines.push({ text, style: { ...STYLES.value, ink }, ...mark });
    }
    const right = concern === 'fail' ? 0 : concern === 'watch' ? 1 : vessel ? 2 : kind === 'junction' ? 6 : 3;
    const reach = { x: REACH[kind].x * symbol, y: REACH[kind].y * symbol };
    const [outer = 'up', ...others] = sidesOf(node.id, drawn);
    // in a close row a label finds room a line farther out than its neighbours'
    const farther = { x: reach.x, y: reach.y + heightOf(lines) };
    const candidates = [
      ...[outer, ...others].map((side) => beside(node.at, side, reach, lines)),
      beside(node.at, outer, farther, lines),
    ];
    return [{ key: `n:${node.id}`, lines, candidates, right }];
  });
  const pipes = [...drawn.pipes.values()].flatMap((pipe) => [
    ...liftLabel(pipe, drawn, units, symbol),
    ...pipeLabel(pipe, units, symbol),
  ]);
  return [...areas.map(areaLabel), ...nodes, ...pipes];
}

function liftLabel(pipe: DrawnPipe, drawn: DrawnNetwork, units: DisplayUnits, symbol: number): Label[] {
  const { riseM, piece } = liftOf(drawn, pipe.pipe, pipe.points);
  if (piece === undefined) return [];
  const text = `${formatQuantity(riseM, 'length', units, { withUnit: true })} lift`;
  const lines: Line[] = [{ text, style: STYLES.lift }];
  const [a, b] = piece;
  const places = [0.5, 0.35, 0.65, 0.2, 0.8].map((share) => ({ x: a.x, y: a.y + (b.y - a.y) * share }));
  const [right, left] = [
    { x: 19 * symbol, y: 4 },
    { x: 5 * symbol, y: 4 },
  ];
  const candidates = [
    ...places.map((at) => beside(at, 'right', right, lines)),
    ...places.map((at) => beside(at, 'left', left, lines)),
  ];
  return [{ key: `l:${pipe.id}`, lines, candidates, right: 4 }];
}

function pipeLabel({ id, pipe, points }: DrawnPipe, units: DisplayUnits, symbol: number): Label[] {
  const level = longestPiece(points, 'level');
  const piece = level ?? longestPiece(points, 'upright');
  if (piece === undefined) return [];
  const lines: Line[] = [{ text: `${nameOf(pipe)} ${boreWords(pipe, units)}`, style: STYLES.pipe }];
  const at = middle(piece);
  const room = { x: 6 * symbol, y: 5 * symbol };
  const sides: Side[] = level === undefined ? ['right', 'left'] : ['down', 'up'];
  return [{ key: `p:${id}`, lines, candidates: sides.map((side) => beside(at, side, room, lines)), right: 7 }];
}

/** In the outline, at the corner that is free. */
function areaLabel({ name, x, y, width, height }: AreaOutline): Label {
  const lines: Line[] = [{ text: name, style: STYLES.area }];
  const size = { width: widthOf(lines), height: heightOf(lines) };
  const [left, right] = [x + 6, x + width - 6 - size.width];
  const [top, bottom] = [y - size.height / 2, y + height - size.height / 2];
  const at = (px: number, py: number) => ({ x: px, y: py, ...size, anchor: 'start' as const });
  return {
    key: `a:${name}`,
    lines,
    candidates: [at(left, top), at(right, top), at(left, bottom), at(right, bottom)],
    right: 5,
  };
}

function beside(at: Position, side: Side, reach: { x: number; y: number }, lines: readonly Line[]) {
  const [width, height] = [widthOf(lines), heightOf(lines)];
  switch (side) {
    case 'up':
      return { x: at.x - width / 2, y: at.y - reach.y - height, width, height, anchor: 'middle' as const };
    case 'down':
      return { x: at.x - width / 2, y: at.y + reach.y + GAP / 2, width, height, anchor: 'middle' as const };
    case 'left':
      return { x: at.x - reach.x - GAP - width, y: at.y - height / 2, width, height, anchor: 'end' as const };
    case 'right':
      return { x: at.x + reach.x + GAP, y: at.y - height / 2, width, height, anchor: 'start' as const };
  }
}

function labelShapes({ lines }: Label, { x, y, width, anchor }: Label['candidates'][number]): Shape[] {
  let baseline = y;
  return lines.flatMap(({ text, style, concern }): Shape[] => {
    baseline += style.size * LEADING;
    const mark = concern === undefined ? 0 : MARK;
    const at = anchor === 'start' ? x + mark : anchor === 'end' ? x + width : x + width / 2 + mark / 2;
    const line: Shape = { kind: 'text', x: at, y: baseline - style.size * 0.25, text, ...style, anchor, halo: true };
    if (concern === undefined) return [line];
    const textWidth = lineWidth({ text, style });
    const start = anchor === 'start' ? x : anchor === 'end' ? x + width - textWidth - mark : at - textWidth / 2 - mark;
    const shapes = verdictShapes(concern);
    return [line, { kind: 'group', x: start + 3, y: baseline - style.size * 0.6, scale: 0.5, shapes }];
  });
}

/** The outer side first, away from where its pipe goes. */
function sidesOf(id: string, { leaving, entering, pipes }: DrawnNetwork): Side[] {
  const out =
    pipes.get(leaving.get(id)?.[0] ?? '')?.points ?? pipes.get(entering.get(id)?.[0] ?? '')?.points.toReversed();
  const [a, b] = out ?? [];
  const outlet: Side =
    a === undefined || b === undefined
      ? 'down'
      : Math.abs(b.y - a.y) >= Math.abs(b.x - a.x)
        ? b.y < a.y
          ? 'up'
          : 'down'
        : b.x < a.x
          ? 'left'
          : 'right';
  const across: Readonly<Record<Side, Side>> = { up: 'down', down: 'up', left: 'right', right: 'left' };
  return [...new Set<Side>([across[outlet], 'right', 'left', 'up', 'down'])];
}

function obstacles({ drawn, symbol }: LabelsInput): Box[] {
  const half = 5 * symbol;
  return [
    ...[...drawn.nodes.values()].map(({ node, at }): Box => {
      const { x, y } = REACH[node.kind];
      return { x: at.x - x * symbol, y: at.y - y * symbol, width: 2 * x * symbol, height: 2 * y * symbol };
    }),
    ...[...drawn.pipes.values()].flatMap(({ points }) =>
      pieces(points).map(([a, b]): Box => ({
        x: Math.min(a.x, b.x) - half,
        y: Math.min(a.y, b.y) - half,
        width: Math.abs(b.x - a.x) + 2 * half,
        height: Math.abs(b.y - a.y) + 2 * half,
      })),
    ),
  ];
}

function within(inner: Box, { x, y, width, height }: Box): boolean {
  return inner.x >= x && inner.y >= y && inner.x + inner.width <= x + width && inner.y + inner.height <= y + height;
}

function widthOf(lines: readonly Line[]): number {
  return Math.max(...lines.map((line) => lineWidth(line) + (line.concern === undefined ? 0 : MARK)));
}

function heightOf(lines: readonly Line[]): number {
  return lines.reduce((sum, { style }) => sum + style.size * LEADING, 0);
}

/** Near enough for placing: Inter's digits and capitals. */
function lineWidth({ text, style }: Pick<Line, 'text' | 'style'>): number {
  return text.length * style.size * (style.weight === 600 ? 0.62 : 0.6);
}

import type { SolveResult } from '@riseback/contracts';
import { type NetworkDocument, type Position } from '@riseback/network';
import { type DisplayUnits } from '@riseback/units';
import { areaOutlines } from './area-outlines';
import { type ColourScale, stretches } from './colour-scale';
import { crossings } from './crossings';
import { drawingLabels } from './drawing-labels';
import { type DrawnNetwork, drawnNetwork, type DrawnPipe } from './drawn-network';
import { cutLine, pieces, pointAt } from './geometry';
import { liftOf } from './lift-of-pipe';
import { linePath } from './line-path';
import { symbolShapes } from './node-symbols';
import { circlePath, type Ink, rectanglePath, type Shape } from './shapes';
import { FIELD, rowLetter, type Sheet, sheetAround } from './sheet-zones';

export interface NetworkDrawingInput {
  readonly document: NetworkDocument;
  /** Of the case that is drawn; without it the network is drawn unsolved. */
  readonly result: SolveResult | undefined;
  readonly isolated: ReadonlySet<string>;
  readonly scale: ColourScale;
  readonly units: DisplayUnits;
  /** Room for the sheet with its edge, pt. */
  readonly width: number;
  readonly height: number;
}

export interface NetworkDrawing {
  readonly shapes: readonly Shape[];
  readonly width: number;
  readonly height: number;
  /** How many labels found no room. */
  readonly labelsLeftOut: number;
}

/** The strip of letters and numbers around the sheet, pt. */
const STRIP = 13;
/** Symbols keep a size that can be told apart, pt a unit of their grid. */
const SYMBOL = { least: 0.34, most: 0.8 } as const;
const PAPER_CORE_FROM = 5;
/** A tick each 2 ft. */
const TICK_M = 0.6096;

/** A network on paper: what the sheet on the screen shows, fitted into a page, with labels where they find room. */
export function networkDrawing(input: NetworkDrawingInput): NetworkDrawing {
  const drawn = drawnNetwork(input.document);
  const areas = areaOutlines(drawn);
  const corners = areas.flatMap(({ x, y, width, height }) => [
    { x, y },
    { x: x + width, y: y + height },
  ]);
  const lines = [...drawn.pipes.values()].flatMap(({ points }) => points);
  const sheet = sheetAround([...[...drawn.nodes.values()].map(({ at }) => at), ...corners, ...lines]);
  const [sheetWidth, sheetHeight] = [sheet.columns * FIELD.width, sheet.rows * FIELD.height];
  const fit = Math.min((input.width - 2 * STRIP) / sheetWidth, (input.height - 2 * STRIP) / sheetHeight);
  const symbol = Math.min(SYMBOL.most, Math.max(SYMBOL.least, fit));
  const place = ({ x, y }: Position): Position => ({
    x: STRIP + (x - sheet.left) * fit,
    y: STRIP + (y - sheet.top) * fit,
  });
  const painter = new DrawingPainter(input, placed(drawn, place), symbol);
  const outlines = areas.map(({ name, x, y, width, height }) => ({
    name,
    ...place({ x, y }),
    width: width * fit,
    height: height * fit,
  }));
  const edge = { x: STRIP + 1, y: STRIP + 1, width: sheetWidth * fit - 2, height: sheetHeight * fit - 2 };
  const labels = drawingLabels({ ...input, drawn: painter.drawn, areas: outlines, edge, symbol });
  return {
    shapes: [
      ...outlines.map(({ x, y, width, height }): Shape => ({
        kind: 'path',
        d: rectanglePath(x, y, width, height),
        stroke: 'ruleStrong',
        width: 0.5,
        dash: [1.2, 1.8],
      })),
      ...painter.pipes(),
      ...painter.nodes(),
      ...labels.shapes,
      ...zoneFrame(sheet, fit),
    ],
    width: sheetWidth * fit + 2 * STRIP,
    height: sheetHeight * fit + 2 * STRIP,
    labelsLeftOut: labels.leftOut,
  };
}

/** The same with every place on the page instead of on the sheet. */
function placed(drawn: DrawnNetwork, place: (at: Position) => Position): DrawnNetwork {
  const nodes = new Map([...drawn.nodes].map(([id, node]) => [id, { ...node, at: place(node.at) }]));
  const pipes = new Map(
    [...drawn.pipes].map(([id, pipe]) => [id, { ...pipe, points: pipe.points.map(place), at: place(pipe.at) }]),
  );
  return { ...drawn, nodes, pipes };
}

class DrawingPainter {
  private readonly results: ReadonlyMap<string, SolveResult['pipes'][number]>;

  constructor(
    private readonly input: NetworkDrawingInput,
    readonly drawn: DrawnNetwork,
    private readonly symbol: number,
  ) {
    this.results = new Map(input.result?.pipes.map((pipe) => [pipe.id, pipe]));
  }

  pipes(): Shape[] {
    const over = crossings([...this.drawn.pipes.values()]);
    return [...this.drawn.pipes.values()].flatMap((pipe) => [
      ...(over.get(pipe.id) ?? []).map(({ x, y, level }): Shape => ({
        kind: 'path',
        d: level ? `M${x - 4.5} ${y}h9` : `M${x} ${y - 4.5}v9`,
        stroke: 'paper',
        width: 18 * this.symbol,
      })),
      ...this.pipe(pipe),
    ]);
  }

  nodes(): Shape[] {
    const pressures = new Map(this.input.result?.nodes.map(({ id, pressurePa }) => [id, pressurePa]));
    for (const { id, backPressurePa } of this.input.result?.traps ?? []) pressures.set(id, backPressurePa);
    return [...this.drawn.nodes.values()].map(({ id, node, at }): Shape => {
      const pressurePa = pressures.get(id);
      const round = node.kind === 'trap' || node.kind === 'pumpedInlet';
      const type = node.kind === 'trap' ? node.trapType : undefined;
      const vented = node.kind === 'receiver' && node.vented === true;
      const ring: Shape[] =
        round && pressurePa !== undefined
          ? [{ kind: 'path', d: circlePath(12), stroke: this.inkOf(pressurePa, pressurePa), width: 4.4 }]
          : [];
      const cross: Shape[] = this.input.isolated.has(id)
        ? [{ kind: 'path', d: 'M-9 -9 9 9M9 -9 -9 9', stroke: 'ink3', width: 1.5 }]
        : [];
      return {
        kind: 'group',
        ...at,
        scale: this.symbol,
        shapes: [...ring, ...symbolShapes(node.kind, type, vented), ...cross],
      };
    });
  }

  private pipe({ id, pipe, points, at }: DrawnPipe): Shape[] {
    const result = this.results.get(id);
    const { symbol, input } = this;
    const from = this.drawn.nodes.get(pipe.from)?.node;
    const branch = from?.kind === 'trap' || from?.kind === 'pumpedInlet';
    const mark = (place: Position & { angleDeg?: number }, shapes: Shape[]): Shape => ({
      kind: 'group',
      x: place.x,
      y: place.y,
      scale: symbol,
      ...(place.angleDeg === undefined ? {} : { turnDeg: place.angleDeg }),
      shapes,
    });
    const valve = pipe.checkValve
      ? [
          mark(pointAt(points, 0.7), [
            { kind: 'path', d: 'M-6 -6V6L5 0ZM5.6 -6.4V6.4', fill: 'paper', stroke: 'ink', width: 1.4 },
          ]),
        ]
      : [];
    if (result === undefined) {
      const isolated = input.isolated.has(pipe.from);
      const core: Shape = {
        kind: 'path',
        d: linePath(points),
        stroke: isolated ? 'ink3' : 'ink',
        width: 1.4 * symbol,
        ...(isolated ? {} : { dash: [2.5, 2] as const }),
      };
      return [core, ...this.staff(pipe, points), ...valve];
    }
    const reversed = result.massFlowKgS < 0;
    const parts = stretches(result.upstreamPressurePa, result.downstreamPressurePa, input.scale);
    const along = reversed ? parts.map((part) => ({ ...part, from: 1 - part.to, to: 1 - part.from })) : parts;
    const pieceOf = (part: (typeof along)[number]) => linePath(cutLine(points, part.from, part.to));
    const middle = along.find((part) => part.from <= 0.5 && part.to >= 0.5)?.level ?? 1;
    return [
      ...along.map((part): Shape => ({
        kind: 'path',
        d: pieceOf(part),
        stroke: `p${part.level}`,
        width: (branch ? 6 : 8) * symbol,
      })),
      ...along.map((part): Shape => ({
        kind: 'path',
        d: pieceOf(part),
        stroke: part.level >= PAPER_CORE_FROM ? 'paper' : 'ink',
        width: 1.4 * symbol,
      })),
      ...this.staff(pipe, points),
      ...this.arrow(points, result.massFlowKgS, middle).map((arrow) => mark(arrow.at, [arrow.shape])),
      ...(reversed ? [mark(at, [{ kind: 'path', d: 'M0 -7 7 0 0 7 -7 0Z', fill: 'fail' }])] : []),
      ...(result.choked === true
        ? [
            mark(pointAt(points, reversed ? 0.15 : 0.85), [
              { kind: 'path', d: 'M-2.5 -8V8M2.5 -8V8', stroke: 'paper', width: 4 },
              { kind: 'path', d: 'M-2.5 -8V8M2.5 -8V8', stroke: 'ink', width: 2 },
              { kind: 'path', d: 'M-14 -6 -8 0 -14 6 -20 0Z', fill: 'fail' },
            ]),
          ]
        : []),
      ...valve,
    ];
  }

  /** On the longest piece, off its middle, where it keeps clear of labels. */
  private arrow(points: readonly Position[], massFlowKgS: number, level: number) {
    if (massFlowKgS === 0) return [];
    const longest = pieces(points).reduce<[Position, Position] | undefined>(
      (best, piece) => (best === undefined || span(piece) > span(best) ? piece : best),
      undefined,
    );
    if (longest === undefined || span(longest) < 36 * this.symbol) return [];
    const on = pointAt(longest, 0.62);
    const at = massFlowKgS < 0 ? { ...on, angleDeg: on.angleDeg + 180 } : on;
    const stroke = level >= PAPER_CORE_FROM ? ('paper' as const) : ('ink' as const);
    return [{ at, shape: { kind: 'path', d: 'M-4 -4.4 3 0 -4 4.4', stroke, width: 1.8, round: true } as const }];
  }

  /** A small gauge staff beside a riser, a tick each 2 ft. */
  private staff(pipe: DrawnPipe['pipe'], points: readonly Position[]): Shape[] {
    const { riseM, piece } = liftOf(this.drawn, pipe, points);
    if (piece === undefined) return [];
    const [a, b] = piece;
    const [top, bottom] = [Math.min(a.y, b.y), Math.max(a.y, b.y)];
    const x = a.x + 13 * this.symbol;
    const count = Math.floor(riseM / TICK_M);
    const step = (bottom - top) / (riseM / TICK_M);
    const tick = 4 * this.symbol;
    const ticks =
      step < 1.2 ? '' : Array.from({ length: count + 1 }, (_, i) => `M${x} ${bottom - i * step}h${tick}`).join('');
    const ends = `M${x} ${top}V${bottom}M${x} ${top}h${1.5 * tick}M${x} ${bottom}h${1.5 * tick}`;
    return [{ kind: 'path', d: ends + ticks, stroke: 'ink3', width: 0.5 }];
  }

  private inkOf(startPa: number, endPa: number): Ink {
    return `p${stretches(startPa, endPa, this.input.scale)[0]?.level ?? 1}`;
  }
}

function span([a, b]: readonly [Position, Position]): number {
  return Math.abs(b.x - a.x) + Math.abs(b.y - a.y);
}

/** The edge of the sheet: numbers along, letters down. */
function zoneFrame({ columns, rows }: Sheet, fit: number): Shape[] {
  const [width, height] = [columns * FIELD.width * fit, rows * FIELD.height * fit];
  const [right, bottom] = [STRIP + width, STRIP + height];
  const letter = (x: number, y: number, text: string): Shape => ({
    kind: 'text',
    x,
    y: y + 2.3,
    text,
    size: 6.4,
    weight: 400,
    ink: 'ink3',
    anchor: 'middle',
  });
  const marks: Shape[] = [];
  let ticks = '';
  for (let column = 0; column < columns; column += 1) {
    const x = STRIP + (column + 0.5) * FIELD.width * fit;
    const edge = STRIP + column * FIELD.width * fit;
    marks.push(letter(x, STRIP / 2, String(column + 1)), letter(x, bottom + STRIP / 2, String(column + 1)));
    if (column > 0) ticks += `M${edge} 3V${STRIP}M${edge} ${bottom}v${STRIP - 3}`;
  }
  for (let row = 0; row < rows; row += 1) {
    const y = STRIP + (row + 0.5) * FIELD.height * fit;
    const edge = STRIP + row * FIELD.height * fit;
    marks.push(letter(STRIP / 2, y, rowLetter(row)), letter(right + STRIP / 2, y, rowLetter(row)));
    if (row > 0) ticks += `M3 ${edge}H${STRIP}M${right} ${edge}h${STRIP - 3}`;
  }
  return [
    { kind: 'path', d: rectanglePath(STRIP, STRIP, width, height), stroke: 'ink', width: 0.9 },
    { kind: 'path', d: ticks, stroke: 'ruleStrong', width: 0.5 },
    ...marks,
  ];
}

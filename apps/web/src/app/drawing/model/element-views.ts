import type { NodeResult, PipeResult, SolveWarning, TrapResult, Verdict } from '@riseback/contracts';
import type { NetworkNode, Position } from '@riseback/network';
import type { DisplayUnits } from '@riseback/units';
import { nodeName, pipeName } from './accessible-name';
import { classOf, type ColourClass, type ColourScale, type Stretch, stretches } from '@riseback/figures';
import type { DrawnNetwork, DrawnNode, DrawnPipe } from './drawn-network';
import { cutLine, lineLength, longestPiece, pointAt, type PointOnLine } from '../../shared/geometry';

export type Side = 'up' | 'down' | 'left' | 'right';
export type Concern = Exclude<Verdict, 'pass'>;

/** A node as the sheet shows it with the result of the chosen case. */
export interface NodeView {
  readonly id: string;
  readonly node: NetworkNode;
  readonly at: Position;
  readonly solved: boolean;
  readonly isolated: boolean;
  readonly level: ColourClass | null;
  readonly concern: Concern | null;
  /** Back pressure of a trap, pressure of any other node, Pa absolute. */
  readonly pressurePa: number | undefined;
  /** What its label shows: the quantity that is coloured. */
  readonly shown: number | undefined;
  /** The case its result is of, where each element shows its own worst; else ''. */
  readonly caseName: string;
  /** Where the first pipe goes; labels keep to the other side. */
  readonly outlet: Side;
  /** Read out. */
  readonly name: string;
}

export interface WashPiece {
  readonly points: readonly Position[];
  readonly level: ColourClass;
}

export interface LiftMark {
  readonly piece: readonly [Position, Position];
  readonly riseM: number;
}

export interface PipeView {
  readonly id: string;
  readonly drawn: DrawnPipe;
  readonly solved: boolean;
  readonly isolated: boolean;
  readonly reversed: boolean;
  readonly concern: Concern | null;
  readonly wash: readonly WashPiece[];
  /** A branch carries one trap and is drawn narrower. */
  readonly branch: boolean;
  readonly arrow: (PointOnLine & { readonly level: ColourClass | null }) | null;
  readonly checkValve: PointOnLine | null;
  /** Where the double bar of a choked outlet stands; null where it is free. */
  readonly choked: PointOnLine | null;
  readonly lift: LiftMark | null;
  readonly name: string;
}

export interface SceneResults {
  readonly traps: ReadonlyMap<string, TrapResult>;
  readonly nodes: ReadonlyMap<string, NodeResult>;
  readonly pipes: ReadonlyMap<string, PipeResult>;
  readonly warnings: ReadonlyMap<string, readonly SolveWarning[]>;
  readonly isolated: ReadonlySet<string>;
  /** The case that an element's result is of, where each element shows its own worst; else ''. */
  readonly caseNameOf: (id: string) => string;
}

/** Rises lower than this get no staff beside them, m: 3 ft. */
const LEAST_LIFT_M = 0.9144;
/** Shorter pieces have no room for an arrow, drawing units. */
const LEAST_ARROW_PIECE = 36;

/** A choked outlet's bar keeps so far from the end of the line, drawing units: a receiver reaches 46 from its middle. */
const CHOKED_FROM_END = 58;

export function nodeView(
  { id, node, at }: DrawnNode,
  network: DrawnNetwork,
  results: SceneResults,
  scale: ColourScale,
  units: DisplayUnits,
  selected: boolean,
): NodeView {
  const trap = results.traps.get(id);
  const result = results.nodes.get(id);
  const warnings = results.warnings.get(id) ?? [];
  const coloured = nodeValue(scale, trap, result);
  return {
    id,
    node,
    at,
    solved: trap !== undefined || result !== undefined,
    isolated: results.isolated.has(id),
    level: coloured === undefined ? null : classOf(coloured, scale),
    concern: worstConcern([...(trap?.checks ?? []), ...warnings]),
    pressurePa: trap?.backPressurePa ?? result?.pressurePa,
    shown: coloured,
    outlet: outletSide(id, network),
    caseName: results.caseNameOf(id),
    name: nodeName(node, { trap, result, warnings, selected, caseName: results.caseNameOf(id) }, units),
  };
}

export function pipeView(
  drawn: DrawnPipe,
  network: DrawnNetwork,
  results: SceneResults,
  scale: ColourScale,
  units: DisplayUnits,
  selected: boolean,
): PipeView {
  const { id, pipe, points } = drawn;
  const result = results.pipes.get(id);
  const from = network.nodes.get(pipe.from)?.node;
  const to = network.nodes.get(pipe.to)?.node;
  const warnings = results.warnings.get(id) ?? [];
  const reversed = result !== undefined && result.massFlowKgS < 0;
  const parts = result === undefined ? [] : pipeStretches(scale, result);
  const rise = (to?.elevationM ?? 0) - (from?.elevationM ?? 0);
  const upright = rise >= LEAST_LIFT_M ? longestPiece(points, 'upright') : undefined;
  return {
    id,
    drawn,
    solved: result !== undefined,
    isolated: results.isolated.has(pipe.from),
    reversed,
    concern: worstConcern(warnings),
    wash: parts.map((part) => ({ points: cutLine(points, part.from, part.to), level: part.level })),
    branch: from?.kind === 'trap' || from?.kind === 'pumpedInlet',
    arrow: arrowOn(points, reversed, result !== undefined && result.massFlowKgS === 0, parts),
    checkValve: pipe.checkValve ? pointAt(points, 0.7) : null,
    choked: result?.choked === true ? chokedAt(points, reversed) : null,
    lift: upright === undefined ? null : { piece: upright, riseM: rise },
    name: pipeName(pipe, { from, to, result, warnings, selected, caseName: results.caseNameOf(id) }, units),
  };
}

/** The worst that is said about an element; null when nothing is. */
export function worstConcern(findings: readonly { readonly verdict: Verdict }[]): Concern | null {
  if (findings.some(({ verdict }) => verdict === 'fail')) return 'fail';
  return findings.some(({ verdict }) => verdict === 'watch') ? 'watch' : null;
}

function nodeValue(
  { by }: ColourScale,
  trap: TrapResult | undefined,
  result: NodeResult | undefined,
): number | undefined {
  switch (by) {
    case 'pressure':
      return trap?.backPressurePa ?? result?.pressurePa;
    case 'flash':
      return result?.quality;
    case 'velocity':
      return undefined;
  }
}

function pipeStretches(scale: ColourScale, result: PipeResult): Stretch[] {
  switch (scale.by) {
    case 'pressure':
      return stretches(result.upstreamPressurePa, result.downstreamPressurePa, scale);
    case 'flash':
      return stretches(result.upstreamQuality, result.downstreamQuality, scale);
    case 'velocity':
      return stretches(result.mixtureVelocityMS, result.mixtureVelocityMS, scale);
  }
}

/** Towards the end of the flow; on a short line not past its last third, so that it is still seen which end is meant. */
function chokedAt(points: readonly Position[], reversed: boolean): PointOnLine {
  const share = Math.min(1 / 3, CHOKED_FROM_END / Math.max(lineLength(points), 1));
  return pointAt(points, reversed ? share : 1 - share);
}

/** On the longest piece, off its middle, so that the arrow keeps clear of tags and lift marks. */
function arrowOn(
  points: readonly Position[],
  reversed: boolean,
  still: boolean,
  parts: readonly Stretch[],
): PipeView['arrow'] {
  const level = longestPiece(points, 'level');
  const upright = longestPiece(points, 'upright');
  const piece = [level, upright]
    .flatMap((candidate) => (candidate === undefined ? [] : [candidate]))
    .reduce<[Position, Position] | undefined>(
      (best, next) => (best === undefined || span(next) > span(best) ? next : best),
      undefined,
    );
  if (still || piece === undefined || span(piece) < LEAST_ARROW_PIECE) return null;
  const on = pointAt(piece, 0.62);
  const middle = parts.find((part) => part.from <= 0.5 && part.to >= 0.5);
  return { ...on, angleDeg: reversed ? on.angleDeg + 180 : on.angleDeg, level: middle?.level ?? null };
}

function span([a, b]: readonly [Position, Position]): number {
  return Math.abs(b.x - a.x) + Math.abs(b.y - a.y);
}

function outletSide(id: string, { leaving, entering, pipes }: DrawnNetwork): Side {
  const out = leaving.get(id)?.[0];
  const into = entering.get(id)?.[0];
  const points =
    out !== undefined ? pipes.get(out)?.points : into !== undefined ? pipes.get(into)?.points.toReversed() : undefined;
  const [a, b] = points ?? [];
  if (a === undefined || b === undefined) return 'down';
  if (Math.abs(b.y - a.y) >= Math.abs(b.x - a.x)) return b.y < a.y ? 'up' : 'down';
  return b.x < a.x ? 'left' : 'right';
}

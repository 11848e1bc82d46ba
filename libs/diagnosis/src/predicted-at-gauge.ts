import type { Gauge, NetworkFile, PipeRun } from '@riseback/network';
import {
  liftProfile,
  liftProfileBands,
  type NodeResult,
  type PipeResult,
  type ProfileBand,
  type ProfilePoint,
  type TrapResult,
  type WalkedResult,
} from '@riseback/solver';
import { cutAt, gaugeTap, routeOf, type GaugeTap } from './gauge-tap';

/** What agreement needs of a result, be it fresh from the solver or read from the server. */
export interface PredictedResult extends WalkedResult {
  readonly nodes: readonly NodeResult[];
  readonly pipes: readonly PipeResult[];
  readonly traps: readonly (Pick<TrapResult, 'id' | 'backPressurePa' | 'receiverPressurePa' | 'walk'> & {
    readonly basis?: TrapResult['basis'] | undefined;
    readonly credible?: TrapResult['credible'] | undefined;
  })[];
}

/** What the model says of the pressure at a gauge's tap; absolute. */
export interface GaugePrediction {
  readonly tap: GaugeTap;
  readonly pressurePa: number;
  /** `solved` at a node and at a pipe's ends, `marched` within a pipe, `between` its ends where no trap's way leads through it. */
  readonly by: 'solved' | 'marched' | 'between';
  /** Between the methods that fit the flow; absent where the result has no bands, and where no trap's way passes. */
  readonly credible?: { readonly lowPa: number; readonly highPa: number } | undefined;
  /** Pipes from the tap to the end of its way, the gauge's own first, each with the share of it that lies below the tap. */
  readonly below: readonly { readonly pipe: string; readonly share: number }[];
  /** What stands at the end of that way; absent where no trap's way passes. */
  readonly endPressurePa?: number | undefined;
}

/**
 * The pressure at a gauge's tap by a result. At a node it is the result's. Within a pipe the way of a trap that runs through is marched
 * again with its pipe cut at the tap, so that it meets the result at both ends; where no trap's way leads through (below a flash vessel,
 * behind a pump) it lies between the pipe's ends, static lift shared by climb and the rest by length.
 * @param file the file that was solved
 * @returns undefined where the result does not have the gauge's element
 */
export function predictedAtGauge(
  file: NetworkFile,
  result: PredictedResult,
  gauge: Pick<Gauge, 'node' | 'pipe' | 'distanceM'>,
): GaugePrediction | undefined {
  const tap = gaugeTap(file, gauge);
  if (tap === undefined) return undefined;
  if (tap.at === 'node') return atNode(file, result, tap, tap.node);
  const found = result.pipes.find(({ id }) => id === tap.pipe.id);
  if (found === undefined) return undefined;
  const withArrow = found.massFlowKgS >= 0;
  if (tap.distanceM > 0 && tap.distanceM < tap.pipe.lengthM) return withinPipe(file, result, tap, found);
  const atInlet = withArrow ? tap.distanceM <= 0 : tap.distanceM > 0;
  const node = tap.distanceM <= 0 ? tap.pipe.from : tap.pipe.to;
  const prediction = atNode(file, result, tap, node);
  // the outlet of a choked pipe stands above the node that it discharges into
  return prediction && !atInlet && found.outletPressurePa !== undefined
    ? { ...prediction, pressurePa: found.outletPressurePa }
    : prediction;
}

function atNode(
  file: NetworkFile,
  result: PredictedResult,
  tap: GaugeTap,
  nodeId: string,
): GaugePrediction | undefined {
  const node = result.nodes.find(({ id }) => id === nodeId);
  if (node === undefined) return undefined;
  const common = { tap, pressurePa: node.pressurePa, by: 'solved' } as const;
  const leaving = result.pipes.find(({ id, massFlowKgS }) => {
    const pipe = file.pipes.find((candidate) => candidate.id === id);
    return pipe !== undefined && massFlowKgS !== 0 && (massFlowKgS > 0 ? pipe.from : pipe.to) === nodeId;
  });
  const trap = leaving && trapThrough(result, leaving.id);
  if (trap === undefined || leaving === undefined) return { ...common, below: [] };
  const below = trap.walk.slice(trap.walk.indexOf(leaving.id)).map((pipe) => ({ pipe, share: 1 }));
  const points = trap.credible === undefined ? [] : liftProfile(file, result, trap.id);
  // the way enters this pipe where the point before its first stands
  const first = points.findIndex(({ pipeId }, i) => i > 0 && pipeId === leaving.id);
  return {
    ...common,
    below,
    endPressurePa: trap.receiverPressurePa,
    credible: bandAt(liftBands(file, result, trap.id, points), first - 1),
  };
}

function withinPipe(
  file: NetworkFile,
  result: PredictedResult,
  tap: GaugeTap & { at: 'pipe' },
  found: PipeResult,
): GaugePrediction {
  const withArrow = found.massFlowKgS >= 0;
  const shareBelow = (withArrow ? tap.pipe.lengthM - tap.distanceM : tap.distanceM) / tap.pipe.lengthM;
  const trap = trapThrough(result, tap.pipe.id);
  if (trap !== undefined) {
    const { cut, piecesBefore } = withCut(file, tap);
    const points = liftProfile(cut, result, trap.id);
    const index = indexOfTap(points, tap.pipe, piecesBefore, withArrow);
    const point = points[index];
    if (point !== undefined) {
      const [, ...rest] = trap.walk.slice(trap.walk.indexOf(tap.pipe.id));
      return {
        tap,
        pressurePa: point.pressurePa,
        by: 'marched',
        below: [{ pipe: tap.pipe.id, share: shareBelow }, ...rest.map((pipe) => ({ pipe, share: 1 }))],
        endPressurePa: trap.receiverPressurePa,
        credible: trap.credible && bandAt(liftBands(cut, result, trap.id, points), index),
      };
    }
  }
  return {
    tap,
    pressurePa: betweenEnds(file, tap, found),
    by: 'between',
    below: [{ pipe: tap.pipe.id, share: shareBelow }],
  };
}

/** A trap whose way leads through a pipe; one without a run of its own first, since the pressures of pipes are for the average. */
function trapThrough({ traps }: PredictedResult, pipeId: string): PredictedResult['traps'][number] | undefined {
  const through = traps.filter(({ walk }) => walk.includes(pipeId));
  return through.find(({ basis = 'average' }) => basis === 'average') ?? through[0];
}

function withCut(
  file: NetworkFile,
  { pipe, distanceM }: GaugeTap & { at: 'pipe' },
): { readonly cut: NetworkFile; readonly piecesBefore: number } {
  const { before, after } = cutAt(routeOf(pipe, riseOf(file, pipe)), distanceM);
  const cutPipe: PipeRun = { ...pipe, route: [...before, ...after] };
  return {
    cut: { ...file, pipes: file.pipes.map((other) => (other.id === pipe.id ? cutPipe : other)) },
    piecesBefore: before.length,
  };
}

/** A profile gives the end of each piece in the direction of flow; the tap stands where the pieces before it end. */
function indexOfTap(points: readonly ProfilePoint[], pipe: PipeRun, piecesBefore: number, withArrow: boolean): number {
  const ends = points.flatMap(({ pipeId }, i) => (i > 0 && pipeId === pipe.id ? [i] : []));
  return ends[withArrow ? piecesBefore - 1 : ends.length - piecesBefore - 1] ?? -1;
}

function liftBands(
  file: NetworkFile,
  result: PredictedResult,
  trapId: string,
  points: readonly ProfilePoint[],
): readonly ProfileBand[] {
  return points.length === 0 ? [] : (liftProfileBands(file, result, trapId) ?? []);
}

function bandAt(bands: readonly ProfileBand[], index: number): GaugePrediction['credible'] {
  const band = bands[index];
  return band && { lowPa: band.credibleLowPa, highPa: band.credibleHighPa };
}

function betweenEnds(file: NetworkFile, { pipe, distanceM }: GaugeTap & { at: 'pipe' }, found: PipeResult): number {
  const { before, after } = cutAt(routeOf(pipe, riseOf(file, pipe)), distanceM);
  const withArrow = found.massFlowKgS >= 0;
  const [above, below] = withArrow ? [before, after] : [after, before];
  const climb = (pieces: typeof before): number =>
    pieces.reduce((sum, { riseM }) => sum + Math.max(0, withArrow ? riseM : -riseM), 0);
  const length = (pieces: typeof before): number => pieces.reduce((sum, { lengthM }) => sum + lengthM, 0);
  const lengthShare = length(below) / pipe.lengthM;
  const climbs = climb(above) + climb(below);
  const climbShare = climbs === 0 ? lengthShare : climb(below) / climbs;
  const outletPa = found.outletPressurePa ?? found.downstreamPressurePa;
  const otherPa = found.upstreamPressurePa - outletPa - found.staticPa;
  return outletPa + climbShare * found.staticPa + lengthShare * otherPa;
}

function riseOf({ nodes }: NetworkFile, { from, to }: PipeRun): number {
  const elevationM = (id: string): number => nodes.find((node) => node.id === id)?.elevationM ?? 0;
  return elevationM(to) - elevationM(from);
}

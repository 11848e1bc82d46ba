import type { FlowPattern } from '@riseback/hydraulics';
import { FRICTION_METHODS, type Method } from '@riseback/network';
import { NoConvergenceError } from '@riseback/numerics';
import { SteamRangeError } from '@riseback/steam';
import type { PipeFlow } from './flow-and-energy';
import type { FrictionLawName } from './friction-laws';
import { piecesAgainstFlow, type PipeGeometry } from './pipe-geometry';
import { PipeMarcher, type MarchMethod } from './pipe-march';
import type { PieceEnd } from './pipe-result';

/** A way to compute a pipe that stands beside the chosen one. */
export interface Contender {
  /** As a person would call it. */
  readonly name: string;
  readonly method: MarchMethod;
  readonly marcher: PipeMarcher;
}

/** Everything that the bands of a network compare. */
export interface Contenders {
  /** Over whole walks: every friction method, each with the rule and with two-phase risers, less the chosen pair. */
  readonly spread: readonly Contender[];
  /** For a pipe by how its liquid runs. */
  readonly stratified: readonly Contender[];
  readonly fullBore: readonly Contender[];
  /** Of one phase, or still: all methods are one there. */
  readonly singlePhase: readonly Contender[];
}

const FULL_BORE = ['homogeneous', 'lockhartMartinelli', 'friedel', 'mullerSteinhagenHeck'] as const;
const STRATIFIED = ['flashVapour', 'byPattern', 'byPatternWavy'] as const;
const SPREAD_STATIC = ['rule', 'twoPhase'] as const;
const LAW_NAMES: Readonly<Record<FrictionLawName, string>> = {
  flashVapour: 'flash vapour',
  homogeneous: 'homogeneous',
  lockhartMartinelli: 'Lockhart-Martinelli',
  friedel: 'Friedel',
  mullerSteinhagenHeck: 'Müller-Steinhagen-Heck',
  byPattern: 'by pattern',
  byPatternWavy: 'by pattern with a wavy surface',
};

export function contendersOf(method: Method, tolerancePa: number): Contenders {
  const contender = (name: string, changes: Partial<MarchMethod>): Contender => {
    const changed = { ...method, ...changes };
    return { name, method: changed, marcher: new PipeMarcher({ method: changed, tolerancePa, undivided: true }) };
  };
  const spread = FRICTION_METHODS.flatMap((friction) =>
    SPREAD_STATIC.filter((staticLift) => !isChosen(method, friction, staticLift)).map((staticLift) =>
      contender(`${LAW_NAMES[friction]} with ${staticLift === 'rule' ? 'the rule' : 'two-phase risers'}`, {
        friction,
        staticLift,
        voidFraction: 'rouhaniAxelsson',
      }),
    ),
  );
  const byLaw = (friction: FrictionLawName): Contender => contender(LAW_NAMES[friction], { friction });
  const fullBore = FULL_BORE.map(byLaw);
  return { spread, stratified: STRATIFIED.map(byLaw), fullBore, singlePhase: fullBore.slice(0, 1) };
}

/** The methods that are credible in a pipe, by the flow patterns at the ends of its pieces. */
export function crediblyIn(
  { stratified, fullBore, singlePhase }: Contenders,
  ends: readonly PieceEnd[],
): readonly Contender[] {
  if (ends.every(({ quality }) => quality <= 0 || quality >= 1)) return singlePhase;
  return ends.every(({ pattern }) => pattern !== undefined && STRATIFIES[pattern]) ? stratified : fullBore;
}

/** @returns the pressure at the pipe's inlet; undefined where the method has no solution */
export function inletPressureBy(
  { marcher }: Contender,
  geometry: PipeGeometry,
  flow: PipeFlow,
  withArrow: boolean,
  outletPressurePa: number,
): number | undefined {
  const pieces = piecesAgainstFlow(geometry.pieces, withArrow);
  try {
    return marcher.march(geometry, flow, pieces, outletPressurePa).upstreamPressurePa;
  } catch (error) {
    if (error instanceof SteamRangeError || error instanceof NoConvergenceError) return undefined;
    throw error;
  }
}

/** Whether a contender of the spread would only repeat the chosen method. */
function isChosen(method: Method, friction: Method['friction'], staticLift: Method['staticLift']): boolean {
  const sameStatic =
    staticLift === method.staticLift && (staticLift === 'rule' || method.voidFraction === 'rouhaniAxelsson');
  return sameStatic && friction === method.friction;
}

const STRATIFIES: Readonly<Record<FlowPattern, boolean>> = {
  liquid: true,
  vapour: true,
  stratifiedSmooth: true,
  stratifiedWavy: true,
  intermittent: false,
  annular: false,
  dispersedBubble: false,
  bubbly: false,
  slug: false,
  churn: false,
};

import {
  darcyGradientOf,
  flashVapourLiquidGradient,
  flashVapourSteamGradient,
  GRAVITY_M_S2,
} from '@riseback/hydraulics';
import type { Method, RoutePiece } from '@riseback/network';
import { integrateAdaptive, NoConvergenceError } from '@riseback/numerics';
import { SATURATION_RANGE_PA, saturationState } from '@riseback/steam';
import { enthalpyAlong, type PipeFlow } from './flow-and-energy';
import { fluidState, type FluidState } from './fluid-state';
import type { PipeGeometry } from './pipe-geometry';

export interface MarchedPipe {
  readonly upstreamPressurePa: number;
  readonly staticPa: number;
  readonly frictionPa: number;
  readonly flashPa: number;
}

export interface MarchOptions {
  readonly method: Pick<Method, 'staticLift' | 'liftRulePaM' | 'dropCredit'>;
  /** Error allowed in each step of the march. */
  readonly tolerancePa: number;
  /** Called at the upstream end of each piece. */
  readonly onPieceEnd?: (piece: RoutePiece, pressurePa: number) => void;
}

/** Small against 5 Pa even where a walk takes dozens of steps; a step's true error is far below its estimate. */
export const MARCH_TOLERANCE_PA = 0.1;
const MAXIMUM_STEPS = 20_000;

const STATIC = 0;
const FRICTION = 1;
const FLASH = 2;

/**
 * Pressure at a pipe's inlet, marched against the flow from the pressure at its outlet.
 *     −dp/ds = static + friction + flash      (docs/methods/network-walk.md)
 * Each piece of the route is marched by itself, since the gradient jumps between them.
 * @param piecesAgainstFlow from the outlet up, rises counted in the direction of flow
 * @returns the inlet pressure and what each part adds; they add up to the difference but for rounding
 * @throws SteamRangeError where the pressure leaves the steam properties; NoConvergenceError where no step is short enough
 */
export function marchPipe(
  pipe: PipeGeometry,
  flow: PipeFlow,
  piecesAgainstFlow: readonly RoutePiece[],
  outletPressurePa: number,
  { method, tolerancePa, onPieceEnd }: MarchOptions,
): MarchedPipe {
  const friction = frictionOf(pipe, flow);
  const added = [0, 0, 0] as [number, number, number];
  let pressurePa = outletPressurePa;
  let distanceM = pipe.lengthM;
  for (const piece of piecesAgainstFlow) {
    if (piece.lengthM > 0) marchPiece(piece);
    onPieceEnd?.(piece, pressurePa);
  }
  return {
    upstreamPressurePa: pressurePa,
    staticPa: added[STATIC],
    frictionPa: added[FRICTION],
    flashPa: added[FLASH],
  };

  function marchPiece(piece: RoutePiece): void {
    const riseSlope = piece.riseM / piece.lengthM;
    const outletM = distanceM;
    const slope = (s: number, p: number, parts: Float64Array): number => {
      // a trial step may overshoot: not a number makes it shorter
      if (!(p >= SATURATION_RANGE_PA[0] && p <= SATURATION_RANGE_PA[1])) return NaN;
      const fluid = fluidState(p, enthalpyAlong(flow, outletM - s));
      const staticPaM = staticGradientPaM(fluid, riseSlope, method);
      friction(fluid, riseSlope, parts);
      parts[STATIC] = staticPaM;
      return staticPaM + (parts[FRICTION] as number) + (parts[FLASH] as number);
    };
    const { y, parts } = integrate(slope, piece.lengthM);
    pressurePa = y;
    added[STATIC] += parts[STATIC] as number;
    added[FRICTION] += parts[FRICTION] as number;
    added[FLASH] += parts[FLASH] as number;
    distanceM -= piece.lengthM;
  }

  function integrate(slope: (s: number, p: number, parts: Float64Array) => number, lengthM: number) {
    // names the value where the pressure is outside from the start
    if (!Number.isFinite(pressurePa)) saturationState(pressurePa);
    let reached = pressurePa;
    try {
      return integrateAdaptive(slope, { s: 0, y: pressurePa }, lengthM, {
        absoluteTolerance: tolerancePa,
        maximumSteps: MAXIMUM_STEPS,
        partCount: 3,
        where: 'the march along the pipe',
        onStep: (_, p) => {
          reached = p;
        },
      });
    } catch (error) {
      if (error instanceof NoConvergenceError) nameTheEndOfTheRange(reached);
      throw error;
    }
  }
}

/** A march that could go no further stood at an end of the steam properties: say that, with the value, rather than "no step". */
function nameTheEndOfTheRange(pressurePa: number): void {
  const [lowest, highest] = SATURATION_RANGE_PA;
  if (pressurePa < lowest * 1.001) saturationState(Math.min(pressurePa, lowest * (1 - Number.EPSILON)));
  if (pressurePa > highest * 0.999) saturationState(Math.max(pressurePa, highest * (1 + Number.EPSILON)));
}

/**
 * Static gradient in the direction of flow, by the network's basis: a still pipe's too.
 *     rise: basis × slope;   fall: −dropCredit × min(basis, ρ_l g) × slope
 */
function staticGradientPaM(fluid: FluidState, riseSlope: number, method: MarchOptions['method']): number {
  if (riseSlope === 0) return 0;
  const liquidPaM = fluid.liquidDensityKgM3 * GRAVITY_M_S2;
  const basisPaM = method.staticLift === 'rule' ? method.liftRulePaM : liquidPaM;
  return riseSlope > 0 ? basisPaM * riseSlope : method.dropCredit * Math.min(basisPaM, liquidPaM) * riseSlope;
}

type Friction = (fluid: FluidState, riseSlope: number, parts: Float64Array) => void;

/** Writes the friction and flash gradients by the flash-vapour method; pure liquid and superheated steam are Darcy-Weisbach. */
function frictionOf(pipe: PipeGeometry, { massFlowKgS }: PipeFlow): Friction {
  const { insideDiameterM, roughnessM, lossCoefficientPerM } = pipe;
  const alone = (densityKgM3: number, viscosityPaS: number): number =>
    darcyGradientOf(massFlowKgS, densityKgM3, viscosityPaS, insideDiameterM, roughnessM, lossCoefficientPerM);
  return (fluid, riseSlope, parts) => {
    if (fluid.quality <= 0) {
      parts[FRICTION] = alone(fluid.liquidDensityKgM3, fluid.liquidViscosityPaS);
      parts[FLASH] = 0;
    } else if (fluid.quality > 1) {
      parts[FRICTION] = 0;
      parts[FLASH] = alone(fluid.vapourDensityKgM3, fluid.vapourViscosityPaS);
    } else {
      const { quality, saturation } = fluid;
      const flashing = {
        massFlowKgS,
        quality,
        saturation,
        insideDiameterM,
        roughnessM,
        lossCoefficientPerM,
        fallSlope: -riseSlope,
      };
      parts[FRICTION] = flashVapourLiquidGradient(flashing);
      parts[FLASH] = flashVapourSteamGradient(flashing);
    }
  };
}

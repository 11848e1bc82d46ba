import {
  darcyGradientOf,
  flashVapourLiquidGradient,
  flashVapourSteamGradient,
  GRAVITY_M_S2,
  type FlashingFlow,
} from '@riseback/hydraulics';
import type { Method, RoutePiece } from '@riseback/network';
import {
  integrateAdaptive,
  integrationWorkspace,
  NoConvergenceError,
  type IntegrationOptions,
  type IntegrationResult,
} from '@riseback/numerics';
import { SATURATION_RANGE_PA, saturationState, type SaturationState } from '@riseback/steam';
import { enthalpyAlong, type PipeFlow } from './flow-and-energy';
import { fluidStateAt, thermodynamicQuality } from './fluid-state';
import type { PipeGeometry } from './pipe-geometry';

export interface MarchedPipe {
  readonly upstreamPressurePa: number;
  readonly staticPa: number;
  readonly frictionPa: number;
  readonly flashPa: number;
}

/** A gradient that the march evaluated, for measuring what a solve costs at least. */
export interface GradientEvaluation {
  readonly pipe: PipeGeometry;
  readonly massFlowKgS: number;
  readonly pressurePa: number;
  readonly enthalpyJKg: number;
  readonly riseSlope: number;
}

export interface MarchOptions {
  readonly method: Pick<Method, 'staticLift' | 'liftRulePaM' | 'dropCredit'>;
  /** Error allowed in each step of the march. */
  readonly tolerancePa: number;
  readonly onGradient?: ((evaluation: GradientEvaluation) => void) | undefined;
}

/** Small against 5 Pa even where a walk takes dozens of steps; a step's true error is far below its estimate. */
export const MARCH_TOLERANCE_PA = 0.1;
const MAXIMUM_STEPS = 20_000;
const [LOWEST_PA, HIGHEST_PA] = SATURATION_RANGE_PA;

const STATIC = 0;
const FRICTION = 1;
const FLASH = 2;
const PARTS = 3;

type Writable<T> = { -readonly [Key in keyof T]: T[Key] };

/**
 * Marches pipes against their flow, from the pressure at the outlet to the pressure at the inlet.
 *     −dp/ds = static + friction + flash      (docs/methods/network-walk.md)
 * One marcher serves a whole solve. It holds the piece of pipe that it is at, so that a step makes nothing new but the state of
 * the water: making closures and objects for each pipe once cost as much as all its physics.
 */
export class PipeMarcher {
  private readonly at: Place = {
    pipe: { lengthM: 0, insideDiameterM: 0, roughnessM: 0, lossCoefficientPerM: 0, heatLossWM: 0, pieces: [] },
    flow: { massFlowKgS: 0, inletEnthalpyJKg: 0, heatLossWM: 0, ambientEnthalpyJKg: 0 },
    riseSlope: 0,
    outletM: 0,
    reachedPa: 0,
  };
  /** Filled in anew for each gradient. */
  private readonly flashing: Writable<FlashingFlow>;
  private readonly integration: IntegrationOptions;

  constructor(private readonly options: MarchOptions) {
    this.integration = {
      absoluteTolerance: options.tolerancePa,
      maximumSteps: MAXIMUM_STEPS,
      partCount: PARTS,
      workspace: integrationWorkspace(PARTS),
      where: 'the march along the pipe',
      onStep: (_distanceM, pressurePa) => {
        this.at.reachedPa = pressurePa;
      },
    };
    const saturation = saturationState(LOWEST_PA);
    const { insideDiameterM, roughnessM, lossCoefficientPerM } = this.at.pipe;
    this.flashing = {
      massFlowKgS: 0,
      quality: 0,
      saturation,
      insideDiameterM,
      roughnessM,
      lossCoefficientPerM,
      fallSlope: 0,
    };
  }

  /**
   * @param piecesAgainstFlow from the outlet up, rises counted in the direction of flow
   * @param onPieceEnd told the pressure at the upstream end of each piece
   * @returns the inlet pressure and what each part adds; they add up to the difference but for rounding
   * @throws SteamRangeError where the pressure leaves the steam properties; NoConvergenceError where no step is short enough
   */
  march(
    pipe: PipeGeometry,
    flow: PipeFlow,
    piecesAgainstFlow: readonly RoutePiece[],
    outletPressurePa: number,
    onPieceEnd?: (piece: RoutePiece, pressurePa: number) => void,
  ): MarchedPipe {
    const { at, flashing } = this;
    at.pipe = pipe;
    at.flow = flow;
    at.outletM = pipe.lengthM;
    flashing.massFlowKgS = flow.massFlowKgS;
    flashing.insideDiameterM = pipe.insideDiameterM;
    flashing.roughnessM = pipe.roughnessM;
    flashing.lossCoefficientPerM = pipe.lossCoefficientPerM;
    let [upstreamPressurePa, staticPa, frictionPa, flashPa] = [outletPressurePa, 0, 0, 0];
    for (const piece of piecesAgainstFlow) {
      at.riseSlope = piece.riseM / piece.lengthM;
      flashing.fallSlope = -at.riseSlope;
      const { y, parts } = this.integrate(upstreamPressurePa, piece.lengthM);
      upstreamPressurePa = y;
      staticPa += parts[STATIC] as number;
      frictionPa += parts[FRICTION] as number;
      flashPa += parts[FLASH] as number;
      at.outletM -= piece.lengthM;
      onPieceEnd?.(piece, y);
    }
    return { upstreamPressurePa, staticPa, frictionPa, flashPa };
  }

  private integrate(outletPressurePa: number, lengthM: number): IntegrationResult {
    this.at.reachedPa = outletPressurePa;
    try {
      return integrateAdaptive(this.gradient, { s: 0, y: outletPressurePa }, lengthM, this.integration);
    } catch (error) {
      if (error instanceof NoConvergenceError) nameTheEndOfTheRange(this.at.reachedPa);
      throw error;
    }
  }

  /** Gradient at a distance from the outlet of the piece, with its parts; not a number outside the steam properties. */
  private readonly gradient = (distanceM: number, pressurePa: number, parts: Float64Array): number => {
    // a trial step may overshoot: what is not a number makes it shorter
    if (!(pressurePa >= LOWEST_PA && pressurePa <= HIGHEST_PA)) return NaN;
    const { flow, outletM } = this.at;
    const enthalpyJKg = enthalpyAlong(flow, outletM - distanceM);
    this.report(pressurePa, enthalpyJKg);
    const saturation = saturationState(pressurePa);
    const quality = thermodynamicQuality(saturation, enthalpyJKg);
    const inPhase = quality > 0 && quality <= 1;
    const liquidDensity = inPhase
      ? this.flashGradients(saturation, quality, parts)
      : this.singlePhaseGradients(saturation, enthalpyJKg, parts);
    const staticPaM = this.staticGradient(liquidDensity);
    parts[STATIC] = staticPaM;
    return staticPaM + (parts[FRICTION] as number) + (parts[FLASH] as number);
  };

  /** Writes what liquid and flash steam cost by the flash-vapour method. @returns the liquid's density */
  private flashGradients(saturation: SaturationState, quality: number, parts: Float64Array): number {
    const { flashing } = this;
    flashing.saturation = saturation;
    flashing.quality = quality;
    parts[FRICTION] = flashVapourLiquidGradient(flashing);
    parts[FLASH] = flashVapourSteamGradient(flashing);
    return saturation.liquidDensityKgM3;
  }

  /** Writes what subcooled liquid (as friction) or superheated steam (as flash) costs. @returns the liquid's density */
  private singlePhaseGradients(saturation: SaturationState, enthalpyJKg: number, parts: Float64Array): number {
    const fluid = fluidStateAt(saturation, enthalpyJKg);
    const isLiquid = fluid.quality <= 0;
    const density = isLiquid ? fluid.liquidDensityKgM3 : fluid.vapourDensityKgM3;
    const viscosity = isLiquid ? fluid.liquidViscosityPaS : fluid.vapourViscosityPaS;
    const { massFlowKgS, insideDiameterM, roughnessM, lossCoefficientPerM } = this.flashing;
    const alone = darcyGradientOf(massFlowKgS, density, viscosity, insideDiameterM, roughnessM, lossCoefficientPerM);
    parts[FRICTION] = isLiquid ? alone : 0;
    parts[FLASH] = isLiquid ? 0 : alone;
    return fluid.liquidDensityKgM3;
  }

  /**
   * Static gradient in the direction of flow by the network's basis, of a still pipe too.
   *     rise: basis × slope;   fall: −dropCredit × min(basis, ρ_l g) × slope
   */
  private staticGradient(liquidDensityKgM3: number): number {
    const { riseSlope } = this.at;
    if (riseSlope === 0) return 0;
    const { staticLift, liftRulePaM, dropCredit } = this.options.method;
    const liquidPaM = liquidDensityKgM3 * GRAVITY_M_S2;
    const basisPaM = staticLift === 'rule' ? liftRulePaM : liquidPaM;
    return riseSlope > 0 ? basisPaM * riseSlope : dropCredit * Math.min(basisPaM, liquidPaM) * riseSlope;
  }

  private report(pressurePa: number, enthalpyJKg: number): void {
    const { onGradient } = this.options;
    if (onGradient === undefined) return;
    const { pipe, flow, riseSlope } = this.at;
    onGradient({ pipe, massFlowKgS: flow.massFlowKgS, pressurePa, enthalpyJKg, riseSlope });
  }
}

/** The piece of pipe that a marcher is at. */
interface Place {
  pipe: PipeGeometry;
  flow: PipeFlow;
  /** Rise per metre in the direction of flow. */
  riseSlope: number;
  /** From the pipe's inlet to the outlet of the piece. */
  outletM: number;
  /** How far up the pressure has been found. */
  reachedPa: number;
}

/** A march that could go no further stood at an end of the steam properties: say that, with the value, rather than "no step". */
function nameTheEndOfTheRange(pressurePa: number): void {
  if (pressurePa < LOWEST_PA * 1.001) saturationState(Math.min(pressurePa, LOWEST_PA * (1 - Number.EPSILON)));
  if (pressurePa > HIGHEST_PA * 0.999) saturationState(Math.max(pressurePa, HIGHEST_PA * (1 + Number.EPSILON)));
}

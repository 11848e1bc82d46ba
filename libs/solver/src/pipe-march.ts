import {
  accelerationFactor,
  boreAreaM2,
  darcyGradientOf,
  twoPhaseDensityKgM3,
  type FlashingFlow,
  type VoidFraction,
} from '@riseback/hydraulics';
import type { Method, RoutePiece } from '@riseback/network';
import {
  integrateAdaptive,
  integrationWorkspace,
  NoConvergenceError,
  type IntegrationOptions,
  type IntegrationResult,
} from '@riseback/numerics';
import {
  blankSaturation,
  fillSaturation,
  SATURATION_RANGE_PA,
  saturationState,
  type SaturationState,
} from '@riseback/steam';
import { chokedOutletPa } from './choking';
import { enthalpyAlong, type PipeFlow } from './flow-and-energy';
import { fluidStateAt, thermodynamicQuality } from './fluid-state';
import {
  FLASH,
  FRICTION,
  FRICTION_LAWS,
  PARTS,
  STATIC,
  UNDIVIDED_FRICTION_LAWS,
  VOID_FRACTION_LAWS,
  type FrictionLaw,
  type FrictionLawName,
} from './friction-laws';
import { blankMarch, NO_UPPER_PIECES, type MarchRecord } from './marched-pipes';
import { NO_GEOMETRY, type PipeGeometry } from './pipe-geometry';
import { staticGradient } from './static-gradient';

export interface MarchedPipe {
  readonly upstreamPressurePa: number;
  /** What stands at the outlet: the node's pressure, or above it the critical pressure of a flow that chokes there. */
  readonly outletPressurePa: number;
  /** What stands at the downstream end of each piece but the lowest, from there up. */
  readonly upperOutletsPa: readonly number[];
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

/** What the march asks of a network's method. */
export interface MarchMethod extends Pick<
  Method,
  'staticLift' | 'liftRulePaM' | 'dropCredit' | 'voidFraction' | 'acceleration'
> {
  readonly friction: FrictionLawName;
}

export interface MarchOptions {
  readonly method: MarchMethod;
  /** Error allowed in each step of the march. */
  readonly tolerancePa: number;
  readonly onGradient?: ((evaluation: GradientEvaluation) => void) | undefined;
  /** Pressures alone are asked for: what the two phases cost together need not be told apart. False by default. */
  readonly undivided?: boolean;
}

/** Small against 5 Pa even where a walk takes dozens of steps; a step's true error is far below its estimate. */
export const MARCH_TOLERANCE_PA = 0.1;
const MAXIMUM_STEPS = 20_000;
/** Share of the critical pressure by which a march with acceleration keeps clear of it: there its gradient has no bound. */
const ABOVE_CHOKING = 1e-5;
/** Over so many bores the flow gets well clear of choking. */
const START_BORES = 10;
const [LOWEST_PA, HIGHEST_PA] = SATURATION_RANGE_PA;

type Writable<T> = { -readonly [Key in keyof T]: T[Key] };

/**
 * Marches pipes against their flow, from the pressure at the outlet to the pressure at the inlet.
 *     −dp/ds = static + friction + flash      (docs/methods/network-walk.md)
 * with what acceleration takes counted as flash, (static + friction + flash)/[1 + G² (dv/dp)_h] in all.
 * One marcher serves a whole solve. It holds the piece of pipe that it is at and the state of the water there, so that a step makes
 * nothing new: making closures and objects for each pipe once cost as much as all its physics.
 */
export class PipeMarcher {
  private readonly at: Place = {
    pipe: NO_GEOMETRY,
    flow: { massFlowKgS: 0, inletEnthalpyJKg: 0, heatLossWM: 0, ambientEnthalpyJKg: 0 },
    massFluxKgM2S: 0,
    riseSlope: 0,
    outletM: 0,
    reachedPa: 0,
  };
  private readonly law: FrictionLaw;
  private readonly voidFraction: VoidFraction;
  private readonly accelerates: boolean;
  /** Both filled in anew for each gradient; the flow stands at this saturation. */
  private readonly saturation = blankSaturation();
  private readonly flashing: Writable<FlashingFlow>;
  private readonly integration: IntegrationOptions;
  /** Where each integration begins: at the outlet of its stretch. */
  private readonly start = { s: 0, y: NaN };
  /** What each part of the pipe at hand has come to. */
  private readonly totals = new Float64Array(PARTS);
  private readonly marched: MarchRecord = blankMarch();

  constructor(private readonly options: MarchOptions) {
    const { friction, voidFraction, acceleration } = options.method;
    this.law = (options.undivided === true ? UNDIVIDED_FRICTION_LAWS : FRICTION_LAWS)[friction];
    this.voidFraction = VOID_FRACTION_LAWS[voidFraction];
    this.accelerates = acceleration && !this.law.vapourAlone;
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
    this.flashing = {
      massFlowKgS: NaN,
      quality: NaN,
      saturation: this.saturation,
      insideDiameterM: NaN,
      roughnessM: NaN,
      lossCoefficientPerM: NaN,
      fallSlope: NaN,
    };
  }

  /**
   * @param piecesAgainstFlow from the outlet up, rises counted in the direction of flow
   * @param nodePressurePa of the node that the pipe discharges into
   * @param onPieceEnd told the pressure at the upstream end of each piece
   * @returns the inlet pressure and what each part adds, which add up to the difference but for rounding; the next march overwrites it
   * @throws SteamRangeError where the pressure leaves the steam properties; NoConvergenceError where no step is short enough
   */
  march(
    pipe: PipeGeometry,
    flow: PipeFlow,
    piecesAgainstFlow: readonly RoutePiece[],
    nodePressurePa: number,
    onPieceEnd?: (piece: RoutePiece, pressurePa: number) => void,
  ): MarchedPipe {
    const { at, flashing, totals, marched } = this;
    this.enter(pipe, flow, piecesAgainstFlow[0]);
    const criticalPa = this.criticalPressurePa(nodePressurePa);
    const outletPressurePa = Math.max(nodePressurePa, criticalPa);
    let pressurePa = outletPressurePa;
    if (this.accelerates) pressurePa = Math.max(pressurePa, criticalPa * (1 + ABOVE_CHOKING));
    totals[STATIC] = 0;
    totals[FRICTION] = 0;
    totals[FLASH] = pressurePa - nodePressurePa;
    // just above choking the gradient runs up without bound: the first few bores are marched by themselves
    let startM = criticalPa > 0 ? START_BORES * pipe.insideDiameterM : 0;
    const upperOutletsPa: number[] | undefined = piecesAgainstFlow.length === 1 ? undefined : [];
    const uppermost = piecesAgainstFlow.at(-1);
    for (const piece of piecesAgainstFlow) {
      at.riseSlope = piece.riseM / piece.lengthM;
      flashing.fallSlope = -at.riseSlope;
      if (startM > 0 && startM < piece.lengthM) pressurePa = this.stretch(pressurePa, startM);
      else startM = 0;
      pressurePa = this.stretch(pressurePa, piece.lengthM - startM);
      startM = 0;
      if (piece !== uppermost) upperOutletsPa?.push(pressurePa);
      onPieceEnd?.(piece, pressurePa);
    }
    marched.upstreamPressurePa = pressurePa;
    marched.outletPressurePa = outletPressurePa;
    marched.upperOutletsPa = upperOutletsPa ?? NO_UPPER_PIECES;
    marched.staticPa = totals[STATIC] as number;
    marched.frictionPa = totals[FRICTION] as number;
    marched.flashPa = totals[FLASH] as number;
    return marched;
  }

  /** Marches up a stretch of one slope, and adds what it costs. @returns the pressure at its upstream end */
  private stretch(outletPressurePa: number, lengthM: number): number {
    const { totals } = this;
    const { y, parts } = this.integrate(outletPressurePa, lengthM);
    for (let part = 0; part < PARTS; part++) totals[part] = (totals[part] as number) + (parts[part] as number);
    this.at.outletM -= lengthM;
    return y;
  }

  private enter(pipe: PipeGeometry, flow: PipeFlow, lastPiece: RoutePiece | undefined): void {
    const { at, flashing } = this;
    at.pipe = pipe;
    at.flow = flow;
    at.massFluxKgM2S = flow.massFlowKgS / boreAreaM2(pipe.insideDiameterM);
    at.outletM = pipe.lengthM;
    flashing.massFlowKgS = flow.massFlowKgS;
    flashing.insideDiameterM = pipe.insideDiameterM;
    flashing.roughnessM = pipe.roughnessM;
    flashing.lossCoefficientPerM = pipe.lossCoefficientPerM;
    flashing.fallSlope = lastPiece === undefined ? 0 : -lastPiece.riseM / lastPiece.lengthM;
  }

  /** Critical pressure at the outlet, of a flow that chokes or nearly does; 0 of any other. */
  private criticalPressurePa(nodePressurePa: number): number {
    const { flow, massFluxKgM2S, outletM } = this.at;
    const { friction } = this.options.method;
    const nearlyPa = Math.max(LOWEST_PA, nodePressurePa * (1 - ABOVE_CHOKING));
    return chokedOutletPa(friction, this.flashing, massFluxKgM2S, enthalpyAlong(flow, outletM), nearlyPa) ?? 0;
  }

  private integrate(outletPressurePa: number, lengthM: number): IntegrationResult {
    this.at.reachedPa = outletPressurePa;
    try {
      this.start.y = outletPressurePa;
      return integrateAdaptive(this.gradient, this.start, lengthM, this.integration);
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
    const { saturation, flashing } = this;
    fillSaturation(saturation, pressurePa);
    const quality = thermodynamicQuality(saturation, enthalpyJKg);
    if (!(quality > 0 && quality <= 1)) return this.singlePhaseGradient(saturation, enthalpyJKg, parts);
    flashing.quality = quality;
    const fullBoreShare = this.law.write(flashing, parts);
    parts[STATIC] = this.twoPhaseStaticGradient(fullBoreShare);
    return this.accelerates ? this.accelerated(saturation, enthalpyJKg, fullBoreShare, parts) : sumOf(parts);
  };

  /** Subcooled liquid counts as friction, superheated steam as flash. */
  private singlePhaseGradient(saturation: SaturationState, enthalpyJKg: number, parts: Float64Array): number {
    const fluid = fluidStateAt(saturation, enthalpyJKg);
    const isLiquid = fluid.quality <= 0;
    const density = isLiquid ? fluid.liquidDensityKgM3 : fluid.vapourDensityKgM3;
    const viscosity = isLiquid ? fluid.liquidViscosityPaS : fluid.vapourViscosityPaS;
    const alone = darcyGradientOf(this.flashing.massFlowKgS, density, viscosity, this.flashing);
    parts[FRICTION] = isLiquid ? alone : 0;
    parts[FLASH] = isLiquid ? 0 : alone;
    parts[STATIC] = staticGradient(this.options.method, this.at.riseSlope, fluid.liquidDensityKgM3, density, 1);
    return isLiquid ? sumOf(parts) : this.accelerated(saturation, enthalpyJKg, 1, parts);
  }

  /** Counts what it takes to speed the flow up as flash. @returns the whole gradient; not a number from choking on */
  private accelerated(
    saturation: SaturationState,
    enthalpyJKg: number,
    fullBoreShare: number,
    parts: Float64Array,
  ): number {
    const steadyPaM = sumOf(parts);
    if (!this.accelerates || fullBoreShare === 0) return steadyPaM;
    const ofFullBore = accelerationFactor(this.at.massFluxKgM2S, saturation, enthalpyJKg) - 1;
    const factor = 1 + fullBoreShare * ofFullBore;
    if (!(factor > 0)) return NaN;
    parts[FLASH] = (parts[FLASH] as number) - (fullBoreShare * ofFullBore * steadyPaM) / factor;
    return sumOf(parts);
  }

  private twoPhaseStaticGradient(fullBoreShare: number): number {
    const { flashing, at } = this;
    const { staticLift, dropCredit } = this.options.method;
    if (at.riseSlope === 0 || (at.riseSlope < 0 && dropCredit === 0)) return 0;
    const liquidDensity = flashing.saturation.liquidDensityKgM3;
    const density =
      staticLift === 'twoPhase' ? twoPhaseDensityKgM3(flashing, this.voidFraction(flashing)) : liquidDensity;
    return staticGradient(this.options.method, at.riseSlope, liquidDensity, density, fullBoreShare);
  }

  private report(pressurePa: number, enthalpyJKg: number): void {
    const { onGradient } = this.options;
    if (onGradient === undefined) return;
    const { pipe, flow, riseSlope } = this.at;
    onGradient({ pipe, massFlowKgS: flow.massFlowKgS, pressurePa, enthalpyJKg, riseSlope });
  }
}

function sumOf(parts: Float64Array): number {
  return (parts[STATIC] as number) + (parts[FRICTION] as number) + (parts[FLASH] as number);
}

/** The piece of pipe that a marcher is at. */
interface Place {
  pipe: PipeGeometry;
  flow: PipeFlow;
  massFluxKgM2S: number;
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

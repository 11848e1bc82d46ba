import { NonPhysicalInputError } from '@riseback/numerics';
import type { SaturationState } from '@riseback/steam';
import { darcyGradientOf, GRAVITY_M_S2 } from './darcy-gradient';

/** Below this flash quality the line is taken to pass gradually from running full to draining under its flash. */
export const DRAINING_QUALITY = 0.005;
/** The least pitch a return is built to: 1/2 in per 10 ft (ASHRAE Handbook, Fundamentals, pipe sizing). */
export const LEAST_PITCH = 1 / 240;

/** A point of a pipe that carries saturated liquid and its flash vapour. */
export interface FlashingFlow {
  /** Liquid and vapour together. */
  readonly massFlowKgS: number;
  /** Flash quality x; at or below 0 the flow is all liquid. */
  readonly quality: number;
  readonly saturation: SaturationState;
  readonly insideDiameterM: number;
  readonly roughnessM: number;
  /** K of all fittings over the length of the pipe, K/L. */
  readonly lossCoefficientPerM: number;
  /** Fall per metre of pipe in the direction of flow; negative in a rise, 0 for a level run. */
  readonly fallSlope: number;
}

export interface FlashingGradient {
  /** What the liquid costs, Pa/m. */
  readonly frictionPaM: number;
  /** What the flash vapour adds, Pa/m. */
  readonly flashPaM: number;
}

/**
 * Friction gradient of a dry, pitched condensate return: the flash vapour has the bore to itself and the pitch drives
 * the liquid as far as it can.
 *     flash    = (f_g/D + K/L) (x G)²/(2 ρ_g)                    f_g at the vapour's own Re
 *     friction = w L(m) + (1 − w) max(0, L((1 − x) m) − ρ_l g i)   L(m): Darcy-Weisbach gradient of m as liquid
 *     w = (1 − x/0.005)² below x = 0.005, else 0
 *     i = max(1/240, fall) in level and falling runs, 0 in rises
 * @returns both parts [Pa/m], each ≥ 0; exactly 0 for a still pipe
 * @throws NonPhysicalInputError for x > 1 (superheated steam is single-phase: use `darcyGradient`), and as that function does
 * @remarks The vapour's part reproduces the handbook's table within 3.5 % in flow, 1.1 % rms (tests/validation). The
 *   blend w is this program's own: it keeps a line that has only just begun to flash as costly as the full line it nearly is.
 * Source: basis of the "dry-closed returns" table, ASHRAE Handbook, Fundamentals, pipe sizing; see docs/methods/flash-vapour.md.
 */
export function flashVapourGradient(flow: FlashingFlow): FlashingGradient {
  return {
    frictionPaM: flashVapourLiquidGradient(flow),
    flashPaM: flashVapourSteamGradient(flow),
  };
}

/** The vapour's part of {@link flashVapourGradient}, Pa/m: x m alone in the bore. */
export function flashVapourSteamGradient(flow: FlashingFlow): number {
  const { quality, saturation } = flow;
  if (!(quality <= 1)) throw new NonPhysicalInputError('flashVapourSteamGradient', { quality });
  if (quality <= 0) return 0;
  return darcyGradientOf(quality * flow.massFlowKgS, saturation.vapourDensityKgM3, saturation.vapourViscosityPaS, flow);
}

/** The liquid's part of {@link flashVapourGradient}, Pa/m. */
export function flashVapourLiquidGradient(flow: FlashingFlow): number {
  const { quality, fallSlope, massFlowKgS, saturation } = flow;
  if (!(quality <= 1 && Number.isFinite(fallSlope))) {
    throw new NonPhysicalInputError('flashVapourLiquidGradient', { quality, fallSlope });
  }
  const fullShare = fullLineShare(quality);
  const fullGradient = fullShare > 0 ? liquidGradient(flow, massFlowKgS) : 0;
  if (fullShare === 1) return fullGradient;
  const drivingPitch = fallSlope < 0 ? 0 : Math.max(LEAST_PITCH, fallSlope);
  const drivenByPitch = saturation.liquidDensityKgM3 * GRAVITY_M_S2 * drivingPitch;
  const leftOver = liquidGradient(flow, (1 - quality) * massFlowKgS) - drivenByPitch;
  return fullShare * fullGradient + (1 - fullShare) * Math.max(0, leftOver);
}

/**
 * The weight w with which a line still counts as running full: 1 for liquid, falling to 0 at {@link DRAINING_QUALITY}
 * with a slope that ends at 0, so that neither end shows a step.
 */
export function fullLineShare(quality: number): number {
  if (quality <= 0) return 1;
  if (quality >= DRAINING_QUALITY) return 0;
  const rest = 1 - quality / DRAINING_QUALITY;
  return rest * rest;
}

function liquidGradient(flow: FlashingFlow, massFlowKgS: number): number {
  const { liquidDensityKgM3, liquidViscosityPaS } = flow.saturation;
  return darcyGradientOf(massFlowKgS, liquidDensityKgM3, liquidViscosityPaS, flow);
}

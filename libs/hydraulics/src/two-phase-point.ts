import { NonPhysicalInputError } from '@riseback/numerics';
import { boreAreaM2, darcyGradientOf } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';

/**
 * Refuses what no two-phase method can answer. Superheated steam (x > 1) is a single phase and belongs to `darcyGradient`.
 * @returns the vapour's share of the mass: x, and 0 for liquid at or below saturation
 * @throws NonPhysicalInputError for x > 1 or NaN, naming the method that was asked
 */
export function vapourShare(where: string, quality: number): number {
  if (!(quality <= 1)) throw new NonPhysicalInputError(where, { quality });
  return quality > 0 ? quality : 0;
}

/** Mass flux of both phases together, G = m/A [kg/(m² s)]. */
export function massFluxOf(flow: FlashingFlow): number {
  return flow.massFlowKgS / boreAreaM2(flow.insideDiameterM);
}

/**
 * Gradient of the whole flow as saturated liquid, fittings included [Pa/m]: what a line would cost without its flash.
 * The full-bore methods report the lesser of this and their own gradient as friction, the rest as flash.
 */
export function liquidOnlyGradient(flow: FlashingFlow): number {
  return liquidPipeGradient(flow, flow.massFlowKgS, flow.lossCoefficientPerM);
}

/** Gradient of the whole flow as saturated vapour, fittings included [Pa/m]. */
export function vapourOnlyGradient(flow: FlashingFlow): number {
  return vapourPipeGradient(flow, flow.massFlowKgS, flow.lossCoefficientPerM);
}

/** Darcy-Weisbach gradient of a mass flow of saturated liquid that has the bore to itself [Pa/m]. */
export function liquidPipeGradient(flow: FlashingFlow, massFlowKgS: number, lossCoefficientPerM = 0): number {
  const { liquidDensityKgM3, liquidViscosityPaS } = flow.saturation;
  return darcyGradientOf(massFlowKgS, liquidDensityKgM3, liquidViscosityPaS, flow, lossCoefficientPerM);
}

/** The same for saturated vapour. */
export function vapourPipeGradient(flow: FlashingFlow, massFlowKgS: number, lossCoefficientPerM = 0): number {
  const { vapourDensityKgM3, vapourViscosityPaS } = flow.saturation;
  return darcyGradientOf(massFlowKgS, vapourDensityKgM3, vapourViscosityPaS, flow, lossCoefficientPerM);
}

/**
 * Gradient of fittings in two-phase flow: their loss coefficient on the velocity head of the mixture without slip, G²/(2 ρ_h).
 *     K/L · G²/(2 ρ_l) · [1 + x (ρ_l/ρ_g − 1)]
 * @returns gradient [Pa/m]; the liquid's at x = 0, the vapour's at x = 1
 * @throws NonPhysicalInputError for x > 1 or NaN
 */
export function fittingsGradient(flow: FlashingFlow): number {
  const x = vapourShare('fittingsGradient', flow.quality);
  const { liquidDensityKgM3, vapourDensityKgM3 } = flow.saturation;
  const massFlux = massFluxOf(flow);
  const multiplier = 1 + x * (liquidDensityKgM3 / vapourDensityKgM3 - 1);
  return ((flow.lossCoefficientPerM * massFlux * massFlux) / (2 * liquidDensityKgM3)) * multiplier;
}

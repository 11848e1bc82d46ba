import { NonPhysicalInputError } from '@riseback/numerics';
import { darcyFrictionFactor } from './friction-factor';

/** Standard gravity, m/s² (CGPM 1901, exact by definition). */
export const GRAVITY_M_S2 = 9.80665;

/** What a pipe's friction depends on beside its flow. */
export interface Bore {
  readonly insideDiameterM: number;
  readonly roughnessM: number;
  /** K of all fittings over the length of the pipe, K/L: fittings are spread evenly. */
  readonly lossCoefficientPerM: number;
}

/** One phase that fills the bore: liquid, or steam. */
export interface SinglePhaseFlow extends Bore {
  readonly massFlowKgS: number;
  readonly densityKgM3: number;
  /** Dynamic viscosity. */
  readonly viscosityPaS: number;
}

/**
 * Friction pressure gradient of single-phase flow with its fittings (Darcy-Weisbach).
 *     −dp/ds = (f/D + K/L) ρv²/2,   v = 4m/(πD²ρ),   f at Re = 4m/(πDμ) and ε/D
 * @returns gradient [Pa/m], ≥ 0 in the direction of flow; exactly 0 for a still pipe
 * @throws NonPhysicalInputError for a negative flow (turn the pipe round instead), a density, viscosity or bore that
 *   is not positive, a negative K or roughness, or NaN in any of them
 * Source: Weisbach 1845, Darcy 1857; see docs/methods/liquid-friction.md.
 */
export function darcyGradient(flow: SinglePhaseFlow): number {
  return darcyGradientOf(flow.massFlowKgS, flow.densityKgM3, flow.viscosityPaS, flow);
}

/** The same for a phase in a given bore, with its fittings or others, for inner loops that should not build an object at every step. */
export function darcyGradientOf(
  massFlowKgS: number,
  densityKgM3: number,
  viscosityPaS: number,
  bore: Bore,
  lossCoefficientPerM: number = bore.lossCoefficientPerM,
): number {
  const { insideDiameterM, roughnessM } = bore;
  if (!(
    massFlowKgS >= 0 &&
    densityKgM3 > 0 &&
    viscosityPaS > 0 &&
    insideDiameterM > 0 &&
    roughnessM >= 0 &&
    lossCoefficientPerM >= 0
  )) {
    throw refusal(massFlowKgS, densityKgM3, viscosityPaS, { insideDiameterM, roughnessM, lossCoefficientPerM });
  }
  const massFlux = massFlowKgS / boreAreaM2(insideDiameterM);
  // a still pipe, and a flow so small that its square vanishes while 64/Re overflows
  if (massFlux * massFlux === 0) return 0;
  const Re = (massFlux * insideDiameterM) / viscosityPaS;
  const f = darcyFrictionFactor(Re, roughnessM / insideDiameterM);
  return ((f / insideDiameterM + lossCoefficientPerM) * massFlux * massFlux) / (2 * densityKgM3);
}

/** Apart from the gradient, which stays short enough that a compiler takes it into the loops that call it. */
function refusal(
  massFlowKgS: number,
  densityKgM3: number,
  viscosityPaS: number,
  { insideDiameterM, roughnessM, lossCoefficientPerM }: Bore,
): NonPhysicalInputError {
  const bore = { insideDiameterM, roughnessM, lossCoefficientPerM };
  return new NonPhysicalInputError('darcyGradient', { massFlowKgS, densityKgM3, viscosityPaS, ...bore });
}

/** Cross-section of a round bore, m². */
export function boreAreaM2(insideDiameterM: number): number {
  return (Math.PI / 4) * insideDiameterM * insideDiameterM;
}

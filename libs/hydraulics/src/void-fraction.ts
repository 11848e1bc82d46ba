import { NonPhysicalInputError } from '@riseback/numerics';
import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { massFluxOf, vapourShare } from './two-phase-point';

/** Share of the bore that the vapour fills, α [–], by one method; 0 for liquid, 1 for dry vapour. */
export type VoidFraction = (flow: FlashingFlow) => number;

/**
 * Void fraction without slip: α = 1/(1 + (1 − x)/x · ρ_g/ρ_l).
 * @remarks Unsafe in rises: liquid lags behind its vapour there, and the column is many times heavier than this says.
 * @throws NonPhysicalInputError for x > 1 or NaN, as the others here do
 * Source: mass balance at equal velocities.
 */
export function voidFractionHomogeneous(flow: FlashingFlow): number {
  return voidFractionOfSlip(vapourShare('voidFractionHomogeneous', flow.quality), 1, flow);
}

/**
 * Void fraction with Zivi's slip S = (ρ_l/ρ_g)^(1/3), the least kinetic energy of annular flow without entrainment.
 * Source: Zivi, J. Heat Transfer 86 (1964) 247-252.
 */
export function voidFractionZivi(flow: FlashingFlow): number {
  const { liquidDensityKgM3, vapourDensityKgM3 } = flow.saturation;
  const slip = Math.cbrt(liquidDensityKgM3 / vapourDensityKgM3);
  return voidFractionOfSlip(vapourShare('voidFractionZivi', flow.quality), slip, flow);
}

/**
 * Void fraction with Chisholm's slip S = √(1 − x (1 − ρ_l/ρ_g)), the root of the density ratio of liquid and mixture.
 * Source: Chisholm, J. Mech. Eng. Sci. 15 (1973) 232-235.
 */
export function voidFractionChisholm(flow: FlashingFlow): number {
  const x = vapourShare('voidFractionChisholm', flow.quality);
  const { liquidDensityKgM3, vapourDensityKgM3 } = flow.saturation;
  return voidFractionOfSlip(x, Math.sqrt(1 - x * (1 - liquidDensityKgM3 / vapourDensityKgM3)), flow);
}

/**
 * Void fraction by drift flux, Rouhani and Axelsson's form for vertical flow.
 *     α = (x/ρ_g) / { C0 [x/ρ_g + (1 − x)/ρ_l] + u/G }
 *     C0 = 1 + 0.2 (1 − x),   u = 1.18 (1 − x) (g σ (ρ_l − ρ_g)/ρ_l²)^(1/4)
 * A still pipe holds liquid: α = 0 there, which is the limit G → 0.
 * Source: Rouhani & Axelsson, Int. J. Heat Mass Transfer 13 (1970) 383-393; C0 for α above 0.25.
 */
export function voidFractionRouhaniAxelsson(flow: FlashingFlow): number {
  const x = vapourShare('voidFractionRouhaniAxelsson', flow.quality);
  const massFlux = massFluxOf(flow);
  if (!(massFlux >= 0)) throw new NonPhysicalInputError('voidFractionRouhaniAxelsson', { massFlux });
  if (x === 0 || massFlux === 0) return 0;
  const { liquidDensityKgM3, vapourDensityKgM3, surfaceTensionNM } = flow.saturation;
  const buoyancy = GRAVITY_M_S2 * surfaceTensionNM * (liquidDensityKgM3 - vapourDensityKgM3);
  const driftMS = 1.18 * (1 - x) * Math.sqrt(Math.sqrt(buoyancy / (liquidDensityKgM3 * liquidDensityKgM3)));
  const vapourVolume = x / vapourDensityKgM3;
  const C0 = 1 + 0.2 * (1 - x);
  return vapourVolume / (C0 * (vapourVolume + (1 - x) / liquidDensityKgM3) + driftMS / massFlux);
}

/** Density of what stands in the bore, α ρ_g + (1 − α) ρ_l [kg/m³]: what a rise has to carry. */
export function twoPhaseDensityKgM3(flow: FlashingFlow, voidFraction: number): number {
  if (!(voidFraction >= 0 && voidFraction <= 1))
    throw new NonPhysicalInputError('twoPhaseDensityKgM3', { voidFraction });
  const { liquidDensityKgM3, vapourDensityKgM3 } = flow.saturation;
  return voidFraction * vapourDensityKgM3 + (1 - voidFraction) * liquidDensityKgM3;
}

/** α of vapour that moves S times as fast as its liquid, multiplied out so that x = 0 does not divide. */
function voidFractionOfSlip(x: number, slip: number, { saturation }: FlashingFlow): number {
  const { liquidDensityKgM3, vapourDensityKgM3 } = saturation;
  return (x * liquidDensityKgM3) / (x * liquidDensityKgM3 + slip * (1 - x) * vapourDensityKgM3);
}

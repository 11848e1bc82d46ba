import { darcyGradientOf } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { liquidOnlyGradient, vapourShare } from './two-phase-point';

/**
 * Friction gradient of liquid and vapour mixed evenly and moving at one velocity, with the viscosity of McAdams.
 *     (f/D + K/L) G²/(2 ρ_h),   1/ρ_h = x/ρ_g + (1 − x)/ρ_l,   1/μ = x/μ_g + (1 − x)/μ_l,   f at Re = G D/μ
 * @returns gradient [Pa/m], fittings included; the liquid's for x ≤ 0, the vapour's at x = 1; 0 for a still pipe
 * @throws NonPhysicalInputError for x > 1, and as `darcyGradient` does
 * Source: McAdams, Woods & Heroman, Trans. ASME 64 (1942) 193-200; see docs/methods/homogeneous.md.
 */
export function homogeneousGradient(flow: FlashingFlow): number {
  const x = vapourShare('homogeneousGradient', flow.quality);
  if (x === 0) return liquidOnlyGradient(flow);
  const { liquidDensityKgM3, vapourDensityKgM3, liquidViscosityPaS, vapourViscosityPaS } = flow.saturation;
  return darcyGradientOf(
    flow.massFlowKgS,
    1 / (x / vapourDensityKgM3 + (1 - x) / liquidDensityKgM3),
    1 / (x / vapourViscosityPaS + (1 - x) / liquidViscosityPaS),
    flow,
  );
}

import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { fittingsGradient, liquidPipeGradient, massFluxOf, vapourPipeGradient, vapourShare } from './two-phase-point';

/**
 * Friction gradient by Friedel, as liquid-only gradient times his multiplier.
 *     φ_lo² = E + 3.24 F H/(Fr^0.0454 We^0.035)
 *     E = (1 − x)² + x² (ρ_l f_go)/(ρ_g f_lo)        F = x^0.78 (1 − x)^0.224
 *     H = (ρ_l/ρ_g)^0.91 (μ_g/μ_l)^0.19 (1 − μ_g/μ_l)^0.7
 *     Fr = G²/(g D ρ_h²),   We = G² D/(σ ρ_h),   1/ρ_h = x/ρ_g + (1 − x)/ρ_l
 * @returns gradient [Pa/m], fittings included; the liquid's for x ≤ 0, the vapour's at x = 1; 0 for a still pipe
 * @throws NonPhysicalInputError for x > 1, and as `darcyGradient` does
 * @remarks Text-books round the exponents of 1 − x and Fr to 0.24 and 0.045; those here are the original's.
 * Source: Friedel, European Two-Phase Flow Group Meeting, Ispra (1979), paper E2; see docs/methods/friedel.md.
 */
export function friedelGradient(flow: FlashingFlow): number {
  const x = vapourShare('friedelGradient', flow.quality);
  const { liquidDensityKgM3, vapourDensityKgM3, liquidViscosityPaS, vapourViscosityPaS, surfaceTensionNM } =
    flow.saturation;
  const { insideDiameterM, massFlowKgS } = flow;
  const liquidOnly = liquidPipeGradient(flow, massFlowKgS);
  // a still pipe, whose Froude number of 0 would not divide
  if (liquidOnly === 0) return 0;
  if (x === 0) return liquidPipeGradient(flow, massFlowKgS, flow.lossCoefficientPerM);
  const vapourOnly = vapourPipeGradient(flow, massFlowKgS);
  const massFluxSquared = massFluxOf(flow) ** 2;
  const mixtureDensityKgM3 = 1 / (x / vapourDensityKgM3 + (1 - x) / liquidDensityKgM3);
  const Fr = massFluxSquared / (GRAVITY_M_S2 * insideDiameterM * mixtureDensityKgM3 ** 2);
  const We = (massFluxSquared * insideDiameterM) / (surfaceTensionNM * mixtureDensityKgM3);
  const viscosityRatio = vapourViscosityPaS / liquidViscosityPaS;
  const F = x ** 0.78 * (1 - x) ** 0.224;
  const H = (liquidDensityKgM3 / vapourDensityKgM3) ** 0.91 * viscosityRatio ** 0.19 * (1 - viscosityRatio) ** 0.7;
  // E times the liquid-only gradient, written so that it is the vapour's gradient itself at x = 1
  const separate = (1 - x) ** 2 * liquidOnly + x ** 2 * vapourOnly;
  const interaction = (3.24 * F * H) / (Fr ** 0.0454 * We ** 0.035);
  return separate + interaction * liquidOnly + fittingsGradient(flow);
}

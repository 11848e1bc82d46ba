import type { FlashingFlow } from './flash-vapour';
import { mullerSteinhagenHeckGradient } from './mueller-steinhagen-heck';
import { STRATIFIED_SLOPE_LIMIT, stratifiedFlow } from './stratified-flow';
import type { LiquidSurface } from './stratified-forces';
import { vapourOnlyGradient, vapourShare } from './two-phase-point';

export interface PatternedGradient {
  /** Fittings included [Pa/m]. */
  readonly gradientPaM: number;
  /** w: 0 where the flow is stratified, 1 where it takes the whole bore, between on the way from one to the other. */
  readonly fullBoreShare: number;
}

/** Flash quality below which a stratified line is taken back to the full line that it is at x = 0. */
const NEAR_FULL_QUALITY = 0.005;
const LN_4 = Math.log(4);

/**
 * Friction gradient by flow pattern: stratified in level and falling runs while the flow stays so, Müller-Steinhagen and Heck's
 * elsewhere, blended so that it is continuous in the flow.
 *     ln g = (1 − w) ln g_s + w ln g_MSH,   w = S(ln(2 r_A)/ln 4),   S(t) = 3t² − 2t³ on 0..1
 *     w → 1 − (1 − w) S(x/0.005) as a full line is approached
 * so that the change takes place over r_A from 0.5 to 2.
 * @param surface smooth for the method itself; wavy for its second figure, the upper one of the credible band
 * @returns the full-bore gradient with w = 1 in rises, in falls steeper than 10°, for x ≤ 0 and in a pipe filled to the crown
 * @throws NonPhysicalInputError for x > 1, and as `darcyGradient` does
 * Source: Taitel & Dukler, AIChE J. 22 (1976) 47-55; the blend is this program's; see docs/methods/by-pattern.md.
 */
export function byPatternGradient(flow: FlashingFlow, surface: LiquidSurface = 'smooth'): PatternedGradient {
  const x = vapourShare('byPatternGradient', flow.quality);
  const fullBorePaM = mullerSteinhagenHeckGradient(flow);
  const nearFull = smoothStep(x / NEAR_FULL_QUALITY);
  if (
    nearFull < Number.EPSILON ||
    fullBorePaM === 0 ||
    !(flow.fallSlope >= 0 && flow.fallSlope <= STRATIFIED_SLOPE_LIMIT)
  ) {
    return { gradientPaM: fullBorePaM, fullBoreShare: 1 };
  }
  if (x === 1) return { gradientPaM: vapourOnlyGradient(flow), fullBoreShare: 0 };
  const stratified = stratifiedFlow(flow, surface);
  if (stratified === undefined) return { gradientPaM: fullBorePaM, fullBoreShare: 1 };
  const stays = 1 - smoothStep(Math.log(2 * stratified.leaveRatio) / LN_4);
  const stratifiedShare = stays * nearFull;
  return {
    gradientPaM: fullBorePaM * (stratified.gradientPaM / fullBorePaM) ** stratifiedShare,
    fullBoreShare: 1 - stratifiedShare,
  };
}

/** 3t² − 2t³ from 0 to 1, level outside. */
function smoothStep(t: number): number {
  if (t <= 0) return 0;
  return t >= 1 ? 1 : t * t * (3 - 2 * t);
}

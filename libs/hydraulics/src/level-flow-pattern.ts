import { certainLevelPattern } from './certain-level-pattern';
import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { darcyFrictionFactor, LAMINAR_LIMIT_RE } from './friction-factor';
import { fullSection } from './level-section';
import { stratifiedFlow } from './stratified-flow';
import { stratifiedForces } from './stratified-forces';
import { liquidPipeGradient, massFluxOf } from './two-phase-point';
import { waveGrowth, waveNumber, WAVES_FROM } from './wave-criterion';

/** What a level or nearly level pipe can show, in Taitel and Dukler's words. */
export type LevelFlowPattern = 'stratifiedSmooth' | 'stratifiedWavy' | 'intermittent' | 'annular' | 'dispersedBubble';

/**
 * Flow pattern of liquid and vapour in a level or nearly level pipe, from the level that the stratified balance gives.
 *     leaves stratified     r_A ≥ 1 (see `stratifiedFlow`); then
 *       annular             h < 0.5
 *       dispersed bubble    T² ≥ 8 (A_g/D²)/[r ũ² (ũ D_l/D)^−n],   T² = g_ls/((ρ_l − ρ_g) g cos β)
 *       intermittent        else
 *     wavy                  K ≥ 2/(√ũ (u_g/j_g) √0.01),   K² = Re_ls ρ_g j_g²/((ρ_l − ρ_g) g D cos β)
 * ũ = u_l/j_l; g_ls and Re_ls of the liquid alone in the bore; n = 0.2, or 1 where that is laminar.
 * @throws NonPhysicalInputError as `stratifiedFlow` does: outside 0 < x < 1, for slopes beyond 10°, for a still pipe
 * Source: Taitel & Dukler, AIChE J. 22 (1976) 47-55; see docs/methods/flow-patterns.md.
 */
export function levelFlowPattern(flow: FlashingFlow): LevelFlowPattern {
  return certainLevelPattern(flow) ?? patternAtLevel(flow);
}

/** The same by solving for the level, which `certainLevelPattern` spares where it can. */
export function patternAtLevel(flow: FlashingFlow): LevelFlowPattern {
  const stratified = stratifiedFlow(flow);
  const section = stratified?.section ?? fullSection();
  const leaves = stratified === undefined || stratified.leaveRatio >= 1;
  if (leaves && section.levelFraction < 0.5) return 'annular';

  const { quality, massFlowKgS, insideDiameterM: D, saturation, fallSlope } = flow;
  const { liquidDensityKgM3, vapourDensityKgM3, liquidViscosityPaS } = saturation;
  const { liquidSpeedUp, liquidHydraulicDiameter, surfaceWidth, vapourArea } = section;
  if (leaves) {
    const liquidRe = (massFluxOf(flow) * (1 - quality) * D) / liquidViscosityPaS;
    const n = liquidRe <= LAMINAR_LIMIT_RE ? 1 : 0.2;
    const weightPaM = (liquidDensityKgM3 - vapourDensityKgM3) * GRAVITY_M_S2 * Math.sqrt(1 - fallSlope * fallSlope);
    const turbulence = liquidPipeGradient(flow, (1 - quality) * massFlowKgS) / weightPaM;
    const friction = (liquidSpeedUp * liquidHydraulicDiameter) ** -n;
    const disperses = (8 * vapourArea) / (surfaceWidth * liquidSpeedUp * liquidSpeedUp * friction);
    return turbulence >= disperses ? 'dispersedBubble' : 'intermittent';
  }
  const K = waveNumber(stratifiedForces(flow, 'smooth', darcyFrictionFactor));
  return K * waveGrowth(section) >= WAVES_FROM ? 'stratifiedWavy' : 'stratifiedSmooth';
}

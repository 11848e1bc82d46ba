import type { LevelSection } from './level-section';
import type { StratifiedForces } from './stratified-forces';
import { massFluxOf } from './two-phase-point';

/** Jeffreys' sheltering coefficient: how much of the vapour's pressure a wave takes up. */
const SHELTERING = 0.01;
/** Waves stand on a stratified liquid where K by {@link waveGrowth} reaches this, 2/√0.01. */
export const WAVES_FROM = 2 / Math.sqrt(SHELTERING);

/**
 * K of the wave criterion, K² = Re_ls ρ_g j_g²/((ρ_l − ρ_g) g D cos β).
 * Source: Taitel & Dukler, AIChE J. 22 (1976) 47-55; see docs/methods/flow-patterns.md.
 */
export function waveNumber({ flow, vapourPull }: StratifiedForces): number {
  const { quality, insideDiameterM, saturation } = flow;
  const liquidRe = (massFluxOf(flow) * (1 - quality) * insideDiameterM) / saturation.liquidViscosityPaS;
  return Math.sqrt(liquidRe * vapourPull);
}

/** √ũ u_g/j_g: what the level makes of it. Least at A_l = A/3. */
export function waveGrowth({ liquidSpeedUp, vapourSpeedUp }: LevelSection): number {
  return Math.sqrt(liquidSpeedUp) * vapourSpeedUp;
}

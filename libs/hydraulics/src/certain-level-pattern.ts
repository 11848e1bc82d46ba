import { NonPhysicalInputError } from '@riseback/numerics';
import type { FlashingFlow } from './flash-vapour';
import { darcyFrictionFactor } from './friction-factor';
import { logitOfLevel, sectionAtLogit, type LevelSection } from './level-section';
import { STRATIFIED_SLOPE_LIMIT } from './stratified-flow';
import { isCreep, leaveFactor, lnForceRatio, stratifiedForces, type StratifiedForces } from './stratified-forces';
import { STEADY_UP_TO_LEVEL, THINNEST_FILM_LEVEL } from './stratified-level';
import { waveGrowth, waveNumber, WAVES_FROM } from './wave-criterion';

interface Rung {
  readonly section: LevelSection;
  readonly leaveFactor: number;
  readonly waveGrowth: number;
  /** What the level makes of f_l ρ_l j_l²/(f_g ρ_g j_g²): with it, what holds the liquid back over what the vapour drives it by. */
  readonly holdFactor: number;
}

/** Levels at which the forces may be looked at, shallowest first; no liquid is taken to stand below the first. */
const RUNGS: readonly Rung[] = [
  ...[THINNEST_FILM_LEVEL, 1e-4, 0.001, 0.003, 0.006, 0.01, 0.015, 0.02, 0.03, 0.04, 0.05, 0.06, 0.08, 0.1, 0.12, 0.14],
  ...[0.17, 0.2, 0.23, 0.26, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6, 0.65, 0.7, 0.75, 0.8, 0.84, STEADY_UP_TO_LEVEL],
].map((level) => {
  const section = sectionAtLogit(logitOfLevel(level));
  const holds = holdFactor(section);
  return { section, leaveFactor: leaveFactor(section), waveGrowth: waveGrowth(section), holdFactor: holds };
});
const HALF_FULL = RUNGS.findIndex(({ section }) => section.levelFraction > 0.499);
/** The level at which waves grow least lies between this rung and the next: A_l = A/3. */
const CALMEST = RUNGS.findLastIndex(({ section }) => section.liquidArea < Math.PI / 12);
/** What waves grow by there, 1/[√a (1 − a)] at a = 1/3. */
const LEAST_WAVE_GROWTH = Math.sqrt(3) * 1.5;
/**
 * Bounds of the Darcy factor up to a Reynolds number and a roughness that few returns pass: at most the greater of 64/Re and the first
 * (0.0549 at Re 2300, ε/D 0.01), at least the second (0.01165 at Re 1e6 on a smooth wall). Swept in the spec.
 */
export const FRICTION_BOUNDS = { atMost: 0.058, atLeast: 0.0116, Re: 1e6, relativeRoughness: 0.01 } as const;

/**
 * The pattern of a level or falling run where it can be told without solving for the level, as in nearly every pipe.
 * What drives the liquid falls steadily with its depth up to h = 0.88, so the forces at a level say on which side of it the liquid
 * stands; r_A rises steadily with the level; waves grow least at a third of the bore's area, and more the farther from it. So where
 * the liquid stands below a level with r_A < 1 it is stratified, and wavy or smooth if both ends of where it can stand are; and where
 * it stands above a level with r_A ≥ 1, but below half full, it is annular.
 * @returns undefined where it takes the level: see `patternAtLevel`, which tells the same in every case
 * @throws NonPhysicalInputError outside 0 < x < 1, for slopes beyond 10°, for a still pipe
 */
export function certainLevelPattern(flow: FlashingFlow): 'stratifiedSmooth' | 'stratifiedWavy' | 'annular' | undefined {
  const { quality, massFlowKgS, insideDiameterM, fallSlope } = flow;
  const isNearlyLevel = Math.abs(fallSlope) <= STRATIFIED_SLOPE_LIMIT;
  if (!(quality > 0 && quality < 1 && massFlowKgS > 0 && insideDiameterM > 0 && isNearlyLevel)) {
    throw new NonPhysicalInputError('certainLevelPattern', { quality, massFlowKgS, insideDiameterM, fallSlope });
  }
  if (fallSlope < 0) return undefined;
  const forces = stratifiedForces(flow, 'smooth', darcyFrictionFactor);
  if (isCreep(forces)) return undefined;
  // from the top, where nearly every return is still stratified
  let leaves = RUNGS.length;
  while (leaves > 0 && forces.vapourPull * rung(leaves - 1).leaveFactor >= 1) leaves--;
  if (leaves > 0 && standsBelow(forces, leaves - 1)) return certainSurface(forces, leaves - 1);
  if (leaves >= HALF_FULL) return undefined;
  return !standsBelow(forces, leaves) && standsBelow(forces, HALF_FULL) ? 'annular' : undefined;
}

/** Of a stratified liquid that stands below a rung. */
function certainSurface(forces: StratifiedForces, top: number): 'stratifiedSmooth' | 'stratifiedWavy' | undefined {
  const K = waveNumber(forces);
  if (K * LEAST_WAVE_GROWTH >= WAVES_FROM) return 'stratifiedWavy';
  const isCalm = (index: number): boolean => K * rung(index).waveGrowth < WAVES_FROM;
  let [low, high] = [Math.min(top, CALMEST), Math.min(top, CALMEST)];
  if (!isCalm(low)) return top <= CALMEST ? 'stratifiedWavy' : undefined;
  while (low > 0 && isCalm(low - 1)) low--;
  while (high < top && isCalm(high + 1)) high++;
  // calm from low to high, and nowhere else on a rung below the top
  if (low > 0 && standsBelow(forces, low)) return standsBelow(forces, low - 1) ? 'stratifiedWavy' : undefined;
  if (high === top || standsBelow(forces, high)) return 'stratifiedSmooth';
  return standsBelow(forces, high + 1) ? undefined : 'stratifiedWavy';
}

function standsBelow(forces: StratifiedForces, index: number): boolean {
  return surelyBelow(forces, rung(index)) || lnForceRatio(forces, rung(index).section) < 0;
}

/** Whether even the greatest friction of the liquid and the least of the vapour leave it below: most often so, and at a tenth of the cost. */
function surelyBelow({ flow, liquidSpeedMS, vapourSpeedMS }: StratifiedForces, { section, holdFactor }: Rung): boolean {
  const { insideDiameterM: D, roughnessM, saturation } = flow;
  const { liquidDensityKgM3, vapourDensityKgM3, liquidViscosityPaS, vapourViscosityPaS } = saturation;
  const liquidDiameterM = D * section.liquidHydraulicDiameter;
  const vapourMS = vapourSpeedMS * section.vapourSpeedUp;
  const vapourRe = (vapourDensityKgM3 * vapourMS * D * section.vapourHydraulicDiameter) / vapourViscosityPaS;
  const { atMost, atLeast, Re, relativeRoughness } = FRICTION_BOUNDS;
  if (!(vapourRe <= Re && roughnessM <= relativeRoughness * liquidDiameterM)) return false;
  const liquidRe = (liquidDensityKgM3 * liquidSpeedMS * section.liquidSpeedUp * liquidDiameterM) / liquidViscosityPaS;
  const heads =
    (liquidDensityKgM3 * liquidSpeedMS * liquidSpeedMS) / (vapourDensityKgM3 * vapourSpeedMS * vapourSpeedMS);
  return Math.max(atMost, 64 / liquidRe) * heads * holdFactor < atLeast;
}

function holdFactor(section: LevelSection): number {
  const { liquidArea, vapourArea, liquidPerimeter, vapourPerimeter, surfaceWidth, liquidSpeedUp, vapourSpeedUp } =
    section;
  const onLiquid = (liquidSpeedUp * liquidSpeedUp * liquidPerimeter) / liquidArea;
  const byVapour = vapourPerimeter / vapourArea + surfaceWidth * (1 / liquidArea + 1 / vapourArea);
  return onLiquid / (vapourSpeedUp * vapourSpeedUp * byVapour);
}

function rung(index: number): Rung {
  return RUNGS[index] as Rung;
}

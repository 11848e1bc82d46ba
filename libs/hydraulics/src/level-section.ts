/**
 * A round bore filled to a level: areas in D², lengths in D, so that one shape serves every pipe.
 * The dry half-angle a and the wetted half-angle φ = π − a are seen from the pipe's axis.
 */
export interface LevelSection {
  /** Depth of the liquid over D, h. */
  readonly levelFraction: number;
  readonly liquidArea: number;
  readonly vapourArea: number;
  readonly liquidPerimeter: number;
  readonly vapourPerimeter: number;
  /** Width of the liquid's surface. */
  readonly surfaceWidth: number;
  /** 4 A_l/S_l: the surface does not hold the liquid back. */
  readonly liquidHydraulicDiameter: number;
  /** 4 A_g/(S_g + S_i): the surface does hold the vapour back. */
  readonly vapourHydraulicDiameter: number;
  /** Velocity of each phase over its superficial velocity, A/A_k. */
  readonly liquidSpeedUp: number;
  readonly vapourSpeedUp: number;
}

const BORE_AREA = Math.PI / 4;
/** Above this level no room is left for vapour. */
const FULLEST_LEVEL = 1 - 1e-7;
/** {@link logitOfLevel} of a pipe that counts as full. */
export const FULLEST_LOGIT = logitOfLevel(FULLEST_LEVEL);

/** Logit of the wetted half-angle at a level, ln(φ/a), which runs from −∞ (empty) over 0 (half full) to ∞ (full). */
export function logitOfLevel(levelFraction: number): number {
  const c = 2 * levelFraction - 1;
  // each angle from its own arc-cosine: π less the other one would lose the smallest
  return Math.log(Math.acos(-c) / Math.acos(c));
}

/**
 * The section at a logit ln(φ/a). In it the areas of thin films and of thin gaps alike are powers of e, so a balance of forces is
 * nearly a straight line for a root finder, at both ends.
 * Source: Taitel & Dukler, AIChE J. 22 (1976) 47-55, equations 10 to 16, in dimensional form.
 */
export function sectionAtLogit(logit: number): LevelSection {
  const wetted = Math.PI / (1 + Math.exp(-logit));
  const dry = Math.PI / (1 + Math.exp(logit));
  // the sine of the lesser angle: that of the other would lose its digits near π
  const surfaceWidth = Math.sin(Math.min(wetted, dry));
  const c = Math.cos(dry);
  const liquidArea = (wetted + c * surfaceWidth) / 4;
  const vapourArea = (dry - c * surfaceWidth) / 4;
  return {
    levelFraction: logit < 0 ? Math.sin(wetted / 2) ** 2 : Math.cos(dry / 2) ** 2,
    liquidArea,
    vapourArea,
    liquidPerimeter: wetted,
    vapourPerimeter: dry,
    surfaceWidth,
    liquidHydraulicDiameter: (4 * liquidArea) / wetted,
    vapourHydraulicDiameter: (4 * vapourArea) / (dry + surfaceWidth),
    liquidSpeedUp: BORE_AREA / liquidArea,
    vapourSpeedUp: BORE_AREA / vapourArea,
  };
}

/** The section of a pipe that runs full but for a trace of vapour at its crown. */
export function fullSection(): LevelSection {
  return sectionAtLogit(FULLEST_LOGIT);
}

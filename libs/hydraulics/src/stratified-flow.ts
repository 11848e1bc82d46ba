import { findRootBracketed, NonPhysicalInputError } from '@riseback/numerics';
import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import { darcyFrictionFactor } from './friction-factor';
import { FULLEST_LOGIT, logitOfLevel, sectionAtLogit, type LevelSection } from './level-section';
import { massFluxOf } from './two-phase-point';

/** Smooth: the vapour rubs on the liquid as on a wall. Wavy: waves raised by a fast vapour hold it back several times as much. */
export type LiquidSurface = 'smooth' | 'wavy';
/** Darcy factor of a phase from Re and ε/D at its own hydraulic diameter. */
export type FrictionLaw = (Re: number, relativeRoughness: number) => number;

/** Liquid along the bottom of a level or nearly level pipe, its vapour above. */
export interface StratifiedFlow {
  readonly section: LevelSection;
  /** Friction of vapour and surface, fittings on the vapour's velocity head included [Pa/m]. */
  readonly gradientPaM: number;
  /** r_A: the pull of the speeding vapour over a wave crest, over the wave's weight. From 1 up the flow leaves stratified. */
  readonly leaveRatio: number;
}

/** Taitel and Dukler's balance is used up to this angle either way: sin 10°. */
export const STRATIFIED_SLOPE_LIMIT = Math.sin(Math.PI / 18);

/** A film thinner than this share of the bore is taken at it: it changes the gradient by less than 1e-6 there. */
const THINNEST_FILM = logitOfLevel(1e-5);
/**
 * Up to this level the pull on the liquid falls steadily with depth in level and falling runs, so a change of sign below it is the lowest
 * root. Above it, near the depth at which a channel carries most, the balance may turn back and have three roots.
 */
const STEADY_UP_TO = logitOfLevel(0.88);
/** Search step in the logit where there may be several roots. */
const SEARCH_STEP = 0.2;
const LOGIT_TOLERANCE = 1e-9;
/** A film shallower than the grains of its wall: Colebrook-White ends at ε/D = 1, and means little long before. */
const GREATEST_RELATIVE_ROUGHNESS = 0.9;
/** Superficial velocity at which the vapour starts to raise waves, at 1.2 kg/m³ [m/s]. */
const WAVES_FROM_M_S = 5;
const WAVES_AT_KG_M3 = 1.2;

/**
 * Level and friction of stratified flow by Taitel and Dukler's balance of forces, in dimensional form:
 *     τ_l S_l/A_l − τ_g S_g/A_g − τ_i S_i (1/A_l + 1/A_g) − (ρ_l − ρ_g) g sin β = 0
 *     τ_k = f_k ρ_k u_k²/8 with f_k at (u_k D_k, ε/D_k),   τ_i = f_i ρ_g u_g²/8
 *     D_l = 4 A_l/S_l,   D_g = 4 A_g/(S_g + S_i)
 *     gradient = (τ_g S_g + τ_i S_i)/A_g + (K/L) ρ_g j_g²/2
 * β is the angle of fall. f_i = f_g on a smooth surface; on a wavy one f_i = f_g [1 + 15 √h (j_g/j_t − 1)] for j_g above
 * j_t = 5 √(1.2/ρ_g) m/s. The lowest root counts.
 *     r_A = [ρ_g j_g²/((ρ_l − ρ_g) g D cos β)] (u_g/j_g)² r/((A_g/D²)(1 − h)²),   r = S_i/D
 * @param friction this program's Darcy factor unless a check needs another law
 * @returns undefined where no level below 1 − 1e-7 of the bore balances: the pipe runs full; and for a phase of less than 1e-150 m/s
 * @throws NonPhysicalInputError for a quality outside 0 < x < 1, a flow that does not move, a slope beyond 10°, or NaN
 * Source: Taitel & Dukler, AIChE J. 22 (1976) 47-55; wavy surface: Andritsos & Hanratty, AIChE J. 33 (1987) 444-454;
 *   see docs/methods/by-pattern.md.
 */
export function stratifiedFlow(
  flow: FlashingFlow,
  surface: LiquidSurface = 'smooth',
  friction: FrictionLaw = darcyFrictionFactor,
): StratifiedFlow | undefined {
  const { quality, massFlowKgS, fallSlope, insideDiameterM: D, saturation } = flow;
  if (!(quality > 0 && quality < 1 && massFlowKgS > 0 && D > 0 && Math.abs(fallSlope) <= STRATIFIED_SLOPE_LIMIT)) {
    throw new NonPhysicalInputError('stratifiedFlow', { quality, massFlowKgS, insideDiameterM: D, fallSlope });
  }
  const forces = forcesOf(flow, surface, friction);
  // a creep whose velocity head vanishes in floating point has no forces to balance
  if (forces.liquidSpeedMS ** 2 === 0 || forces.vapourSpeedMS ** 2 === 0) return undefined;
  const logit = lowestLevel(forces, fallSlope);
  if (logit === undefined) return undefined;
  const section = sectionAtLogit(logit);
  const vapourHeadPa = velocityHeadPa(forces.vapourSpeedMS, saturation.vapourDensityKgM3);
  const { wall, surface: onSurface } = vapourDrag(forces, section);
  const weight = forces.weightPaM * D * Math.sqrt(1 - fallSlope * fallSlope);
  const gapSquared = (1 - section.levelFraction) ** 2;
  return {
    section,
    gradientPaM: (wall + onSurface) / section.vapourArea + flow.lossCoefficientPerM * vapourHeadPa,
    leaveRatio:
      ((2 * vapourHeadPa) / weight) *
      ((section.vapourSpeedUp * section.vapourSpeedUp * section.surfaceWidth) / (section.vapourArea * gapSquared)),
  };
}

/** What the balance needs and the level does not change. */
interface Forces {
  readonly flow: FlashingFlow;
  readonly friction: FrictionLaw;
  /** Superficial velocities j_l, j_g. */
  readonly liquidSpeedMS: number;
  readonly vapourSpeedMS: number;
  /** 15 (j_g/j_t − 1) on a wavy surface, else 0: f_i/f_g = 1 + this × √h. */
  readonly waveFactor: number;
  /** (ρ_l − ρ_g) g. */
  readonly weightPaM: number;
}

function forcesOf(flow: FlashingFlow, surface: LiquidSurface, friction: FrictionLaw): Forces {
  const { liquidDensityKgM3, vapourDensityKgM3 } = flow.saturation;
  const massFlux = massFluxOf(flow);
  const vapourSpeedMS = (massFlux * flow.quality) / vapourDensityKgM3;
  const wavesFromMS = WAVES_FROM_M_S * Math.sqrt(WAVES_AT_KG_M3 / vapourDensityKgM3);
  return {
    flow,
    friction,
    liquidSpeedMS: (massFlux * (1 - flow.quality)) / liquidDensityKgM3,
    vapourSpeedMS,
    waveFactor: surface === 'wavy' ? 15 * Math.max(0, vapourSpeedMS / wavesFromMS - 1) : 0,
    weightPaM: (liquidDensityKgM3 - vapourDensityKgM3) * GRAVITY_M_S2,
  };
}

function velocityHeadPa(speedMS: number, densityKgM3: number): number {
  return (densityKgM3 * speedMS * speedMS) / 2;
}

/** Lowest logit at which the forces balance, within the levels solved for; undefined for a full pipe. */
function lowestLevel(forces: Forces, fallSlope: number): number | undefined {
  const balance = (logit: number): number => lnForceRatio(forces, logit);
  if (balance(THINNEST_FILM) <= 0) return THINNEST_FILM;
  let from = THINNEST_FILM;
  if (fallSlope >= 0) {
    if (balance(STEADY_UP_TO) <= 0) return root(THINNEST_FILM, STEADY_UP_TO);
    from = STEADY_UP_TO;
  }
  while (from < FULLEST_LOGIT) {
    const to = Math.min(FULLEST_LOGIT, from + SEARCH_STEP);
    if (balance(to) <= 0) return root(from, to);
    from = to;
  }
  return undefined;

  function root(low: number, high: number): number {
    return findRootBracketed(balance, low, high, { xTolerance: LOGIT_TOLERANCE, where: 'the stratified level' });
  }
}

/**
 * ln of what holds the liquid back over what drives it, per metre: above 0 where the liquid would stand deeper. As a ratio of sums of
 * positive terms it runs over both ends without overflow; a rise holds back, a fall drives.
 */
function lnForceRatio(forces: Forces, logit: number): number {
  const { flow, friction, liquidSpeedMS, weightPaM } = forces;
  const { insideDiameterM: D, roughnessM, fallSlope } = flow;
  const { liquidDensityKgM3, liquidViscosityPaS } = flow.saturation;
  const section = sectionAtLogit(logit);
  const speedMS = liquidSpeedMS * section.liquidSpeedUp;
  const liquidDiameterM = D * section.liquidHydraulicDiameter;
  const Re = (liquidDensityKgM3 * speedMS * liquidDiameterM) / liquidViscosityPaS;
  const stressPa =
    (friction(Re, wallRoughness(roughnessM, liquidDiameterM)) * velocityHeadPa(speedMS, liquidDensityKgM3)) / 4;
  const { wall, surface } = vapourDrag(forces, section);
  const heldBack = (stressPa * section.liquidPerimeter) / (D * section.liquidArea);
  const driven = wall / section.vapourArea + surface * (1 / section.liquidArea + 1 / section.vapourArea);
  const weightAlong = weightPaM * fallSlope;
  return Math.log((heldBack + Math.max(0, -weightAlong)) / (driven + Math.max(0, weightAlong)));
}

/** Drag of the vapour on its wall and on the liquid's surface, τ S/D² [Pa/m]. */
function vapourDrag(forces: Forces, section: LevelSection): { wall: number; surface: number } {
  const { flow, friction, vapourSpeedMS, waveFactor } = forces;
  const { vapourDensityKgM3, vapourViscosityPaS } = flow.saturation;
  const speedMS = vapourSpeedMS * section.vapourSpeedUp;
  const vapourDiameterM = flow.insideDiameterM * section.vapourHydraulicDiameter;
  const Re = (vapourDensityKgM3 * speedMS * vapourDiameterM) / vapourViscosityPaS;
  const f = friction(Re, wallRoughness(flow.roughnessM, vapourDiameterM));
  const stressPaM = (f * velocityHeadPa(speedMS, vapourDensityKgM3)) / (4 * flow.insideDiameterM);
  const surfaceFactor = waveFactor === 0 ? 1 : 1 + waveFactor * Math.sqrt(section.levelFraction);
  return {
    wall: stressPaM * section.vapourPerimeter,
    surface: stressPaM * surfaceFactor * section.surfaceWidth,
  };
}

function wallRoughness(roughnessM: number, hydraulicDiameterM: number): number {
  return Math.min(roughnessM / hydraulicDiameterM, GREATEST_RELATIVE_ROUGHNESS);
}

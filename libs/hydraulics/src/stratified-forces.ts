import { GRAVITY_M_S2 } from './darcy-gradient';
import type { FlashingFlow } from './flash-vapour';
import type { LevelSection } from './level-section';
import { massFluxOf } from './two-phase-point';

/** Smooth: the vapour rubs on the liquid as on a wall. Wavy: waves raised by a fast vapour hold it back several times as much. */
export type LiquidSurface = 'smooth' | 'wavy';
/** Darcy factor of a phase from Re and ε/D at its own hydraulic diameter. */
export type FrictionLaw = (Re: number, relativeRoughness: number) => number;

/** What the balance of stratified flow needs and the level does not change. */
export interface StratifiedForces {
  readonly flow: FlashingFlow;
  readonly friction: FrictionLaw;
  /** Superficial velocities j_l, j_g. */
  readonly liquidSpeedMS: number;
  readonly vapourSpeedMS: number;
  /** 15 (j_g/j_t − 1) on a wavy surface, else 0: f_i/f_g = 1 + this × √h. */
  readonly waveFactor: number;
  /** (ρ_l − ρ_g) g. */
  readonly weightPaM: number;
  /** ρ_g j_g²/((ρ_l − ρ_g) g D cos β): the vapour's pull over the liquid's weight, before the level speeds the vapour up. */
  readonly vapourPull: number;
}

/** A film shallower than the grains of its wall: Colebrook-White ends at ε/D = 1, and means little long before. */
const GREATEST_RELATIVE_ROUGHNESS = 0.9;
/** Superficial velocity at which the vapour starts to raise waves, at 1.2 kg/m³ [m/s]. */
const WAVES_FROM_M_S = 5;
const WAVES_AT_KG_M3 = 1.2;

export function stratifiedForces(flow: FlashingFlow, surface: LiquidSurface, friction: FrictionLaw): StratifiedForces {
  const { quality, fallSlope, insideDiameterM } = flow;
  const { liquidDensityKgM3, vapourDensityKgM3 } = flow.saturation;
  const massFlux = massFluxOf(flow);
  const vapourSpeedMS = (massFlux * quality) / vapourDensityKgM3;
  const wavesFromMS = WAVES_FROM_M_S * Math.sqrt(WAVES_AT_KG_M3 / vapourDensityKgM3);
  const weightPaM = (liquidDensityKgM3 - vapourDensityKgM3) * GRAVITY_M_S2;
  const weightAcrossPa = weightPaM * insideDiameterM * Math.sqrt(1 - fallSlope * fallSlope);
  return {
    flow,
    friction,
    liquidSpeedMS: (massFlux * (1 - quality)) / liquidDensityKgM3,
    vapourSpeedMS,
    waveFactor: surface === 'wavy' ? 15 * Math.max(0, vapourSpeedMS / wavesFromMS - 1) : 0,
    weightPaM,
    vapourPull: (vapourDensityKgM3 * vapourSpeedMS * vapourSpeedMS) / weightAcrossPa,
  };
}

/** A creep whose velocity head vanishes in floating point has no forces to balance. */
export function isCreep({ liquidSpeedMS, vapourSpeedMS }: StratifiedForces): boolean {
  return liquidSpeedMS * liquidSpeedMS === 0 || vapourSpeedMS * vapourSpeedMS === 0;
}

export function velocityHeadPa(speedMS: number, densityKgM3: number): number {
  return (densityKgM3 * speedMS * speedMS) / 2;
}

/**
 * ln of what holds the liquid back over what drives it, per metre: above 0 where the liquid would stand deeper. As a ratio of sums of
 * positive terms it runs over both ends without overflow; a rise holds back, a fall drives.
 */
export function lnForceRatio(forces: StratifiedForces, section: LevelSection): number {
  const { flow, friction, liquidSpeedMS, weightPaM } = forces;
  const { insideDiameterM: D, roughnessM, fallSlope } = flow;
  const { liquidDensityKgM3, liquidViscosityPaS } = flow.saturation;
  const speedMS = liquidSpeedMS * section.liquidSpeedUp;
  const liquidDiameterM = D * section.liquidHydraulicDiameter;
  const Re = (liquidDensityKgM3 * speedMS * liquidDiameterM) / liquidViscosityPaS;
  const stressPa =
    (friction(Re, wallRoughness(roughnessM, liquidDiameterM)) * velocityHeadPa(speedMS, liquidDensityKgM3)) / 4;
  const dragPaM = vapourDrag(forces, section);
  const heldBack = (stressPa * section.liquidPerimeter) / (D * section.liquidArea);
  const onWall = (dragPaM * section.vapourPerimeter) / section.vapourArea;
  const onSurface =
    dragPaM * surfaceFactor(forces, section) * section.surfaceWidth * (1 / section.liquidArea + 1 / section.vapourArea);
  const weightAlong = weightPaM * fallSlope;
  return Math.log((heldBack + Math.max(0, -weightAlong)) / (onWall + onSurface + Math.max(0, weightAlong)));
}

/** Friction of the vapour on wall and surface together [Pa/m]. */
export function vapourFrictionPaM(forces: StratifiedForces, section: LevelSection): number {
  const dragPaM = vapourDrag(forces, section);
  const wall = dragPaM * section.vapourPerimeter;
  return (wall + dragPaM * surfaceFactor(forces, section) * section.surfaceWidth) / section.vapourArea;
}

/**
 * What the level makes of the vapour's pull: by it r_A, the pull of the speeding vapour over a wave crest over the wave's weight, is
 *     r_A = [ρ_g j_g²/((ρ_l − ρ_g) g D cos β)] (u_g/j_g)² r/((A_g/D²)(1 − h)²),   r = S_i/D
 * It rises steadily with the level.
 */
export function leaveFactor({ vapourSpeedUp, surfaceWidth, vapourArea, levelFraction }: LevelSection): number {
  const gapSquared = (1 - levelFraction) ** 2;
  return (vapourSpeedUp * vapourSpeedUp * surfaceWidth) / (vapourArea * gapSquared);
}

/** τ_g/D: by perimeter or width over D and divided by the area over D², it gives a force per metre of pipe and area of its phase. */
function vapourDrag({ flow, friction, vapourSpeedMS }: StratifiedForces, section: LevelSection): number {
  const { vapourDensityKgM3, vapourViscosityPaS } = flow.saturation;
  const speedMS = vapourSpeedMS * section.vapourSpeedUp;
  const vapourDiameterM = flow.insideDiameterM * section.vapourHydraulicDiameter;
  const Re = (vapourDensityKgM3 * speedMS * vapourDiameterM) / vapourViscosityPaS;
  const f = friction(Re, wallRoughness(flow.roughnessM, vapourDiameterM));
  return (f * velocityHeadPa(speedMS, vapourDensityKgM3)) / (4 * flow.insideDiameterM);
}

/** f_i/f_g. */
function surfaceFactor({ waveFactor }: StratifiedForces, section: LevelSection): number {
  return waveFactor === 0 ? 1 : 1 + waveFactor * Math.sqrt(section.levelFraction);
}

function wallRoughness(roughnessM: number, hydraulicDiameterM: number): number {
  return Math.min(roughnessM / hydraulicDiameterM, GREATEST_RELATIVE_ROUGHNESS);
}

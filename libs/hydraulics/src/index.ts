export {
  COLEBROOK_RANGE,
  darcyFrictionFactor,
  darcyFrictionFactorColebrook,
  darcyFrictionFactorFullyRough,
  LAMINAR_LIMIT_RE,
  TURBULENT_LIMIT_RE,
} from './friction-factor';
export { boreAreaM2, darcyGradient, darcyGradientOf, GRAVITY_M_S2, type SinglePhaseFlow } from './darcy-gradient';
export { liquidVelocityMS, mixtureVelocityMS } from './flow-velocity';
export {
  DRAINING_QUALITY,
  flashVapourGradient,
  flashVapourLiquidGradient,
  flashVapourSteamGradient,
  fullLineShare,
  LEAST_PITCH,
  type FlashingFlow,
  type FlashingGradient,
} from './flash-vapour';
export {
  FITTINGS,
  fittingLossCoefficient,
  TURBULENT_FRICTION_BY_SIZE,
  turbulentFrictionFactorCrane,
  type FittingData,
  type FittingLoss,
  type FittingName,
} from './fittings';
export { NOMINAL_SIZES, PIPE_CATALOGUE, type NominalSize, type PipeStandard } from './pipe-dimensions';
export { pipeBore, pipeSizes, type PipeBore, type PipeSchedule, type PipeSizeName } from './pipe-catalogue';
export { fittingsGradient, liquidOnlyGradient, vapourOnlyGradient } from './two-phase-point';
export { homogeneousGradient } from './homogeneous';
export { chisholmC, lockhartMartinelliGradient } from './lockhart-martinelli';
export { friedelGradient } from './friedel';
export { mullerSteinhagenHeckGradient } from './mueller-steinhagen-heck';
export {
  twoPhaseDensityKgM3,
  voidFractionChisholm,
  voidFractionHomogeneous,
  voidFractionRouhaniAxelsson,
  voidFractionZivi,
  type VoidFraction,
} from './void-fraction';
export { STRATIFIED_SLOPE_LIMIT, stratifiedFlow, type StratifiedFlow } from './stratified-flow';
export type { FrictionLaw, LiquidSurface } from './stratified-forces';
export { byPatternGradient, type PatternedGradient } from './by-pattern';
export { flowPattern, type FlowPattern } from './flow-pattern';
export { levelFlowPattern, type LevelFlowPattern } from './level-flow-pattern';
export { riseFlow, type RiseFlow, type RiseFlowPattern } from './rise-flow-pattern';
export {
  CHOKED_PRESSURE_RATIO,
  napierOrificeFlowKgS,
  ORIFICE_DISCHARGE_COEFFICIENT,
  orificeSteamFlowKgS,
} from './steam-orifice';
export {
  accelerationFactor,
  criticalPressurePa,
  isenthalpicVolumeSlope,
  vapourAccelerationFactor,
} from './acceleration';

export type { PhaseProperties } from './gibbs-properties';
export { region1, REGION1_RANGE } from './region1';
export { region2, REGION2_RANGE } from './region2';
export { SATURATION_LINE_RANGE, saturationPressurePa, saturationTemperatureK } from './saturation-line';
export { SATURATION_RANGE_PA, saturationStateDirect, type SaturationState } from './saturation-state';
export {
  blankSaturation,
  fillSaturation,
  requireBoilingPressure,
  saturationSlopes,
  saturationState,
  type SaturationRecord,
  type SaturationSlopes,
} from './saturation-table';
export { liquidAtEnthalpy, liquidAtTemperature, vapourAtEnthalpy, type SinglePhaseState } from './single-phase';
export { SteamRangeError, type SteamQuantity } from './steam-range-error';
export { SURFACE_TENSION_RANGE, surfaceTensionNM } from './surface-tension';
export { VISCOSITY_RANGE, viscosityPaS } from './viscosity';

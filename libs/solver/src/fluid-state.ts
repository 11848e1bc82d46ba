import { liquidAtEnthalpy, saturationState, vapourAtEnthalpy, type SaturationState } from '@riseback/steam';

/** Condensate, flash steam or both at a pressure and an enthalpy, in equilibrium. */
export interface FluidState {
  readonly saturation: SaturationState;
  /** Thermodynamic x = (h − h_l)/(h_g − h_l): at or below 0 subcooled, above 1 superheated. */
  readonly quality: number;
  readonly temperatureK: number;
  readonly liquidDensityKgM3: number;
  readonly liquidViscosityPaS: number;
  readonly vapourDensityKgM3: number;
  readonly vapourViscosityPaS: number;
}

/** @throws SteamRangeError outside the steam properties */
export function fluidState(pressurePa: number, enthalpyJKg: number): FluidState {
  return fluidStateAt(saturationState(pressurePa), enthalpyJKg);
}

/** The same where the saturation state is already known. The phase that is not there has its saturation properties. */
export function fluidStateAt(saturation: SaturationState, enthalpyJKg: number): FluidState {
  const { pressurePa, liquidEnthalpyJKg, vapourEnthalpyJKg } = saturation;
  const quality = (enthalpyJKg - liquidEnthalpyJKg) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
  const liquid = quality < 0 ? liquidAtEnthalpy(pressurePa, enthalpyJKg) : undefined;
  const vapour = quality > 1 ? vapourAtEnthalpy(pressurePa, enthalpyJKg) : undefined;
  return {
    saturation,
    quality,
    temperatureK: (liquid ?? vapour ?? saturation).temperatureK,
    liquidDensityKgM3: liquid?.densityKgM3 ?? saturation.liquidDensityKgM3,
    liquidViscosityPaS: liquid?.viscosityPaS ?? saturation.liquidViscosityPaS,
    vapourDensityKgM3: vapour?.densityKgM3 ?? saturation.vapourDensityKgM3,
    vapourViscosityPaS: vapour?.viscosityPaS ?? saturation.vapourViscosityPaS,
  };
}

/** Mass fraction of vapour: x within 0 and 1. */
export function vapourFraction({ quality }: FluidState): number {
  return Math.min(1, Math.max(0, quality));
}

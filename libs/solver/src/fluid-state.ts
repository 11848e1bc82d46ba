import { liquidAtEnthalpy, vapourAtEnthalpy, type SaturationState } from '@riseback/steam';

/** Condensate, flash steam or both at a pressure and an enthalpy, in equilibrium. */
export interface FluidState {
  readonly saturation: SaturationState;
  /** Thermodynamic quality: not held within 0 and 1. */
  readonly quality: number;
  readonly temperatureK: number;
  readonly liquidDensityKgM3: number;
  readonly liquidViscosityPaS: number;
  readonly vapourDensityKgM3: number;
  readonly vapourViscosityPaS: number;
}

/**
 * The state at an enthalpy, from the saturation state at its pressure. The phase that is not there has its saturation properties.
 * @throws SteamRangeError outside the steam properties
 */
export function fluidStateAt(saturation: SaturationState, enthalpyJKg: number): FluidState {
  const { pressurePa } = saturation;
  const quality = thermodynamicQuality(saturation, enthalpyJKg);
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

/** Temperature alone of {@link fluidStateAt}: that of boiling where liquid and vapour stand together. */
export function temperatureAtK(saturation: SaturationState, enthalpyJKg: number): number {
  const quality = thermodynamicQuality(saturation, enthalpyJKg);
  return quality >= 0 && quality <= 1 ? saturation.temperatureK : fluidStateAt(saturation, enthalpyJKg).temperatureK;
}

/** Mass fraction of vapour: x within 0 and 1. */
export function vapourFraction(quality: number): number {
  return Math.min(1, Math.max(0, quality));
}

/** x = (h − h_l)/(h_g − h_l): at or below 0 subcooled, above 1 superheated. */
export function thermodynamicQuality(saturation: SaturationState, enthalpyJKg: number): number {
  const { liquidEnthalpyJKg, vapourEnthalpyJKg } = saturation;
  return (enthalpyJKg - liquidEnthalpyJKg) / (vapourEnthalpyJKg - liquidEnthalpyJKg);
}

import { region1 } from './region1';
import { region2 } from './region2';
import { saturationTemperatureK } from './saturation-line';
import { requireWithin } from './steam-range-error';
import { surfaceTensionNM } from './surface-tension';
import { viscosityPaS } from './viscosity';

/** Absolute pressures over which this application works with boiling water: 0.0065 bar to 100 bar. */
export const SATURATION_RANGE_PA = [650, 10e6] as const;

/** Boiling water and the vapour above it. */
export interface SaturationState {
  readonly pressurePa: number;
  readonly temperatureK: number;
  readonly liquidDensityKgM3: number;
  readonly vapourDensityKgM3: number;
  readonly liquidEnthalpyJKg: number;
  readonly vapourEnthalpyJKg: number;
  readonly liquidViscosityPaS: number;
  readonly vapourViscosityPaS: number;
  readonly surfaceTensionNM: number;
}

/**
 * Both phases at saturation straight from the IAPWS equations: the reference that saturationState interpolates, and the slower
 * of the two.
 * @param pressurePa p [Pa absolute]
 * @throws SteamRangeError outside SATURATION_RANGE_PA, and for NaN
 * Source: IAPWS R7-97(2012) regions 1, 2 and 4, R12-08, R1-76(2014); see region1, region2, viscosityPaS, surfaceTensionNM.
 */
export function saturationStateDirect(pressurePa: number): SaturationState {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'boiling water');
  return saturationFromEquations(pressurePa);
}

/** The same without the check, so that the table may take slopes across the ends of the range. */
export function saturationFromEquations(pressurePa: number): SaturationState {
  const temperatureK = saturationTemperatureK(pressurePa);
  const liquid = region1(pressurePa, temperatureK);
  const vapour = region2(pressurePa, temperatureK);
  return {
    pressurePa,
    temperatureK,
    liquidDensityKgM3: liquid.densityKgM3,
    vapourDensityKgM3: vapour.densityKgM3,
    liquidEnthalpyJKg: liquid.enthalpyJKg,
    vapourEnthalpyJKg: vapour.enthalpyJKg,
    liquidViscosityPaS: viscosityPaS(temperatureK, liquid.densityKgM3),
    vapourViscosityPaS: viscosityPaS(temperatureK, vapour.densityKgM3),
    surfaceTensionNM: surfaceTensionNM(temperatureK),
  };
}

import { NoConvergenceError } from '@riseback/numerics';
import type { PhaseProperties } from './gibbs-properties';
import { REGION1_RANGE, region1Unchecked } from './region1';
import { REGION2_RANGE, region2Unchecked } from './region2';
import { saturationTemperatureK } from './saturation-line';
import { SATURATION_RANGE_PA } from './saturation-state';
import { saturationState } from './saturation-table';
import { requireWithin, SteamRangeError } from './steam-range-error';
import { viscosityUnchecked } from './viscosity';

/** One phase at a pressure: what friction and static head need of it. */
export interface SinglePhaseState {
  readonly temperatureK: number;
  readonly densityKgM3: number;
  readonly enthalpyJKg: number;
  readonly viscosityPaS: number;
}

/**
 * How far across the boiling temperature a state may lie and still count as at it [K]. Covers the interpolation error of
 * saturationState, so that its h_l is always accepted as a liquid and its h_g as a vapour.
 */
const BOILING_SLACK_K = 1e-3;
/** The same as a share of an enthalpy. */
const BOILING_ENTHALPY_SLACK = 1e-6;
/** Steam at 800 °C has more than this at any pressure of SATURATION_RANGE_PA (4.115 to 4.160 MJ/kg) [J/kg]. */
const ENTHALPY_SURELY_BELOW_800_C = 4.1e6;
/** The last Newton step of a temperature [K]; density and viscosity then stand to better than 1e-8. */
const TEMPERATURE_TOLERANCE_K = 1e-6;
/** How far out the first guess of a liquid's temperature may be before its enthalpy is refused unseen [K]. */
const GUESS_MARGIN_K = 2;
const MAXIMUM_ITERATIONS = 30;

/**
 * Liquid water at a pressure and an enthalpy, up to boiling: region 1 inverted for temperature by Newton's method.
 * @param pressurePa p [Pa absolute]
 * @param enthalpyJKg h [J/kg]; from water at 0 °C to h_l(p)
 * @throws SteamRangeError for a pressure outside SATURATION_RANGE_PA, for an enthalpy of ice or of boiling water, and for NaN
 * Source: IAPWS R7-97(2012) region 1, R12-08.
 */
export function liquidAtEnthalpy(pressurePa: number, enthalpyJKg: number): SinglePhaseState {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'liquid water');
  const low = REGION1_RANGE.temperatureK[0];
  const high = saturationTemperatureK(pressurePa);
  const guess = liquidTemperatureGuessK(pressurePa, enthalpyJKg);
  if (!(guess >= low - GUESS_MARGIN_K && guess <= high + GUESS_MARGIN_K)) refuse();
  const state = solveTemperature('liquidAtEnthalpy', region1Unchecked, pressurePa, enthalpyJKg, guess);
  if (!(state.temperatureK >= low - BOILING_SLACK_K && state.temperatureK <= high + BOILING_SLACK_K)) refuse();
  return state;

  function refuse(): never {
    const enthalpyAt = (temperatureK: number): number => region1Unchecked(pressurePa, temperatureK).enthalpyJKg;
    const subject = `liquid water at ${pressurePa} Pa`;
    throw new SteamRangeError('enthalpy', enthalpyJKg, enthalpyAt(low), enthalpyAt(high), subject);
  }
}

/**
 * Liquid water at a pressure and a temperature, up to boiling.
 * @param pressurePa p [Pa absolute]
 * @param temperatureK T [K]; from 0 °C to T_sat(p)
 * @throws SteamRangeError for a pressure outside SATURATION_RANGE_PA, for a temperature outside those limits, and for NaN
 * Source: IAPWS R7-97(2012) region 1, R12-08.
 */
export function liquidAtTemperature(pressurePa: number, temperatureK: number): SinglePhaseState {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'liquid water');
  const low = REGION1_RANGE.temperatureK[0];
  const high = saturationTemperatureK(pressurePa);
  if (!(temperatureK >= low && temperatureK <= high + BOILING_SLACK_K)) {
    throw new SteamRangeError('temperature', temperatureK, low, high, `liquid water at ${pressurePa} Pa`);
  }
  return singlePhase(temperatureK, region1Unchecked(pressurePa, temperatureK));
}

/**
 * Steam at a pressure and an enthalpy, from saturation up: region 2 inverted for temperature by Newton's method.
 * @param pressurePa p [Pa absolute]
 * @param enthalpyJKg h [J/kg]; from h_g(p) to steam at 800 °C
 * @throws SteamRangeError for a pressure outside SATURATION_RANGE_PA, for an enthalpy outside those limits, and for NaN
 * Source: IAPWS R7-97(2012) region 2, R12-08.
 */
export function vapourAtEnthalpy(pressurePa: number, enthalpyJKg: number): SinglePhaseState {
  requireWithin('pressure', pressurePa, SATURATION_RANGE_PA, 'steam');
  const boiling = saturationState(pressurePa);
  const low = boiling.vapourEnthalpyJKg * (1 - BOILING_ENTHALPY_SLACK);
  if (!(enthalpyJKg >= low && enthalpyJKg <= ENTHALPY_SURELY_BELOW_800_C)) {
    const high = region2Unchecked(pressurePa, REGION2_RANGE.temperatureK[1]).enthalpyJKg;
    requireWithin('enthalpy', enthalpyJKg, [low, high], `steam at ${pressurePa} Pa`);
  }
  return solveTemperature('vapourAtEnthalpy', region2Unchecked, pressurePa, enthalpyJKg, boiling.temperatureK);
}

/**
 * A start for Newton's method that lies within some 0.1 K of liquid water: a polynomial fitted to the boiling line, with the
 * enthalpy first freed of the work of its pressure. Accuracy rests on the iteration, not on this.
 */
function liquidTemperatureGuessK(pressurePa: number, enthalpyJKg: number): number {
  const z = (enthalpyJKg - pressurePa / 1000) / 1e6;
  return 273.1464 + z * (237.9531 + z * (7.36304 + z * (-15.42924 + z * (5.86798 - z * 3.0491))));
}

function solveTemperature(
  where: string,
  region: (pressurePa: number, temperatureK: number) => PhaseProperties,
  pressurePa: number,
  enthalpyJKg: number,
  guessK: number,
): SinglePhaseState {
  let temperatureK = guessK;
  let stepK = NaN;
  for (let iteration = 0; iteration < MAXIMUM_ITERATIONS; iteration++) {
    const properties = region(pressurePa, temperatureK);
    stepK = (enthalpyJKg - properties.enthalpyJKg) / properties.specificHeatJKgK;
    if (Math.abs(stepK) < TEMPERATURE_TOLERANCE_K) return singlePhase(temperatureK, properties);
    temperatureK += stepK;
  }
  throw new NoConvergenceError(where, MAXIMUM_ITERATIONS, stepK);
}

function singlePhase(temperatureK: number, { densityKgM3, enthalpyJKg }: PhaseProperties): SinglePhaseState {
  return { temperatureK, densityKgM3, enthalpyJKg, viscosityPaS: viscosityUnchecked(temperatureK, densityKgM3) };
}

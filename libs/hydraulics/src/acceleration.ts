import { findRootBracketed, NonPhysicalInputError } from '@riseback/numerics';
import { SATURATION_RANGE_PA, saturationSlopes, vapourAtEnthalpy, type SaturationState } from '@riseback/steam';

/** Share of the pressure over which the volume of superheated steam is differenced. */
const SUPERHEATED_STEP = 1e-4;
/** Critical pressure is sought to this share of itself. */
const CRITICAL_TOLERANCE = 1e-9;

/**
 * How the specific volume of the mixture without slip changes with pressure at constant enthalpy, (dv/dp)_h.
 *     v = x v_g + (1 − x) v_l,   x = (h − h_l)/h_lg
 *     (dv/dp)_h = x v_g′ + (1 − x) v_l′ + (v_g − v_l) x′,   x′ = −(h_l′ + x h_lg′)/h_lg
 * A dash is the derivative along the boiling line. Liquid hardly gives way, 0; superheated steam is differenced.
 * @returns slope [m³/(kg Pa)], negative as flash steam expands and more of it forms
 * @throws SteamRangeError as the steam properties do
 */
export function isenthalpicVolumeSlope(saturation: SaturationState, enthalpyJKg: number): number {
  const { pressurePa, liquidEnthalpyJKg, vapourEnthalpyJKg, liquidDensityKgM3, vapourDensityKgM3 } = saturation;
  const latentJKg = vapourEnthalpyJKg - liquidEnthalpyJKg;
  const x = (enthalpyJKg - liquidEnthalpyJKg) / latentJKg;
  if (x <= 0) return 0;
  const slopes = saturationSlopes(pressurePa);
  if (x > 1) return superheatedVolumeSlope(pressurePa, enthalpyJKg, slopes.vapourEnthalpyJKgPerPa);
  const latentSlope = slopes.vapourEnthalpyJKgPerPa - slopes.liquidEnthalpyJKgPerPa;
  const qualitySlope = -(slopes.liquidEnthalpyJKgPerPa + x * latentSlope) / latentJKg;
  const vapourSlope = -slopes.vapourDensityKgM3PerPa / vapourDensityKgM3 ** 2;
  const liquidSlope = -slopes.liquidDensityKgM3PerPa / liquidDensityKgM3 ** 2;
  return x * vapourSlope + (1 - x) * liquidSlope + (1 / vapourDensityKgM3 - 1 / liquidDensityKgM3) * qualitySlope;
}

/**
 * What acceleration makes of the other gradients, by homogeneous flow: −dp/ds = (friction + static)/factor.
 *     factor = 1 + G² (dv/dp)_h
 * @returns 1 for slow flow; 0 where the flow chokes; below 0 no steady flow carries G at this pressure
 * Source: momentum balance of the homogeneous mixture; see docs/methods/acceleration-and-choking.md.
 */
export function accelerationFactor(massFluxKgM2S: number, saturation: SaturationState, enthalpyJKg: number): number {
  return 1 + massFluxKgM2S * massFluxKgM2S * isenthalpicVolumeSlope(saturation, enthalpyJKg);
}

/**
 * The same for a line in which the vapour has the bore to itself: its own flux x G and its own volume v_g. The flash-vapour method has no
 * acceleration term; where this reaches 0 its vapour chokes.
 * @throws NonPhysicalInputError for x above 1 or NaN: superheated steam takes {@link accelerationFactor}
 */
export function vapourAccelerationFactor(massFluxKgM2S: number, saturation: SaturationState, quality: number): number {
  if (!(quality <= 1)) throw new NonPhysicalInputError('vapourAccelerationFactor', { quality });
  if (quality <= 0) return 1;
  const vapourFlux = quality * massFluxKgM2S;
  const { vapourDensityKgM3PerPa } = saturationSlopes(saturation.pressurePa);
  return 1 - (vapourFlux * vapourFlux * vapourDensityKgM3PerPa) / saturation.vapourDensityKgM3 ** 2;
}

/**
 * The pressure at which a pipe's outlet stands when it chokes: where the factor comes up from below 0. Both factors above rise with pressure, so
 * it is the only one; where flash begins with a jump past 0, the pressure at which it begins.
 * @param factorAt factor at a pressure, for the pipe's own flow and enthalpy
 * @param nodePressurePa what the pipe discharges into
 * @returns a pressure just on the side where the factor is above 0; undefined where the pipe does not choke
 * @throws SteamRangeError where the critical pressure or the node's lies outside the steam properties
 */
export function criticalPressurePa(
  factorAt: (pressurePa: number) => number,
  nodePressurePa: number,
): number | undefined {
  if (factorAt(nodePressurePa) > 0) return undefined;
  // climb by doubling: most flows choke not far above the node, and the top of the range is a dozen bisections away
  const highest = SATURATION_RANGE_PA[1];
  let low = nodePressurePa;
  let high = nodePressurePa;
  do {
    low = high;
    // past the highest pressure the steam properties refuse, with the value
    high = low < highest ? Math.min(2 * low, highest) : 2 * low;
  } while (factorAt(high) <= 0);
  const xTolerance = CRITICAL_TOLERANCE * high;
  const root = findRootBracketed(factorAt, low, high, { xTolerance, where: 'the critical outlet pressure' });
  return factorAt(root) > 0 ? root : root + 2 * xTolerance;
}

/** Stepped to the side on which steam of this enthalpy is drier, so that a state just above saturation stays a vapour. */
function superheatedVolumeSlope(pressurePa: number, enthalpyJKg: number, vapourEnthalpySlope: number): number {
  const otherPa = pressurePa * (vapourEnthalpySlope > 0 ? 1 - SUPERHEATED_STEP : 1 + SUPERHEATED_STEP);
  const here = 1 / vapourAtEnthalpy(pressurePa, enthalpyJKg).densityKgM3;
  const there = 1 / vapourAtEnthalpy(otherPa, enthalpyJKg).densityKgM3;
  return (there - here) / (otherPa - pressurePa);
}

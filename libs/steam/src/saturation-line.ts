import { requireWithin } from './steam-range-error';

/** Where the saturation equations are printed to hold: 0 °C to the critical point. */
export const SATURATION_LINE_RANGE = { temperatureK: [273.15, 647.096], pressurePa: [611.213, 22.064e6] } as const;

// n₁ … n₁₀ of Table 34
const N1 = 0.11670521452767e4;
const N2 = -0.72421316703206e6;
const N3 = -0.17073846940092e2;
const N4 = 0.1202082470247e5;
const N5 = -0.32325550322333e7;
const N6 = 0.1491510861353e2;
const N7 = -0.48232657361591e4;
const N8 = 0.40511340542057e6;
const N9 = -0.23855557567849;
const N10 = 0.65017534844798e3;

/**
 * Pressure at which water boils at a temperature.
 *     β²ϑ² + n₁β²ϑ + n₂β² + n₃βϑ² + n₄βϑ + n₅β + n₆ϑ² + n₇ϑ + n₈ = 0,   β = (p/1 MPa)^¼,   ϑ = T/1 K + n₉/(T/1 K − n₁₀)
 * solved for β.
 * @param temperatureK T [K]
 * @returns p [Pa absolute]
 * @throws SteamRangeError outside SATURATION_LINE_RANGE, and for NaN
 * Source: IAPWS R7-97(2012), section 8.1, equation 30 and Table 34; reproduces Table 35 to its nine digits.
 */
export function saturationPressurePa(temperatureK: number): number {
  requireWithin('temperature', temperatureK, SATURATION_LINE_RANGE.temperatureK, 'boiling water');
  const theta = temperatureK + N9 / (temperatureK - N10);
  const a = (theta + N1) * theta + N2;
  const b = (N3 * theta + N4) * theta + N5;
  const c = (N6 * theta + N7) * theta + N8;
  const beta = (2 * c) / (-b + Math.sqrt(b * b - 4 * a * c));
  return beta * beta * beta * beta * 1e6;
}

/**
 * Temperature at which water boils at a pressure: the equation of saturationPressurePa, solved for ϑ instead, so the two
 * invert each other to rounding.
 * @param pressurePa p [Pa absolute]
 * @returns T [K]
 * @throws SteamRangeError outside SATURATION_LINE_RANGE, and for NaN
 * Source: IAPWS R7-97(2012), section 8.2, equation 31; reproduces Table 36 to its nine digits.
 */
export function saturationTemperatureK(pressurePa: number): number {
  requireWithin('pressure', pressurePa, SATURATION_LINE_RANGE.pressurePa, 'boiling water');
  const beta = Math.sqrt(Math.sqrt(pressurePa / 1e6));
  const e = (beta + N3) * beta + N6;
  const f = (N1 * beta + N4) * beta + N7;
  const g = (N2 * beta + N5) * beta + N8;
  const d = (2 * g) / (-f - Math.sqrt(f * f - 4 * e * g));
  const sum = N10 + d;
  return (sum - Math.sqrt(sum * sum - 4 * (N9 + N10 * d))) / 2;
}

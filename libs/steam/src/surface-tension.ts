import { requireWithin } from './steam-range-error';

/** 0 °C to the critical point. */
export const SURFACE_TENSION_RANGE = { temperatureK: [273.15, 647.096] } as const;

/**
 * Surface tension between water and its vapour.
 *     σ = 235.8 mN/m · τ^1.256 (1 − 0.625 τ),   τ = 1 − T/647.096 K
 * @param temperatureK T [K]
 * @returns σ [N/m]; 0 at the critical point
 * @throws SteamRangeError outside SURFACE_TENSION_RANGE, and for NaN
 * Source: IAPWS R1-76(2014); reproduces its Table 1 to the printed 0.01 mN/m.
 */
export function surfaceTensionNM(temperatureK: number): number {
  requireWithin('temperature', temperatureK, SURFACE_TENSION_RANGE.temperatureK, 'boiling water');
  const tau = 1 - temperatureK / 647.096;
  return 0.2358 * tau ** 1.256 * (1 - 0.625 * tau);
}

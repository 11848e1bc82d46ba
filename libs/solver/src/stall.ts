import type { Trap } from '@riseback/network';
import { saturationTemperatureK } from '@riseback/steam';
import { modulatedInletPressurePa, type ModulatingService } from './modulating-inlet';

/** Steam-space pressure of a modulated exchanger over its load, with what its trap stands against. */
export interface StallCurve {
  readonly backPressurePa: number;
  /** Load over full load at which the steam space falls to the back pressure. */
  readonly stallFraction: number;
  /** From no load to full load. */
  readonly points: readonly { readonly loadFraction: number; readonly steamPressurePa: number }[];
}

/**
 * Load fraction at which the steam space of a modulated exchanger falls to the back pressure: below it nothing drives the condensate out.
 *     varyingInlet: φ = (T_b − T_2)/(T_s − T_2)
 *     varyingFlow:  φ = LMTD(T_b)/LMTD(T_s),   LMTD(T) = (T_2 − T_1)/ln[(T − T_1)/(T − T_2)]
 * with T_b and T_s saturation at the back pressure and at full load; the symbols are those of {@link modulatedInletPressurePa}.
 * @returns φ [–]: 0 where T_b ≤ T_2, since the steam space never falls so far; 1 or more where it stalls even at full load; undefined
 *   where T_s ≤ T_2 or T_2 < T_1, which describes no exchanger
 * @throws SteamRangeError for pressures outside the steam properties
 * Source: mean temperature difference of condensing steam; see docs/methods/stall.md.
 */
export function stallFraction(
  service: ModulatingService,
  fullLoadPressurePa: number,
  backPressurePa: number,
): number | undefined {
  const { control, secondaryInletK, secondaryOutletK } = service;
  const fullLoadK = saturationTemperatureK(fullLoadPressurePa);
  if (fullLoadK <= secondaryOutletK || secondaryOutletK < secondaryInletK) return undefined;
  const backK = saturationTemperatureK(backPressurePa);
  if (backK <= secondaryOutletK) return 0;
  const linear = (backK - secondaryOutletK) / (fullLoadK - secondaryOutletK);
  if (control === 'varyingInlet' || secondaryOutletK === secondaryInletK) return linear;
  // LMTD(T_b)/LMTD(T_s): the range T_2 − T_1 is the same in both
  const logAt = (steamK: number): number =>
    Math.log1p((secondaryOutletK - secondaryInletK) / (steamK - secondaryOutletK));
  return logAt(fullLoadK) / logAt(backK);
}

const CURVE_POINTS = 41;

/**
 * The curve behind a trap's stall check.
 * @param fullLoadPressurePa that of the trap as drawn unless a case changes it
 * @returns undefined for a trap whose steam is not modulated, and where its temperatures describe no exchanger
 * @throws SteamRangeError where the back pressure, or the steam space at no load, lies outside the steam properties
 */
export function stallCurve(
  { service, inletPressurePa }: Pick<Trap, 'service' | 'inletPressurePa'>,
  backPressurePa: number,
  fullLoadPressurePa: number = inletPressurePa,
  pointCount: number = CURVE_POINTS,
): StallCurve | undefined {
  if (service.kind === 'constant') return undefined;
  const fraction = stallFraction(service, fullLoadPressurePa, backPressurePa);
  if (fraction === undefined) return undefined;
  const points = Array.from({ length: pointCount }, (_, i) => {
    const loadFraction = i / (pointCount - 1);
    return { loadFraction, steamPressurePa: modulatedInletPressurePa(service, fullLoadPressurePa, loadFraction) };
  });
  return { backPressurePa, stallFraction: fraction, points };
}

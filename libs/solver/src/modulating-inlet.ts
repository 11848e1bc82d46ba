import { saturationPressurePa, saturationTemperatureK } from '@riseback/steam';

/** A heat exchanger behind a steam control valve, as the network file gives it. */
export interface ModulatingService {
  readonly control: 'varyingInlet' | 'varyingFlow';
  /** Secondary fluid entering, T_1. */
  readonly secondaryInletK: number;
  /** Secondary fluid leaving, T_2. */
  readonly secondaryOutletK: number;
}

/**
 * Steam pressure that a modulating valve leaves in an exchanger at part load.
 *     varyingInlet: T = T_2 + φ (T_s − T_2)             constant secondary flow, varying inlet
 *     varyingFlow:  LMTD(T) = φ LMTD(T_s)               constant T_1 and T_2, varying flow
 *     LMTD(T) = (T_2 − T_1)/ln[(T − T_1)/(T − T_2)], hence T = (E T_2 − T_1)/(E − 1), E = [(T_s − T_1)/(T_s − T_2)]^(1/φ)
 * @param fullLoadPressurePa pressure at full load, p_sat(T_s) [Pa]
 * @param loadFraction φ [–]; from 1 up the valve stands open and the pressure stays that of full load
 * @returns [Pa]; the full-load pressure where T_s ≤ T_2 or T_2 < T_1, since no steam can then heat as described
 * @throws SteamRangeError where the steam space would fall below the range of the steam properties
 * Source: mean temperature difference of condensing steam; see docs/methods/network-walk.md.
 */
export function modulatedInletPressurePa(
  service: ModulatingService,
  fullLoadPressurePa: number,
  loadFraction: number,
): number {
  if (loadFraction >= 1) return fullLoadPressurePa;
  const { secondaryInletK, secondaryOutletK } = service;
  const fullLoadK = saturationTemperatureK(fullLoadPressurePa);
  if (fullLoadK <= secondaryOutletK || secondaryOutletK < secondaryInletK) return fullLoadPressurePa;
  const constantFlowK = secondaryOutletK + loadFraction * (fullLoadK - secondaryOutletK);
  if (service.control === 'varyingInlet' || secondaryOutletK === secondaryInletK) {
    return saturationPressurePa(constantFlowK);
  }
  const ratio = (fullLoadK - secondaryInletK) / (fullLoadK - secondaryOutletK);
  const atLoad = ratio ** (1 / loadFraction);
  // at hardly any load the steam space is as warm as what leaves it, and the power overflows
  if (!Number.isFinite(atLoad)) return saturationPressurePa(secondaryOutletK);
  return saturationPressurePa((atLoad * secondaryOutletK - secondaryInletK) / (atLoad - 1));
}

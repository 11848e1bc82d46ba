import {
  accelerationFactor,
  criticalPressurePa,
  vapourAccelerationFactor,
  type FlashingFlow,
} from '@riseback/hydraulics';
import { saturationState, type SaturationState } from '@riseback/steam';
import { thermodynamicQuality } from './fluid-state';
import { FRICTION_LAWS, PARTS, type FrictionLawName } from './friction-laws';

/** p v_g of boiling water, m²/s²: nowhere above this in the range of the steam properties. */
const GREATEST_VAPOUR_PV = 2.05e5;

/**
 * The pressure at which a pipe's outlet stands above the node it discharges into because its flow chokes there.
 * @param flow the pipe's flow, its slope that of the last piece; quality and saturation are not looked at
 * @returns undefined where it does not choke
 * @throws SteamRangeError where the node's or the critical pressure lies outside the steam properties
 */
export function chokedOutletPa(
  law: FrictionLawName,
  flow: FlashingFlow,
  massFluxKgM2S: number,
  enthalpyJKg: number,
  nodePressurePa: number,
): number | undefined {
  if (!mayChoke(massFluxKgM2S, nodePressurePa)) return undefined;
  return criticalPressurePa(
    (pressurePa) => speedingFactor(law, flow, massFluxKgM2S, saturationState(pressurePa), enthalpyJKg),
    nodePressurePa,
  );
}

/**
 * 1 + G² (dv/dp)_h as the friction law has it: what is left of the gradient's denominator; choked at 0.
 *     flashVapour: of the vapour alone;   byPattern: the share that takes the whole bore
 */
function speedingFactor(
  law: FrictionLawName,
  flow: FlashingFlow,
  massFluxKgM2S: number,
  saturation: SaturationState,
  enthalpyJKg: number,
): number {
  const quality = thermodynamicQuality(saturation, enthalpyJKg);
  if (quality <= 0) return 1;
  const { vapourAlone, write } = FRICTION_LAWS[law];
  if (vapourAlone && quality <= 1) return vapourAccelerationFactor(massFluxKgM2S, saturation, quality);
  const factor = accelerationFactor(massFluxKgM2S, saturation, enthalpyJKg);
  // a share below 1 only brings the factor nearer to 1
  if (factor > 0 || quality > 1) return factor;
  const share = write({ ...flow, saturation, quality }, new Float64Array(PARTS));
  return 1 + share * (factor - 1);
}

/**
 * Rules out in two multiplications what nearly every pipe is far from. −(dv/dp)_h is nowhere above 4 v_g/p, superheated steam
 * included (swept in the spec), so a flow with 4 G² v_g/p < 1 does not choke.
 */
export function mayChoke(massFluxKgM2S: number, pressurePa: number): boolean {
  return 4 * GREATEST_VAPOUR_PV * massFluxKgM2S * massFluxKgM2S >= pressurePa * pressurePa;
}

import { NonPhysicalInputError } from '@riseback/numerics';
import { boreAreaM2 } from './darcy-gradient';

/**
 * Velocity of the whole flow as if it were liquid, v = G/ρ_l, in m/s.
 * @throws NonPhysicalInputError for a bore or density that is not positive, or NaN
 */
export function liquidVelocityMS(massFlowKgS: number, liquidDensityKgM3: number, insideDiameterM: number): number {
  if (!(insideDiameterM > 0 && liquidDensityKgM3 > 0 && !Number.isNaN(massFlowKgS))) {
    throw new NonPhysicalInputError('liquidVelocityMS', { massFlowKgS, liquidDensityKgM3, insideDiameterM });
  }
  return massFlowKgS / boreAreaM2(insideDiameterM) / liquidDensityKgM3;
}

/**
 * Velocity of liquid and flash steam mixed without slip, v = G (x/ρ_g + (1 − x)/ρ_l), in m/s. Subcooled liquid (x ≤ 0)
 * moves at G/ρ_l; for superheated steam give x = 1 and its own density as the vapour's.
 * @throws NonPhysicalInputError for a bore or density that is not positive, x above 1, or NaN
 */
export function mixtureVelocityMS(
  massFlowKgS: number,
  quality: number,
  liquidDensityKgM3: number,
  vapourDensityKgM3: number,
  insideDiameterM: number,
): number {
  if (!(quality <= 1 && vapourDensityKgM3 > 0)) {
    throw new NonPhysicalInputError('mixtureVelocityMS', { quality, vapourDensityKgM3 });
  }
  const allLiquid = liquidVelocityMS(massFlowKgS, liquidDensityKgM3, insideDiameterM);
  if (quality <= 0) return allLiquid;
  return allLiquid * (1 - quality + (quality * liquidDensityKgM3) / vapourDensityKgM3);
}

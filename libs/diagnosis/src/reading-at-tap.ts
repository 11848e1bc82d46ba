import { GRAVITY_M_S2 } from '@riseback/hydraulics';
import type { Gauge, SiteConditions } from '@riseback/network';
import { liquidAtTemperature } from '@riseback/steam';

/** Water in a leg does not freeze in a plant that is run. */
const COLDEST_WATER_K = 274.15;
/** Above this a leg would boil at some pressure it may see; its water is taken no warmer. */
const WARMEST_WATER_K = 353.15;

/**
 * Pressure of the pipe at the tap, from what the dial shows.
 *     p_tap = p_read + p_atm + ρ g (z_gauge − z_tap)
 * with ρ of cold water where the leg is filled; without a leg the line to the gauge holds steam or air and adds nothing.
 * @param readingPa gauge pressure
 * @returns absolute pressure
 */
export function readingAtTap(
  readingPa: number,
  gauge: Pick<Gauge, 'elevationM' | 'waterLeg'>,
  tapElevationM: number,
  site: SiteConditions,
): number {
  return readingPa + site.atmosphericPressurePa + waterLegPa(gauge, tapElevationM, site);
}

/** What a gauge would show if a pressure stood at its tap: the same rule turned round. */
export function readingExpected(
  tapPressurePa: number,
  gauge: Pick<Gauge, 'elevationM' | 'waterLeg'>,
  tapElevationM: number,
  site: SiteConditions,
): number {
  return tapPressurePa - site.atmosphericPressurePa - waterLegPa(gauge, tapElevationM, site);
}

/** What a filled leg adds at the tap: positive where the gauge stands above it. */
export function waterLegPa(
  { elevationM, waterLeg }: Pick<Gauge, 'elevationM' | 'waterLeg'>,
  tapElevationM: number,
  site: SiteConditions,
): number {
  return waterLeg ? legDensityKgM3(site) * GRAVITY_M_S2 * (elevationM - tapElevationM) : 0;
}

/** Cold water: at the temperature around. What pressure adds to its density, 0.05 % in 10 bar, is left out. */
export function legDensityKgM3({ ambientTemperatureK, atmosphericPressurePa }: SiteConditions): number {
  const temperatureK = Math.min(WARMEST_WATER_K, Math.max(COLDEST_WATER_K, ambientTemperatureK));
  return liquidAtTemperature(Math.max(atmosphericPressurePa, 60_000), temperatureK).densityKgM3;
}

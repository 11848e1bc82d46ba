import { GRAVITY_M_S2 } from '@riseback/hydraulics';
import type { Gauge, SiteConditions } from '@riseback/network';
import { expandedUncertainty, type ExpandedUncertainty, type UncertaintyPart } from './expanded-uncertainty';
import { legDensityKgM3 } from './reading-at-tap';

/** How far a height taken from a drawing may be off, either way (common practice). It matters in a filled leg only. */
export const ELEVATION_LIMIT_M = 0.05;

export type GaugeInstrument = Pick<Gauge, 'rangeLowPa' | 'rangeHighPa' | 'accuracy' | 'resolutionPa' | 'waterLeg'>;

/**
 * U_m of a reading: the gauge's accuracy as a limit on its span, what the dial can be read to, and in a filled leg its height.
 * @returns undefined where the gauge's range or its accuracy is not known: then nothing can be said
 */
export function measurementUncertainty(gauge: GaugeInstrument, site: SiteConditions): ExpandedUncertainty | undefined {
  const limitPa = accuracyLimitPa(gauge);
  if (limitPa === undefined) return undefined;
  return expandedUncertainty([
    { cause: 'accuracy', shape: 'rectangular', limitPa },
    ...resolutionPart(gauge),
    ...legPart(gauge, site),
  ]);
}

/** Accuracy times span. */
export function accuracyLimitPa({ rangeLowPa, rangeHighPa, accuracy }: GaugeInstrument): number | undefined {
  if (rangeLowPa === undefined || rangeHighPa === undefined || accuracy === undefined) return undefined;
  return accuracy * (rangeHighPa - rangeLowPa);
}

/** A dial read to the nearest step is off by half a step at most: u = resolution/√12. */
export function resolutionPart({ resolutionPa = 0 }: GaugeInstrument): UncertaintyPart[] {
  return resolutionPa === 0 ? [] : [{ cause: 'resolution', shape: 'rectangular', limitPa: resolutionPa / 2 }];
}

function legPart({ waterLeg }: GaugeInstrument, site: SiteConditions): UncertaintyPart[] {
  if (!waterLeg) return [];
  return [
    {
      cause: 'elevation',
      shape: 'rectangular',
      limitPa: legDensityKgM3(site) * GRAVITY_M_S2 * ELEVATION_LIMIT_M,
    },
  ];
}

import type { KnownReading } from './kept-items';

/** By gauge the reading that counts: the latest of those that no other replaces. */
export function standingReadings(readings: readonly KnownReading[]): ReadonlyMap<string, KnownReading> {
  const replaced = new Set(readings.flatMap(({ replaces }) => replaces ?? []));
  const standing = readings.filter(({ id }) => !replaced.has(id)).sort((a, b) => a.takenAt.localeCompare(b.takenAt));
  return new Map(standing.map((reading) => [reading.gaugeId, reading]));
}

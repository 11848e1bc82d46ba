import { UNCHANGED_PA } from '@riseback/revisions';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

/** A pressure in the person's unit; a dash where there is none. */
export function pressureWords(pa: number | undefined, units: DisplayUnits): string {
  return pa === undefined ? '–' : formatQuantity(pa, 'pressure', units);
}

/** A change of pressure with its sign; a dash where nothing changes. */
export function changeWords(pa: number | undefined, units: DisplayUnits, decimals = 2): string {
  if (pa === undefined || Math.abs(pa) < UNCHANGED_PA) return '–';
  return `${pa > 0 ? '+' : ''}${formatQuantity(pa, 'pressureDifference', units, { decimals })}`;
}

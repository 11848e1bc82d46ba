import { MOVED_PA, type NetworkComparison, countChanges, type TrapComparison } from '@riseback/revisions';
import { type DisplayUnits, formatQuantity } from '@riseback/units';

/** "8 inputs changed, 12 of 30 traps moved by 0.1 psi or more" */
export function compareSentence(
  comparison: NetworkComparison,
  traps: readonly TrapComparison[],
  units: DisplayUnits,
): string {
  return `${inputSentence(comparison)}, ${movedSentence(traps, units)}`;
}

function inputSentence(comparison: NetworkComparison): string {
  const { inputs, drawingOnly } = countChanges(comparison);
  if (inputs > 0) return `${String(inputs)} ${inputs === 1 ? 'input' : 'inputs'} changed`;
  return drawingOnly > 0 ? 'Only the drawing changed' : 'No input changed';
}

function movedSentence(traps: readonly TrapComparison[], units: DisplayUnits): string {
  const both = traps.filter(({ changePa }) => changePa !== undefined);
  if (both.length === 0) return 'no trap has a result in both';
  const moved = both.filter(({ changePa }) => Math.abs(changePa ?? 0) >= MOVED_PA).length;
  const least = formatQuantity(MOVED_PA, 'pressureDifference', units, { withUnit: true });
  return `${moved === 0 ? 'none' : String(moved)} of ${String(both.length)} ${both.length === 1 ? 'trap' : 'traps'} moved by ${least} or more`;
}

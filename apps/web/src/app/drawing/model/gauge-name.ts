import type { Gauge, NetworkDocument } from '@riseback/network';
import { type DisplayUnits, formatQuantity } from '@riseback/units';
import { nameOf } from '../../shared/element-words';

/** What a screen reader says of a gauge: "PI-3, gauge, on CR-12, 12 ft from its start, 0 to 100 psig, selected". */
export function gaugeName(gauge: Gauge, document: NetworkDocument, selected: boolean, units: DisplayUnits): string {
  return [
    nameOf(gauge),
    'gauge',
    placeWords(gauge, document, units),
    rangeWords(gauge, units),
    gauge.waterLeg ? 'with a water leg' : '',
    gauge.retired ? 'retired' : '',
    selected ? 'selected' : '',
  ]
    .filter((part) => part !== '')
    .join(', ');
}

/** "on CR-12, 12 ft from its start". */
export function placeWords(
  { node, pipe, distanceM = 0 }: Pick<Gauge, 'node' | 'pipe' | 'distanceM'>,
  document: NetworkDocument,
  units: DisplayUnits,
): string {
  const element = document.nodes.get(node ?? '')?.value ?? document.pipes.get(pipe ?? '')?.value;
  const on = `on ${element === undefined ? (node ?? pipe ?? '') : nameOf(element)}`;
  if (pipe === undefined) return on;
  return `${on}, ${formatQuantity(distanceM, 'length', units, { withUnit: true })} from its start`;
}

/** "0 to 100 psig", as it stands on a dial; '' where the range is not known. */
export function rangeWords({ rangeLowPa, rangeHighPa }: Gauge, units: DisplayUnits): string {
  if (rangeLowPa === undefined || rangeHighPa === undefined) return '';
  const high = formatQuantity(rangeHighPa, 'gaugePressure', units, { withUnit: true });
  return `${whole(formatQuantity(rangeLowPa, 'gaugePressure', units))} to ${whole(high)}`;
}

/** A dial ends at whole numbers, and nobody reads their zeros out. */
function whole(text: string): string {
  return text.replace(/\.0+(?=\D|$)/, '');
}

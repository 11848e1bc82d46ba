import type { TrapModel } from '@riseback/network';
import { formatQuantity } from '@riseback/units';
import type { Column, ListContext } from './column';
import { CAPACITY_IN_WORDS } from './sheet-forms';
import { quantityColumn, textColumn } from './column-kinds';

export const TRAP_MODEL_COLUMNS: readonly Column<TrapModel>[] = [
  textColumn<TrapModel>('trapModels', 'name', {
    title: 'Name',
    group: 'element',
    widthPx: 220,
    maxLength: 120,
    optional: false,
  }),
  quantityColumn<TrapModel>('trapModels', 'orificeDiameterM', 'diameter', {
    title: 'Orifice',
    widthPx: 96,
    optional: true,
  }),
  quantityColumn<TrapModel>('trapModels', 'maximumDifferentialPa', 'pressureDifference', {
    title: 'Maximum differential',
    widthPx: 156,
    optional: true,
  }),
  quantityColumn<TrapModel>('trapModels', 'bodyPressurePa', 'pressure', {
    title: 'Body pressure',
    widthPx: 124,
    optional: true,
  }),
  quantityColumn<TrapModel>('trapModels', 'bodyTemperatureK', 'temperature', {
    title: 'Body temperature',
    widthPx: 136,
    optional: true,
  }),
  quantityColumn<TrapModel>('trapModels', 'maximumBackPressureFraction', 'fraction', {
    title: 'Maximum back pressure',
    widthPx: 164,
    optional: true,
  }),
  {
    key: 'capacity',
    title: 'Capacity',
    group: 'inputs',
    widthPx: 260,
    value: ({ capacity }) => capacity?.length,
    show: ({ capacity }, context) => capacityWords(capacity, context),
    editor: { by: 'dialog', dialog: 'capacity' },
    sheet: CAPACITY_IN_WORDS,
  },
  {
    key: 'usedBy',
    title: 'Traps of it',
    group: 'inputs',
    widthPx: 92,
    quantity: 'count',
    derived: () => true,
    value: ({ id }, { document }) => trapsOfModel(id, document),
  },
];

/** How many points, and what the last of them says. */
function capacityWords(capacity: TrapModel['capacity'], { units }: ListContext): string {
  const last = capacity?.at(-1);
  if (capacity === undefined || last === undefined) return '';
  const flow = formatQuantity(last.flowKgS, 'massFlow', units, { withUnit: true });
  const differential = formatQuantity(last.differentialPa, 'pressureDifference', units, { withUnit: true });
  return `${String(capacity.length)} ${capacity.length === 1 ? 'point' : 'points'}, ${flow} at ${differential}`;
}

function trapsOfModel(id: string, document: ListContext['document']): number {
  let count = 0;
  for (const { value } of document.nodes.values()) if (value.kind === 'trap' && value.trapModel === id) count += 1;
  return count;
}

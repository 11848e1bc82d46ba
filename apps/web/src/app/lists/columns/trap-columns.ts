import { CONTROL_WORDS, DISCHARGE_WORDS } from '@riseback/contracts';
import { inOrder, type NetworkNode, setOp, type Trap } from '@riseback/network';
import { bandNumbers } from '@riseback/figures';
import type { Choice, Column, ListContext } from './column';
import { choiceColumn, keySet, quantityColumn, resultColumn, textColumn } from './column-kinds';
import { SERVICE_IN_WORDS } from './sheet-forms';
import { caseColumn, distinct, elevationColumn, findingColumn, nameColumns, noteColumn } from './shared-columns';
import { TRAP_TYPE_WORDS } from '../../shared/element-words';

export const TRAP_COLUMNS: readonly Column<Trap>[] = [
  ...nameColumns<Trap>('nodes'),
  choiceColumn<Trap, string>('nodes', 'trapType', TRAP_TYPE_WORDS, {
    title: 'Type',
    group: 'element',
    widthPx: 130,
    none: 'Not given',
  }),
  trapModelColumn(),
  quantityColumn<Trap>('nodes', 'inletPressurePa', 'pressure', { title: 'Inlet', widthPx: 72 }),
  quantityColumn<Trap>('nodes', 'loadKgS', 'massFlow', { title: 'Load', widthPx: 72 }),
  quantityColumn<Trap>('nodes', 'sizingFactor', 'factor', { title: 'Sizing factor', widthPx: 90, optional: true }),
  elevationColumn(),
  {
    key: 'service',
    title: 'Service',
    group: 'inputs',
    widthPx: 86,
    value: ({ service }) => (service.kind === 'constant' ? 'Constant' : 'Modulating'),
    editor: { by: 'dialog', dialog: 'service' },
    sheet: SERVICE_IN_WORDS,
  },
  ...modulatingColumns(),
  quantityColumn<Trap>('nodes', 'subcoolingK', 'temperatureDifference', {
    title: 'Subcooling',
    widthPx: 92,
    optional: true,
    minor: true,
  }),
  choiceColumn<Trap, string>('nodes', 'discharge', DISCHARGE_WORDS, {
    title: 'Discharge',
    widthPx: 100,
    minor: true,
  }),
  quantityColumn<Trap>('nodes', 'peakFactor', 'factor', {
    title: 'Peak factor',
    widthPx: 84,
    optional: true,
    minor: true,
  }),
  textColumn<Trap>('nodes', 'batch', {
    title: 'Batch',
    widthPx: 92,
    maxLength: 64,
    minor: true,
    suggestions: ({ document }) =>
      distinct([...document.nodes.values()].map(({ value }) => (value.kind === 'trap' ? value.batch : undefined))),
  }),
  quantityColumn<Trap>('nodes', 'maximumPressurePa', 'pressure', {
    title: 'Safety valve',
    widthPx: 104,
    optional: true,
    minor: true,
  }),
  quantityColumn<Trap>('nodes', 'loadTolerance', 'fraction', {
    title: 'Load tolerance',
    widthPx: 104,
    optional: true,
    minor: true,
  }),
  noteColumn('nodes'),
  {
    key: 'staff',
    title: 'Staff',
    group: 'result',
    widthPx: 150,
    quantity: 'pressure',
    face: 'staff',
    value: ({ id }, { traps }) => traps.get(id)?.backPressurePa,
    // the staff says itself what it shows
    show: () => '',
  },
  resultColumn<Trap>(
    'backPressurePa',
    'pressure',
    { title: 'Back', widthPx: 70 },
    ({ id }, { traps }) => traps.get(id)?.backPressurePa,
  ),
  resultColumn<Trap>(
    'differentialPa',
    'pressureDifference',
    { title: 'Differential', widthPx: 96 },
    ({ id }, { traps }) => traps.get(id)?.differentialPa,
  ),
  caseColumn<Trap>(),
  findingColumn<Trap>(
    { title: 'Verdict', widthPx: 236 },
    ({ id }, { traps }) => (traps.get(id)?.checks.length ?? 0) > 0,
  ),
  // after the verdict, which must be in sight on a usual screen
  bandColumn('credible', 'Credible'),
  bandColumn('spread', 'Spread'),
];

/** Between what the methods put the back pressure; sorted by the upper end, which is what may turn a verdict. */
function bandColumn(key: 'credible' | 'spread', title: string): Column<Trap> {
  return {
    key,
    title,
    group: 'result',
    widthPx: 118,
    quantity: 'pressure',
    value: ({ id }, { traps }) => traps.get(id)?.[key]?.highPa,
    show: ({ id }, { traps, units }) => {
      const band = traps.get(id)?.[key];
      return band === undefined ? '' : bandNumbers(band, units);
    },
  };
}

function trapModelColumn(): Column<Trap> {
  const nameOfModel = ({ trapModel }: Trap, { document }: ListContext): string | undefined =>
    trapModel === undefined ? undefined : (document.trapModels.get(trapModel)?.value.name ?? trapModel);
  return {
    key: 'trapModel',
    title: 'Model',
    group: 'element',
    widthPx: 124,
    value: nameOfModel,
    editor: {
      by: 'choice',
      choices: (_, { document }): Choice[] => [
        { value: '', word: 'None' },
        ...inOrder(document.trapModels).map(([value, model]) => ({ value, word: model.value.name })),
      ],
      chosen: ({ trapModel }) => trapModel ?? '',
      propose: (value, { id }, { document }) =>
        keySet(document, 'nodes', id, 'trapModel', value === '' ? undefined : value),
    },
  };
}

/** What only a modulating service has; at a constant one these refuse and say where to begin. */
function modulatingColumns(): Column<Trap>[] {
  const refused = {
    ok: false,
    reason: 'Only a modulating service has this. Open the cell under Service to make it one.',
  } as const;
  const temperature = (key: 'secondaryInletK' | 'secondaryOutletK', title: string): Column<Trap> => {
    const si = ({ service }: Trap): number | undefined => (service.kind === 'modulating' ? service[key] : undefined);
    return {
      key,
      title,
      group: 'inputs',
      widthPx: 104,
      quantity: 'temperature',
      minor: true,
      value: si,
      editor: {
        by: 'quantity',
        quantity: 'temperature',
        optional: false,
        si,
        propose: (to, { id, service }, { document }) =>
          service.kind === 'modulating'
            ? { ok: true, ops: [setOp(document, 'nodes', id, 'service', { ...service, [key]: to })] }
            : refused,
      },
    };
  };
  return [
    {
      key: 'control',
      title: 'Control',
      group: 'inputs',
      widthPx: 110,
      minor: true,
      value: ({ service }) => (service.kind === 'modulating' ? CONTROL_WORDS[service.control] : undefined),
      editor: {
        by: 'choice',
        choices: () => Object.entries(CONTROL_WORDS).map(([value, word]) => ({ value, word })),
        chosen: ({ service }) => (service.kind === 'modulating' ? service.control : ''),
        propose: (control, { id, service }, { document }) =>
          service.kind === 'modulating'
            ? { ok: true, ops: [setOp(document, 'nodes', id, 'service', { ...service, control })] }
            : refused,
      },
    },
    temperature('secondaryInletK', 'Heated from'),
    temperature('secondaryOutletK', 'Heated to'),
  ];
}

export function isTrap(node: NetworkNode): node is Trap {
  return node.kind === 'trap';
}

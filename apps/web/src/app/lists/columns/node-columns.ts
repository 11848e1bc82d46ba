import { type FlashVessel, type Junction, type PumpedInlet, type Receiver, setOp } from '@riseback/network';
import type { Column, Proposal } from './column';
import { quantityColumn, resultColumn } from './column-kinds';
import { caseColumn, elevationColumn, findingColumn, nameColumns, noteColumn } from './shared-columns';

type ListedNode = Junction | FlashVessel | Receiver | PumpedInlet;
export type Vessel = FlashVessel | Receiver;

const VESSEL_WORDS: Readonly<Record<Vessel['kind'], string>> = { receiver: 'Receiver', flashVessel: 'Flash vessel' };

export function vesselKind(text: string): Vessel['kind'] | undefined {
  const written = text.trim().toLowerCase().replace(/\s/g, '');
  return written === 'receiver' ? 'receiver' : written === 'flashvessel' ? 'flashVessel' : undefined;
}

export const JUNCTION_COLUMNS: readonly Column<Junction>[] = [
  ...nameColumns<Junction>('nodes'),
  elevationColumn(),
  noteColumn('nodes'),
  ...stateColumns<Junction>(),
  caseColumn(),
  findingColumn({ title: 'Finding', widthPx: 200 }, () => false),
];

export const PUMPED_INLET_COLUMNS: readonly Column<PumpedInlet>[] = [
  ...nameColumns<PumpedInlet>('nodes'),
  elevationColumn(),
  quantityColumn<PumpedInlet>('nodes', 'flowKgS', 'massFlow', { title: 'Flow', widthPx: 96 }),
  quantityColumn<PumpedInlet>('nodes', 'temperatureK', 'temperature', { title: 'Temperature', widthPx: 104 }),
  quantityColumn<PumpedInlet>('nodes', 'peakFactor', 'factor', { title: 'Peak factor', widthPx: 92, optional: true }),
  quantityColumn<PumpedInlet>('nodes', 'availablePressurePa', 'pressure', {
    title: 'Available',
    widthPx: 104,
    optional: true,
  }),
  noteColumn('nodes'),
  ...stateColumns<PumpedInlet>(),
  caseColumn(),
  findingColumn({ title: 'Finding', widthPx: 200 }, () => false),
];

export const VESSEL_COLUMNS: readonly Column<Vessel>[] = [
  ...nameColumns<Vessel>('nodes'),
  {
    key: 'kind',
    title: 'Kind',
    group: 'element',
    widthPx: 110,
    value: ({ kind }) => VESSEL_WORDS[kind],
    sheet: {
      write: ({ kind }) => VESSEL_WORDS[kind],
      read: (text, { kind }) => {
        const named = vesselKind(text);
        if (named === kind) return { ok: true, ops: [] };
        return {
          ok: false,
          reason:
            named === undefined
              ? `The kind is ${VESSEL_WORDS.receiver} or ${VESSEL_WORDS.flashVessel}.`
              : 'A vessel never changes its kind. Delete it and add another.',
        };
      },
    },
  },
  elevationColumn(),
  {
    key: 'pressurePa',
    title: 'Pressure',
    group: 'inputs',
    widthPx: 96,
    quantity: 'pressure',
    value: ({ pressurePa }) => pressurePa,
    editor: {
      by: 'quantity',
      quantity: 'pressure',
      optional: true,
      si: ({ pressurePa }) => pressurePa,
      propose: (pressurePa, vessel, { document }) => pressureSet(pressurePa, vessel, document),
    },
  },
  {
    key: 'vented',
    title: 'Vented',
    group: 'inputs',
    widthPx: 84,
    value: (vessel) => (isVented(vessel) ? 'Yes' : 'No'),
    editor: {
      by: 'choice',
      choices: () => [
        { value: 'yes', word: 'Yes' },
        { value: 'no', word: 'No' },
      ],
      chosen: (vessel) => (isVented(vessel) ? 'yes' : 'no'),
      propose: (value, vessel, { document }) => ventedSet(value === 'yes', vessel, document),
    },
  },
  noteColumn('nodes'),
  ...stateColumns<Vessel>(),
  caseColumn(),
  findingColumn({ title: 'Finding', widthPx: 200 }, () => false),
];

/** What the solve says of a node: pressure, temperature, share of flash steam, flow through it. */
function stateColumns<E extends ListedNode>(): Column<E>[] {
  return [
    resultColumn<ListedNode>(
      'resultPressurePa',
      'pressure',
      { title: 'Pressure', widthPx: 104 },
      ({ id }, { nodes }) => nodes.get(id)?.pressurePa,
    ),
    resultColumn<ListedNode>(
      'resultTemperatureK',
      'temperature',
      { title: 'Temperature', widthPx: 110 },
      ({ id }, { nodes }) => nodes.get(id)?.temperatureK,
    ),
    resultColumn<ListedNode>(
      'quality',
      'quality',
      { title: 'Flash steam', widthPx: 104 },
      // a negative quality is a subcooled liquid: no flash steam at all
      ({ id }, { nodes }) => atLeastZero(nodes.get(id)?.quality),
    ),
    resultColumn<ListedNode>(
      'massFlowKgS',
      'massFlow',
      { title: 'Flow', widthPx: 96 },
      ({ id }, { nodes }) => nodes.get(id)?.massFlowKgS,
    ),
  ];
}

function isVented(vessel: Vessel): boolean {
  return vessel.kind === 'receiver' && vessel.vented === true;
}

/** A receiver has a pressure or is vented, never both, so one follows the other in the same batch. */
function pressureSet(pressurePa: number | undefined, vessel: Vessel, document: Parameters<typeof setOp>[0]): Proposal {
  if (vessel.kind === 'flashVessel') {
    return pressurePa === undefined
      ? { ok: false, reason: 'A flash vessel always has a pressure.' }
      : { ok: true, ops: [setOp(document, 'nodes', vessel.id, 'pressurePa', pressurePa)] };
  }
  return {
    ok: true,
    ops: [
      setOp(document, 'nodes', vessel.id, 'pressurePa', pressurePa),
      setOp(document, 'nodes', vessel.id, 'vented', pressurePa === undefined ? true : undefined),
    ],
  };
}

function ventedSet(vented: boolean, vessel: Vessel, document: Parameters<typeof setOp>[0]): Proposal {
  if (vessel.kind === 'flashVessel') {
    return vented
      ? { ok: false, reason: 'Only a receiver can be vented; give the flash vessel its pressure.' }
      : { ok: true, ops: [] };
  }
  if (vented === isVented(vessel)) return { ok: true, ops: [] };
  // what stands in a vented receiver is the atmosphere, so closing its vent changes no result until a pressure is typed
  return pressureSet(vented ? undefined : document.site.atmosphericPressurePa, vessel, document);
}

function atLeastZero(value: number | undefined): number | undefined {
  return value === undefined ? undefined : Math.max(0, value);
}

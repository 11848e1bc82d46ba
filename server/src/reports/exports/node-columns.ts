import { CONTROL_WORDS, DISCHARGE_WORDS, TRAP_TYPE_WORDS } from '@riseback/contracts';
import type { FlashVessel, Junction, NetworkNode, PipeRun, PumpedInlet, Receiver, Trap } from '@riseback/network';
import type { ReportColumn } from './report-table';
import type { TableSource } from './table-source';

type Vessel = Receiver | FlashVessel;

/** Whatever the list, a row is found again by its id. */
export const ID_TITLE = 'Id';

export function trapColumns({ file }: TableSource): ReportColumn<Trap>[] {
  const models = new Map(file.trapModels.map(({ id, name }) => [id, name]));
  return [
    ...nameColumns(),
    { title: 'Type', value: ({ trapType }) => (trapType === undefined ? undefined : TRAP_TYPE_WORDS[trapType]) },
    {
      title: 'Model',
      value: ({ trapModel }) => (trapModel === undefined ? undefined : (models.get(trapModel) ?? trapModel)),
    },
    { title: 'Inlet', quantity: 'pressure', value: ({ inletPressurePa }) => inletPressurePa },
    { title: 'Load', quantity: 'massFlow', value: ({ loadKgS }) => loadKgS },
    { title: 'Sizing factor', quantity: 'factor', value: ({ sizingFactor }) => sizingFactor },
    elevationColumn(),
    { title: 'Service', value: ({ service }) => (service.kind === 'constant' ? 'Constant' : 'Modulating') },
    {
      title: 'Control',
      value: ({ service }) => (service.kind === 'modulating' ? CONTROL_WORDS[service.control] : undefined),
    },
    heatedColumn('Heated from', 'secondaryInletK'),
    heatedColumn('Heated to', 'secondaryOutletK'),
    { title: 'Subcooling', quantity: 'temperatureDifference', value: ({ subcoolingK }) => subcoolingK },
    { title: 'Discharge', value: ({ discharge }) => DISCHARGE_WORDS[discharge] },
    { title: 'Peak factor', quantity: 'factor', value: ({ peakFactor }) => peakFactor },
    { title: 'Batch', value: ({ batch }) => batch },
    { title: 'Safety valve', quantity: 'pressure', value: ({ maximumPressurePa }) => maximumPressurePa },
    { title: 'Load tolerance', quantity: 'fraction', value: ({ loadTolerance }) => loadTolerance },
    noteColumn(),
    idColumn(),
  ];
}

export function junctionColumns(): ReportColumn<Junction>[] {
  return [...nameColumns(), elevationColumn(), noteColumn(), idColumn()];
}

export function vesselColumns(): ReportColumn<Vessel>[] {
  return [
    ...nameColumns(),
    { title: 'Kind', value: ({ kind }) => (kind === 'receiver' ? 'Receiver' : 'Flash vessel') },
    elevationColumn(),
    { title: 'Pressure', quantity: 'pressure', value: ({ pressurePa }) => pressurePa },
    { title: 'Vented', value: (vessel) => (vessel.kind === 'receiver' && vessel.vented === true ? 'Yes' : 'No') },
    noteColumn(),
    idColumn(),
  ];
}

export function pumpedInletColumns(): ReportColumn<PumpedInlet>[] {
  return [
    ...nameColumns(),
    elevationColumn(),
    { title: 'Flow', quantity: 'massFlow', value: ({ flowKgS }) => flowKgS },
    { title: 'Temperature', quantity: 'temperature', value: ({ temperatureK }) => temperatureK },
    { title: 'Peak factor', quantity: 'factor', value: ({ peakFactor }) => peakFactor },
    { title: 'Available', quantity: 'pressure', value: ({ availablePressurePa }) => availablePressurePa },
    noteColumn(),
    idColumn(),
  ];
}

export function nameColumns(): ReportColumn<NetworkNode | PipeRun>[] {
  return [
    { title: 'Tag', value: ({ tag, id }) => tag ?? id },
    { title: 'Area', value: ({ area }) => area },
  ];
}

export function noteColumn(): ReportColumn<NetworkNode | PipeRun> {
  return { title: 'Note', value: ({ note }) => note };
}

export function idColumn(): ReportColumn<{ readonly id: string }> {
  return { title: ID_TITLE, value: ({ id }) => id };
}

function elevationColumn(): ReportColumn<NetworkNode> {
  return { title: 'Elevation', quantity: 'length', value: ({ elevationM }) => elevationM };
}

function heatedColumn(title: string, key: 'secondaryInletK' | 'secondaryOutletK'): ReportColumn<Trap> {
  return {
    title,
    quantity: 'temperature',
    value: ({ service }) => (service.kind === 'modulating' ? service[key] : undefined),
  };
}

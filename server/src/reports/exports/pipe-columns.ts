import { FITTINGS, pipeBore } from '@riseback/hydraulics';
import type { PipeRun } from '@riseback/network';
import { displayUnit, formatForEditing } from '@riseback/units';
import { idColumn, nameColumns, noteColumn } from './node-columns';
import type { ReportColumn } from './report-table';
import { nameOfElement, type TableSource } from './table-source';

export function pipeColumns(source: TableSource): ReportColumn<PipeRun>[] {
  const { nodes, units } = source;
  const exactLength = (metres: number): string =>
    `${formatForEditing(metres, 'length', units)} ${displayUnit('length', units.system)}`;
  return [
    ...nameColumns(),
    { title: 'From', value: ({ from }) => nameOfElement(source, from) },
    { title: 'To', value: ({ to }) => nameOfElement(source, to) },
    { title: 'Length', quantity: 'length', value: ({ lengthM }) => lengthM },
    { title: 'Size', unit: 'in', value: ({ size }) => size?.nps },
    { title: 'Schedule', value: ({ size }) => size?.schedule },
    { title: 'Bore', quantity: 'diameter', value: boreM },
    {
      title: 'Fittings',
      value: ({ fittings }) => fittings.map(({ kind, count }) => `${String(count)} ${FITTINGS[kind].name}`).join('; '),
    },
    { title: 'Loss K', quantity: 'factor', value: ({ lossCoefficient }) => lossCoefficient },
    {
      title: 'Rise',
      quantity: 'length',
      value: ({ from, to }) => {
        const [start, end] = [nodes.get(from), nodes.get(to)];
        return start === undefined || end === undefined ? undefined : end.elevationM - start.elevationM;
      },
    },
    {
      title: 'Route',
      value: ({ route }) =>
        route?.map(({ lengthM, riseM }) => `${exactLength(lengthM)} up ${exactLength(riseM)}`).join('; '),
    },
    { title: 'Roughness', quantity: 'roughness', value: ({ roughnessM }) => roughnessM },
    { title: 'Heat loss', quantity: 'heatLossPerLength', value: ({ heatLossWM }) => heatLossWM },
    { title: 'Check valve', value: ({ checkValve }) => (checkValve ? 'Yes' : 'No') },
    noteColumn(),
    idColumn(),
  ];
}

function boreM({ size, insideDiameterM }: PipeRun): number | undefined {
  return insideDiameterM ?? (size === undefined ? undefined : pipeBore(size)?.insideDiameterM);
}

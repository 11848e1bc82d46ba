import { FITTINGS, pipeBore } from '@riseback/hydraulics';
import type { PipeRun } from '@riseback/network';
import { idColumn, nameColumns, noteColumn } from './node-columns';
import { asPrinted, exactly, type ReportColumn, type Tell } from './report-table';
import { nameOfElement, type TableSource } from './table-source';

export function pipeColumns(source: TableSource): ReportColumn<PipeRun>[] {
  const { nodes, units } = source;
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
        route === undefined
          ? undefined
          : { text: listedRoute(route, exactly(units)), printed: printedRoute(route, asPrinted(units)) },
    },
    { title: 'Roughness', quantity: 'roughness', value: ({ roughnessM }) => roughnessM },
    { title: 'Heat loss', quantity: 'heatLossPerLength', value: ({ heatLossWM }) => heatLossWM },
    { title: 'Check valve', value: ({ checkValve }) => (checkValve ? 'Yes' : 'No') },
    noteColumn(),
    idColumn(),
  ];
}

type Route = NonNullable<PipeRun['route']>;

/** As the list takes it in again: "90 ft up 0 ft; 4 ft up -4 ft". */
function listedRoute(route: Route, tell: Tell): string {
  return route.map(({ lengthM, riseM }) => `${tell(lengthM, 'length')} up ${tell(riseM, 'length')}`).join('; ');
}

/** "90 ft level; 4 ft down 4 ft" */
function printedRoute(route: Route, tell: Tell): string {
  const steps = route.map(({ lengthM, riseM }) => {
    const length = tell(lengthM, 'length');
    if (riseM === 0) return `${length} level`;
    return `${length} ${riseM > 0 ? 'up' : 'down'} ${tell(Math.abs(riseM), 'length')}`;
  });
  return steps.join('; ');
}

function boreM({ size, insideDiameterM }: PipeRun): number | undefined {
  return insideDiameterM ?? (size === undefined ? undefined : pipeBore(size)?.insideDiameterM);
}

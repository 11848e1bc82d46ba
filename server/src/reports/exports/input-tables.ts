import type { FlashVessel, Gauge, NetworkFile, NetworkNode, Override, PumpedInlet, Receiver } from '@riseback/network';
import { idColumn, junctionColumns, pumpedInletColumns, trapColumns, vesselColumns } from './node-columns';
import { pipeColumns } from './pipe-columns';
import { asPrinted, exactly, type ReportColumn, type ReportTable, tableOf, type Tell } from './report-table';
import { settingTables } from './setting-tables';
import { nameOfElement, type TableSource } from './table-source';

type TrapModel = NetworkFile['trapModels'][number];
type OperatingCase = NetworkFile['cases'][number];

/** Everything that was put in: the lists of the screen, in the order of the file. */
export function inputTables(source: TableSource): ReportTable[] {
  const { file, units } = source;
  const overrides = file.cases.flatMap((operatingCase) =>
    operatingCase.overrides.map((override) => ({ operatingCase, override })),
  );
  return [
    ...settingTables(source),
    tableOf('Traps', trapColumns(source), nodesOf(file, 'trap'), units),
    tableOf('Pipes', pipeColumns(source), file.pipes, units),
    tableOf('Junctions', junctionColumns(), nodesOf(file, 'junction'), units),
    tableOf('Vessels & receivers', vesselColumns(), file.nodes.filter(isVessel), units),
    tableOf('Pumped inlets', pumpedInletColumns(), file.nodes.filter(isPumpedInlet), units),
    tableOf('Trap models', trapModelColumns(source), file.trapModels, units),
    tableOf('Cases', CASE_COLUMNS, file.cases, units),
    tableOf('Set in a case', overrideColumns(source), overrides, units),
    tableOf('Gauges', gaugeColumns(source), file.gauges, units),
  ];
}

function nodesOf<K extends NetworkNode['kind']>(file: NetworkFile, kind: K): Extract<NetworkNode, { kind: K }>[] {
  return file.nodes.filter((node): node is Extract<NetworkNode, { kind: K }> => node.kind === kind);
}

function isVessel(node: NetworkNode): node is Receiver | FlashVessel {
  return node.kind === 'receiver' || node.kind === 'flashVessel';
}

function isPumpedInlet(node: NetworkNode): node is PumpedInlet {
  return node.kind === 'pumpedInlet';
}

function trapModelColumns({ file, units }: TableSource): ReportColumn<TrapModel>[] {
  const uses = new Map<string, number>();
  for (const node of file.nodes) {
    if (node.kind === 'trap' && node.trapModel !== undefined)
      uses.set(node.trapModel, (uses.get(node.trapModel) ?? 0) + 1);
  }
  return [
    { title: 'Name', value: ({ name }) => name },
    { title: 'Orifice', quantity: 'diameter', value: ({ orificeDiameterM }) => orificeDiameterM },
    {
      title: 'Maximum differential',
      quantity: 'pressureDifference',
      value: ({ maximumDifferentialPa }) => maximumDifferentialPa,
    },
    { title: 'Body pressure', quantity: 'pressure', value: ({ bodyPressurePa }) => bodyPressurePa },
    { title: 'Body temperature', quantity: 'temperature', value: ({ bodyTemperatureK }) => bodyTemperatureK },
    {
      title: 'Maximum back pressure',
      quantity: 'fraction',
      value: ({ maximumBackPressureFraction }) => maximumBackPressureFraction,
    },
    {
      title: 'Capacity',
      value: ({ capacity }) =>
        capacity === undefined
          ? undefined
          : { text: capacityWords(capacity, exactly(units)), printed: capacityWords(capacity, asPrinted(units)) },
    },
    { title: 'Traps of it', quantity: 'count', value: ({ id }) => uses.get(id) ?? 0 },
    idColumn(),
  ];
}

function capacityWords(points: NonNullable<TrapModel['capacity']>, tell: Tell): string {
  return points
    .map(
      ({ differentialPa, flowKgS }) => `${tell(flowKgS, 'massFlow')} at ${tell(differentialPa, 'pressureDifference')}`,
    )
    .join('; ');
}

const CASE_COLUMNS: readonly ReportColumn<OperatingCase>[] = [
  { title: 'Name', value: ({ name }) => name },
  { title: 'Load', quantity: 'fraction', value: ({ loadFactor }) => loadFactor },
  { title: 'Inlet pressure', quantity: 'fraction', value: ({ inletPressureFactor }) => inletPressureFactor },
  { title: 'Elements set', quantity: 'count', value: ({ overrides }) => overrides.length },
  idColumn(),
];

interface CaseOverride {
  readonly operatingCase: OperatingCase;
  readonly override: Override;
}

const STATE_WORDS: Readonly<Record<NonNullable<Override['state']>, string>> = {
  normal: 'Normal',
  isolated: 'Isolated',
  failedOpen: 'Failed open',
};

function overrideColumns(source: TableSource): ReportColumn<CaseOverride>[] {
  return [
    { title: 'Case', value: ({ operatingCase }) => operatingCase.name },
    { title: 'Element', value: ({ override }) => nameOfElement(source, override.node) },
    {
      title: 'State',
      value: ({ override: { state } }) => (state === undefined ? undefined : STATE_WORDS[state]),
    },
    { title: 'Load', quantity: 'massFlow', value: ({ override }) => override.loadKgS },
    { title: 'Inlet', quantity: 'pressure', value: ({ override }) => override.inletPressurePa },
    { title: 'Pressure', quantity: 'pressure', value: ({ override }) => override.pressurePa },
    { title: 'Flow', quantity: 'massFlow', value: ({ override }) => override.flowKgS },
    { title: 'Orifice', quantity: 'diameter', value: ({ override }) => override.orificeDiameterM },
    { title: 'Id', value: ({ operatingCase, override }) => `${operatingCase.id}/${override.node}` },
  ];
}

function gaugeColumns(source: TableSource): ReportColumn<Gauge>[] {
  return [
    { title: 'Tag', value: ({ tag, id }) => tag ?? id },
    { title: 'On', value: ({ node, pipe }) => nameOfElement(source, node ?? pipe ?? '') },
    { title: 'From its start', quantity: 'length', value: ({ distanceM }) => distanceM },
    { title: 'Elevation', quantity: 'length', value: ({ elevationM }) => elevationM },
    { title: 'Water leg', value: ({ waterLeg }) => (waterLeg ? 'Yes' : 'No') },
    { title: 'Range from', quantity: 'gaugePressure', value: ({ rangeLowPa }) => rangeLowPa },
    { title: 'Range to', quantity: 'gaugePressure', value: ({ rangeHighPa }) => rangeHighPa },
    { title: 'Accuracy', quantity: 'fraction', value: ({ accuracy }) => accuracy },
    { title: 'Resolution', quantity: 'pressureDifference', value: ({ resolutionPa }) => resolutionPa },
    { title: 'Calibrated on', value: ({ calibratedOn }) => calibratedOn },
    { title: 'Calibration due', value: ({ calibrationDueOn }) => calibrationDueOn },
    { title: 'Retired', value: ({ retired }) => (retired ? 'Yes' : 'No') },
    idColumn(),
  ];
}

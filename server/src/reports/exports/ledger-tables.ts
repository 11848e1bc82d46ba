import type { SolveResult } from '@riseback/contracts';
import { ledger, type LedgerEntry, liftProfile, type ProfilePoint, type WalkedResult } from '@riseback/solver';
import { plainNumber, quantityCell, type ReportColumn, type ReportTable, tableOf } from './report-table';
import type { SolvedCase } from './solved-cases';
import { nameOfElement, type TableSource } from './table-source';

/** One account that the report holds: a trap in the case that it is told for. */
export interface ToldWay {
  readonly trapId: string;
  readonly solved: SolvedCase & { readonly result: SolveResult };
}

interface LedgerLine extends LedgerEntry {
  readonly way: ToldWay;
  readonly no: number;
}

interface ProfileLine extends ProfilePoint {
  readonly way: ToldWay;
}

/** Accounts from the vessel back to the trap, and height and pressure along the same ways from the trap down. */
export function ledgerTables(source: TableSource, ways: readonly ToldWay[]): ReportTable[] {
  return [ledgerTable(source, ways), profileTable(source, ways)];
}

function ledgerTable(source: TableSource, ways: readonly ToldWay[]): ReportTable {
  const { file, units } = source;
  const name = (id: string) => nameOfElement(source, id);
  const columns: readonly ReportColumn<LedgerLine>[] = [
    { title: 'Trap', value: ({ way }) => name(way.trapId) },
    { title: 'Case', value: ({ way }) => way.solved.name },
    { title: 'No.', quantity: 'count', value: ({ no }) => no },
    { title: 'Element', value: ({ pipeId }) => name(pipeId) },
    { title: 'Bore', quantity: 'diameter', value: ({ insideDiameterM }) => insideDiameterM },
    { title: 'Length', quantity: 'length', value: ({ lengthM }) => lengthM },
    { title: 'Rise', quantity: 'length', value: ({ riseM }) => riseM },
    { title: 'Fall', quantity: 'length', value: ({ fallM }) => fallM },
    { title: 'Flow', quantity: 'massFlow', value: ({ massFlowKgS }) => massFlowKgS },
    { title: 'Flash steam', quantity: 'quality', value: ({ quality }) => Math.max(0, quality) },
    { title: 'Static', quantity: 'pressureDifference', value: ({ staticPa }) => staticPa },
    { title: 'Friction', quantity: 'pressureDifference', value: ({ frictionPa }) => frictionPa },
    { title: 'Flash', quantity: 'pressureDifference', value: ({ flashPa }) => flashPa },
    { title: 'Running', quantity: 'pressure', value: ({ runningPressurePa }) => runningPressurePa },
    { title: 'Hand check adds', quantity: 'pressureDifference', value: ({ handCheckPa }) => handCheckPa },
    { title: 'Hand check running', quantity: 'pressure', value: ({ handCheckRunningPa }) => handCheckRunningPa },
  ];
  const blank = (titles: Readonly<Record<string, ReturnType<typeof plainNumber> | string>>) =>
    columns.map(({ title }) => titles[title]);
  const rows = ways.flatMap((way) => {
    const { result, name: caseName } = way.solved;
    const trap = result.traps.find(({ id }) => id === way.trapId);
    if (trap === undefined) return [];
    const lines = ledger(file, walked(result), way.trapId).map((entry, i): LedgerLine => ({
      ...entry,
      way,
      no: i + 1,
    }));
    const opening = quantityCell(trap.receiverPressurePa, 'pressure', units);
    return [
      blank({
        Trap: name(way.trapId),
        Case: caseName,
        'No.': plainNumber(0),
        Element: 'Opening: where the way ends',
        Running: opening,
        'Hand check running': opening,
      }),
      ...tableOf('', columns, lines, units).rows,
    ];
  });
  return { ...tableOf('Ledgers', columns, [], units), rows };
}

function profileTable(source: TableSource, ways: readonly ToldWay[]): ReportTable {
  const lines = ways.flatMap((way) =>
    liftProfile(source.file, walked(way.solved.result), way.trapId).map((point): ProfileLine => ({ ...point, way })),
  );
  const columns: readonly ReportColumn<ProfileLine>[] = [
    { title: 'Trap', value: ({ way }) => nameOfElement(source, way.trapId) },
    { title: 'Case', value: ({ way }) => way.solved.name },
    { title: 'Element', value: ({ pipeId }) => nameOfElement(source, pipeId) },
    { title: 'From the trap', quantity: 'length', value: ({ distanceM }) => distanceM },
    { title: 'Elevation', quantity: 'length', value: ({ elevationM }) => elevationM },
    { title: 'Pressure', quantity: 'pressure', value: ({ pressurePa }) => pressurePa },
  ];
  return tableOf('Lift profiles', columns, lines, source.units);
}

/** The same result with absent keys absent, as the solver's own type has them. */
function walked({ nodes, traps, pipes }: SolveResult): WalkedResult {
  return {
    nodes,
    traps,
    pipes: pipes.map(({ flowPattern, choked = false, outletPressurePa, ...pipe }) => ({
      ...pipe,
      choked,
      ...(flowPattern === undefined ? {} : { flowPattern }),
      ...(outletPressurePa === undefined ? {} : { outletPressurePa }),
    })),
  };
}

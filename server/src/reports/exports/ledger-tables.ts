import type { SolveResult, TrapResult } from '@riseback/contracts';
import { ledgerModel, type LedgerModel, valueOf } from '@riseback/figures';
import { fromFile } from '@riseback/network';
import { ledger, liftProfile, type ProfilePoint, type WalkedResult } from '@riseback/solver';
import { displayUnit } from '@riseback/units';
import {
  decimalsOf,
  plainNumber,
  type ReportColumn,
  type ReportTable,
  type TableCell,
  type TableColumn,
  tableOf,
} from './report-table';
import type { SolvedCase } from './solved-cases';
import { nameOfElement, type TableSource } from './table-source';

/** One account that the report holds: a trap in the case that it is told for. */
export interface ToldWay {
  readonly trapId: string;
  readonly solved: SolvedCase & { readonly result: SolveResult };
}

interface ProfileLine extends ProfilePoint {
  readonly way: ToldWay;
}

/** Accounts from the vessel back to the trap, and height and pressure along the same ways from the trap down. */
export function ledgerTables(source: TableSource, ways: readonly ToldWay[]): ReportTable[] {
  return [ledgerTable(source, ways), profileTable(source, ways)];
}

function ledgerTable(source: TableSource, ways: readonly ToldWay[]): ReportTable {
  const document = fromFile(source.file);
  const rows = ways.flatMap((way) => {
    const trap = way.solved.traps.get(way.trapId);
    if (trap === undefined) return [];
    const entries = ledger(source.file, walked(way.solved.result), way.trapId);
    const account = ledgerModel(entries, trap, document, source.units);
    const head = [nameOfElement(source, way.trapId), way.solved.name];
    return accountRows(account, endName(source, trap)).map((cells) => [...head, ...cells]);
  });
  return { name: 'Ledgers', columns: ledgerColumns(source), rows };
}

function ledgerColumns({ units: { system } }: TableSource): TableColumn[] {
  const length = displayUnit('length', system);
  const adds = displayUnit('pressureDifference', system);
  const running = displayUnit('pressure', system);
  return [
    ...['Trap', 'Case', 'No.', 'Element', 'Place', 'Bore'].map((title) => ({ title, unit: '' })),
    ...['Length', 'Rise', 'Fall'].map((title) => ({ title, unit: length })),
    { title: 'Flow', unit: displayUnit('massFlow', system) },
    { title: 'Flash steam', unit: displayUnit('quality', system) },
    ...['Static', 'Friction', 'Flash'].map((title) => ({ title, unit: adds })),
    { title: 'Running', unit: running },
    { title: 'Hand check adds', unit: adds },
    { title: 'Hand check running', unit: running },
  ];
}

/** Rounded as the account is printed, so that every column adds up to its closing line as it does on paper. */
function accountRows({ opening, rows, closing }: LedgerModel, end: string): TableCell[][] {
  const nothing = (count: number): undefined[] => Array.from({ length: count }, () => undefined);
  return [
    [undefined, end, 'Opening', ...nothing(9), printed(opening), undefined, printed(opening)],
    ...rows.map((row): TableCell[] => [
      plainNumber(row.no),
      row.element,
      row.place === '' ? undefined : row.place,
      row.bore,
      ...[row.length, row.up, row.down, row.flow, row.flash, row.static, row.friction, row.flashSteam].map(printed),
      ...[row.running, row.handAdds, row.handRunning].map(printed),
    ]),
    [
      ...nothing(2),
      'Back pressure',
      undefined,
      ...[closing.length, closing.up, closing.down].map(printed),
      ...nothing(2),
      ...[closing.static, closing.friction, closing.flashSteam].map(printed),
      ...[closing.running, closing.handAdds, closing.handRunning].map(printed),
    ],
  ];
}

function printed(number: string): TableCell {
  return /\d/.test(number) ? { number: valueOf(number), decimals: decimalsOf(number) } : undefined;
}

/** The node that the last pipe of the walk runs into, whichever way its arrow points. */
function endOfWalk({ pipes, nodes }: TableSource, { walk }: TrapResult): string {
  const last = pipes.get(walk.at(-1) ?? '');
  if (last === undefined) return '';
  const isEnd = (id: string) => ['receiver', 'flashVessel'].includes(nodes.get(id)?.kind ?? '');
  return isEnd(last.to) ? last.to : last.from;
}

function endName(source: TableSource, trap: TrapResult): string {
  return nameOfElement(source, endOfWalk(source, trap));
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

import { ID_TITLE } from './node-columns';
import { exactText, heading, type ReportColumn, type ReportTable, type TableCell, tableOf } from './report-table';
import { trapVerdict } from './result-tables';
import { type SolvedCase, solvedCases } from './solved-cases';
import { nameOfElement, type TableSource } from './table-source';

/** What changed since the revision before, in the same words and units as the lists. */
export function comparisonTables(
  before: { readonly source: TableSource; readonly inputs: readonly ReportTable[] },
  after: {
    readonly source: TableSource;
    readonly inputs: readonly ReportTable[];
    readonly cases: readonly SolvedCase[];
  },
): ReportTable[] {
  return [
    changedInputs(before.inputs, after.inputs),
    changedResults(before.source, solvedCases(before.source), after.source, after.cases),
  ];
}

function changedInputs(before: readonly ReportTable[], after: readonly ReportTable[]): ReportTable {
  const rows = after.flatMap((table, index) => changesIn(before[index]?.rows ?? [], table));
  return {
    name: 'Changed inputs',
    columns: ['List', 'Element', 'What', 'Property', 'Before', 'After'].map((title) => ({ title, unit: '' })),
    rows: rows.length === 0 ? [['Nothing changed', ...Array.from({ length: 5 }, () => undefined)]] : rows,
  };
}

function changesIn(before: ReportTable['rows'], { name, columns, rows }: ReportTable): TableCell[][] {
  const idAt = columns.findIndex(({ title }) => title === ID_TITLE);
  // settings have no ids: their first two cells say what they are of
  const idOf = (row: readonly TableCell[]): string =>
    textOf(idAt < 0 ? row.slice(0, name === 'Limits' ? 2 : 1) : [row[idAt]]);
  const labelOf = (row: readonly TableCell[]): TableCell =>
    name === 'Limits' ? textOf(row.slice(0, 2), ': ') : row[0];
  const old = new Map(before.map((row) => [idOf(row), row]));
  const kept = new Set(rows.map(idOf));
  return [
    ...before
      .filter((row) => !kept.has(idOf(row)))
      .map((row) => [name, labelOf(row), 'Removed', undefined, undefined, undefined]),
    ...rows.flatMap((row) => {
      const was = old.get(idOf(row));
      if (was === undefined) return [[name, labelOf(row), 'Added', undefined, undefined, undefined]];
      return columns.flatMap((column, i) =>
        COUNTED.has(column.title) || sameCell(was[i], row[i])
          ? []
          : [[name, labelOf(row), 'Changed', heading(column), was[i], row[i]]],
      );
    }),
  ];
}

/** What follows from other rows that changed, and is told there. */
const COUNTED = new Set(['Rise', 'Traps of it', 'Elements set']);

function sameCell(a: TableCell, b: TableCell): boolean {
  return exactText(a) === exactText(b);
}

function textOf(cells: readonly TableCell[], between = '/'): string {
  return cells.map(exactText).join(between);
}

interface ChangedTrap {
  readonly caseName: string;
  readonly trapId: string;
  readonly name: string;
  readonly beforePa: number | undefined;
  readonly afterPa: number | undefined;
  readonly verdictBefore: string | undefined;
  readonly verdictAfter: string | undefined;
}

/** Every trap in every case that both have, the greatest effect first. */
function changedResults(
  sourceBefore: TableSource,
  casesBefore: readonly SolvedCase[],
  source: TableSource,
  cases: readonly SolvedCase[],
): ReportTable {
  const was = new Map(casesBefore.map((solved) => [solved.caseId, solved]));
  const rows = cases.flatMap((solved) => {
    const before = was.get(solved.caseId);
    const ids = new Set([...solved.traps.keys(), ...(before?.traps.keys() ?? [])]);
    return [...ids].map((trapId): ChangedTrap => ({
      caseName: solved.name,
      trapId,
      name: nameOfElement(source.nodes.has(trapId) ? source : sourceBefore, trapId),
      beforePa: before?.traps.get(trapId)?.backPressurePa,
      afterPa: solved.traps.get(trapId)?.backPressurePa,
      verdictBefore: before === undefined ? undefined : trapVerdict(before, trapId),
      verdictAfter: trapVerdict(solved, trapId),
    }));
  });
  return tableOf(
    'Changed results',
    CHANGED_COLUMNS,
    rows.sort((a, b) => effectPa(b) - effectPa(a)),
    source.units,
  );
}

/** A trap that came or went stands before those that only changed. */
function effectPa({ beforePa, afterPa }: ChangedTrap): number {
  return beforePa === undefined || afterPa === undefined ? Number.MAX_VALUE : Math.abs(afterPa - beforePa);
}

const CHANGED_COLUMNS: readonly ReportColumn<ChangedTrap>[] = [
  { title: 'Case', value: ({ caseName }) => caseName },
  { title: 'Trap', value: ({ name }) => name },
  { title: 'Back before', quantity: 'pressure', value: ({ beforePa }) => beforePa },
  { title: 'Back after', quantity: 'pressure', value: ({ afterPa }) => afterPa },
  {
    title: 'Change',
    quantity: 'pressureDifference',
    value: ({ beforePa, afterPa }) =>
      beforePa === undefined || afterPa === undefined ? undefined : afterPa - beforePa,
  },
  { title: 'Verdict before', value: ({ verdictBefore }) => verdictBefore },
  { title: 'Verdict after', value: ({ verdictAfter }) => verdictAfter },
  { title: 'Id', value: ({ trapId }) => trapId },
];

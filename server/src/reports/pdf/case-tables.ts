import type { ReportTable, TableCell } from '../exports/report-table';

/** What many traps have alike stands once, with the traps that it is of, instead of in a column of its own. */
const SAID_ONCE = 'Not checked';

/** Tables over all cases, case by case: one after another of each, so that what belongs together stands together. */
export function byCase(tables: readonly ReportTable[]): ReportTable[] {
  const cases = new Set(tables.flatMap(({ rows }) => rows.map(([name]) => textOf(name))));
  return [...cases].flatMap((name) => tables.flatMap((table) => ofCase(table, name)));
}

function ofCase(table: ReportTable, name: string): ReportTable[] {
  const rows = table.rows.filter(([first]) => textOf(first) === name);
  const once = table.columns.findIndex(({ title }) => title === SAID_ONCE);
  const without = <T>(list: readonly T[]) => list.filter((_, i) => i !== 0 && i !== once);
  return [
    { name: `${table.name}: ${name}`, columns: without(table.columns), rows: rows.map(without) },
    ...(once < 0 ? [] : [saidOnce(name, rows, once)]),
  ];
}

function saidOnce(name: string, rows: ReportTable['rows'], column: number): ReportTable {
  const ofText = new Map<string, string[]>();
  for (const row of rows) {
    const text = textOf(row[column]);
    if (text !== '') ofText.set(text, [...(ofText.get(text) ?? []), textOf(row[1])]);
  }
  return {
    name: `${SAID_ONCE}: ${name}`,
    columns: ['What was not judged, and why', 'Traps'].map((title) => ({ title, unit: '' })),
    rows: [...ofText].map(([text, traps]) => [text, traps.join(', ')]),
  };
}

function textOf(cell: TableCell): string {
  return typeof cell === 'string' ? cell : '';
}

import type { ReportTable, TableCell } from '../exports/report-table';

/** Tables over all cases, case by case: one after another of each, so that what belongs together stands together. */
export function byCase(tables: readonly ReportTable[]): ReportTable[] {
  const cases = new Set(tables.flatMap(({ rows }) => rows.map(([name]) => textOf(name))));
  return [...cases].flatMap((name) =>
    tables.map((table) => ({
      name: `${table.name}: ${name}`,
      columns: table.columns.slice(1),
      rows: table.rows.filter(([first]) => textOf(first) === name).map((row) => row.slice(1)),
    })),
  );
}

function textOf(cell: TableCell): string {
  return typeof cell === 'string' ? cell : '';
}

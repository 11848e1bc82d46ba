import type { ReportTable, TableCell } from '../exports/report-table';
import { cellText } from './table-columns';

/**
 * Rows that say the same of several elements, said once with the elements beside it: on paper ten traps with one trouble are one trouble.
 * Rows are told apart by what is printed of them; the columns named in `apart` do not count.
 * @param of the column that holds the element
 */
export function sharedRows(table: ReportTable, of: string, apart: readonly string[]): ReportTable {
  const at = table.columns.findIndex(({ title }) => title === of);
  const compared = table.columns.map(({ title }) => title !== of && !apart.includes(title));
  const shared = new Map<string, { readonly row: readonly TableCell[]; readonly elements: string[] }>();
  for (const row of table.rows) {
    const key = JSON.stringify(row.filter((_, i) => compared[i]).map(cellText));
    const before = shared.get(key);
    if (before === undefined) shared.set(key, { row, elements: [cellText(row[at])] });
    else before.elements.push(cellText(row[at]));
  }
  const rows = [...shared.values()].map(({ row, elements }) =>
    row.map((cell, i) => (i === at ? [...new Set(elements)].join(', ') : cell)),
  );
  return { ...table, rows };
}

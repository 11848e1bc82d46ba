import { guarded } from '@riseback/contracts';
import { strToU8, zipSync } from 'fflate';
import type { ReportMaker } from '../report-content';
import { reportStanding } from './report-standing';
import { exactText, heading, isNumber, type ReportTable, type TableCell } from './report-table';
import { reportTables } from './report-tables';

/**
 * A zip of CSV files, one for each table, whose names say the table's place in the report. The first row of each is its headings, so
 * that programs read it as it is; a report that nobody may build on says so in the name of every file.
 */
export const makeCsv: ReportMaker = (content, progress, signal) => {
  progress(0.1, 'Filling the tables');
  const tables = reportTables(content);
  signal.throwIfAborted();
  progress(0.6, 'Packing the files');
  const { provisional } = reportStanding(content);
  const entries = tables.map(
    (table, index) => [fileName(table.name, index, provisional), strToU8(csvOf(table))] as const,
  );
  return Promise.resolve(Buffer.from(zipSync(Object.fromEntries(entries), { mtime: new Date(content.madeAt) })));
};

/** RFC 4180. The mark at the start tells spreadsheets that the text is UTF-8, as in the files that the lists save. */
export function csvOf({ columns, rows }: ReportTable): string {
  const lines = [columns.map(heading), ...rows].map((cells) => cells.map(csvCell).join(','));
  return `\uFEFF${lines.join('\r\n')}\r\n`;
}

function csvCell(cell: TableCell): string {
  if (cell === undefined) return '';
  if (isNumber(cell)) return String(cell.number);
  const text = guarded(exactText(cell));
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

function fileName(table: string, index: number, provisional: boolean): string {
  const plain = table.toLowerCase().replace(/[^a-z0-9]+/g, '-');
  return `${String(index).padStart(2, '0')}-${plain}${provisional ? '-not-approved' : ''}.csv`;
}

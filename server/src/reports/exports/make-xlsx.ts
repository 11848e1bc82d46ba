import { guarded } from '@riseback/contracts';
import writeWorkbook, { type Cell, type Sheet } from 'write-excel-file/node';
import type { ReportMaker } from '../report-content';
import { reportStanding } from './report-standing';
import { exactText, heading, isNumber, type ReportTable, type TableCell } from './report-table';
import { reportTables } from './report-tables';

/** A workbook with a sheet for each table: the state in the first row, headings in the second, numbers as numbers. */
export const makeXlsx: ReportMaker = async (content, progress, signal) => {
  progress(0.1, 'Filling the tables');
  const tables = reportTables(content);
  signal.throwIfAborted();
  progress(0.5, 'Writing the workbook');
  const { words } = reportStanding(content);
  const title = (name: string) => `${content.networkName}. ${name}. ${words}`;
  const sheets = tables.map((table) => sheetOf(table, title(table.name)));
  const workbook = await writeWorkbook(sheets).toBuffer();
  signal.throwIfAborted();
  return workbook;
};

const SHEET_NAME_CHARACTERS = 31;
const WIDTH = { least: 9, most: 60, beside: 2 } as const;
/** Rows that stay in sight: the state and the headings. */
const HEAD_ROWS = 2;

function sheetOf(table: ReportTable, title: string): Sheet<never> {
  const headings = table.columns.map(heading);
  return {
    sheet: sheetName(table.name),
    columns: headings.map((text, i) => ({ width: widthOf(text, table.rows, i) })),
    stickyRowsCount: HEAD_ROWS,
    ...(table.columns.length > 2 ? { stickyColumnsCount: 1 } : {}),
    orientation: 'landscape',
    data: [
      [{ value: safeText(title), type: String, fontWeight: 'bold' }],
      headings.map((text) => ({ value: safeText(text), type: String, fontWeight: 'bold', wrap: true })),
      ...table.rows.map((row) => row.map(sheetCell)),
    ],
  };
}

function sheetCell(cell: TableCell): Cell {
  if (cell === undefined) return null;
  if (!isNumber(cell)) return { value: safeText(exactText(cell)), type: String };
  return { value: cell.number, type: Number, format: NUMBER_FORMATS[cell.decimals] ?? 'General' };
}

/** By decimals: all digits are in the cell, and as many are shown as on the screen. */
const NUMBER_FORMATS = ['#,##0', '#,##0.0', '#,##0.00', '#,##0.000', '#,##0.0000', '#,##0.00000', '#,##0.000000'];

/** No formula, and nothing that XML 1.0 cannot hold. */
function safeText(text: string): string {
  return guarded(text.replace(NOT_XML, ''));
}

const NOT_XML =
  /[\u0000-\u0008\u000B\u000C\u000E-\u001F\uFFFE\uFFFF]|[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/g;

/** Spreadsheets refuse these marks in the name of a sheet, and a 32nd character. */
export function sheetName(name: string): string {
  return name
    .replace(/[\\/?*[\]:']/g, ' ')
    .slice(0, SHEET_NAME_CHARACTERS)
    .trim();
}

function widthOf(title: string, rows: ReportTable['rows'], column: number): number {
  let longest = title.length;
  for (const row of rows) {
    const cell = row[column];
    if (!isNumber(cell)) longest = Math.max(longest, exactText(cell).length);
  }
  return Math.min(WIDTH.most, Math.max(WIDTH.least, longest + WIDTH.beside));
}

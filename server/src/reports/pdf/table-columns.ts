import { isNumber, type ReportTable, type TableCell, type TableColumn } from '../exports/report-table';

/** A column as it will be set. */
export interface SetColumn extends TableColumn {
  /** In the table it comes from. */
  readonly index: number;
  readonly numeric: boolean;
  /** Begins with a verdict, which gets its shape. */
  readonly marked: boolean;
}

export interface SetTable {
  readonly columns: readonly SetColumn[];
  /** What every row has alike, said once: title and text. */
  readonly alike: readonly (readonly [title: string, text: string])[];
}

/** Fewer rows are easier read whole. */
const LEAST_ROWS = 3;
const MARKED = new Set(['Verdict', 'Finding', 'Verdict before', 'Verdict after']);
/** Ids find a row again in a spreadsheet; on paper the tag does. */
const SPREADSHEET_ONLY = new Set(['Id']);

/**
 * The columns worth their room: those that are empty throughout go, and those that say the same in every row are said once above.
 * @param kept columns that stay whatever they hold
 */
export function columnsOf({ columns, rows }: ReportTable, kept: readonly string[]): SetTable {
  const set: SetColumn[] = [];
  const alike: [string, string][] = [];
  columns.forEach((column, index) => {
    const cells = rows.map((row) => row[index]);
    const filled = cells.filter((cell) => cell !== undefined && cell !== '');
    const numeric = filled.length > 0 && filled.every(isNumber);
    const texts = new Set(cells.map(cellText));
    const [only = ''] = texts;
    const shown = { ...column, index, numeric, marked: MARKED.has(column.title) };
    if (kept.includes(column.title)) set.push(shown);
    else if (SPREADSHEET_ONLY.has(column.title) || (texts.size === 1 && only === '')) return;
    else if (texts.size === 1 && rows.length >= LEAST_ROWS) {
      alike.push([column.title, column.unit === '' ? only : `${only} ${column.unit}`]);
    } else set.push(shown);
  });
  return { columns: set, alike };
}

/** '' for nothing. */
export function cellText(cell: TableCell): string {
  if (cell === undefined) return '';
  if (typeof cell === 'string') return cell;
  return isNumber(cell) ? (cell.printed ?? printedNumber(cell.number, cell.decimals)) : cell.printed;
}

function printedNumber(number: number, decimals: number): string {
  const digits = { minimumFractionDigits: decimals, maximumFractionDigits: decimals };
  return number.toLocaleString('en', digits).replace('-', '−');
}

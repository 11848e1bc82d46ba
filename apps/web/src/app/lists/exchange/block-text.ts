import { guarded, unguarded } from '@riseback/contracts';
import { parse, unparse } from 'papaparse';

/** A block as a spreadsheet gives it: rows of cells, every cell a text, blank rows left out. */
export interface Block {
  readonly rows: readonly BlockLine[];
}
export interface BlockLine {
  /** In the pasted text or the sheet, from 1. */
  readonly number: number;
  readonly cells: readonly string[];
}

/** What one import may hold; more than this is another file, or a mistake. */
export const BLOCK_LIMITS = { rows: 5_000, columns: 200, cellCharacters: 10_000 } as const;

export type ReadBlock =
  | { readonly ok: true; readonly block: Block }
  | { readonly ok: false; readonly title: string; readonly detail: string };

export type SheetCell = string | number | undefined;

/** Cells copied in a spreadsheet: tabs between cells, quotes round what holds tabs or line ends. */
export function readCopiedCells(text: string): ReadBlock {
  return readDelimited(text, '\t');
}

/** A CSV file; whether commas, semicolons or tabs part its cells is found out. */
export function readCsv(text: string): ReadBlock {
  return readDelimited(text, delimiterOf(text));
}

export function blockOf(rows: readonly (readonly string[])[]): ReadBlock {
  const lines = rows
    .map((cells, index) => ({ number: index + 1, cells: cells.map(unguarded) }))
    .filter(({ cells }) => cells.some((cell) => cell.trim() !== ''));
  const wrong = tooLarge(lines);
  if (wrong !== undefined) return { ok: false, title: 'Too much for one step', detail: wrong };
  if (lines.length === 0)
    return { ok: false, title: 'There is nothing in it', detail: 'Copy or choose rows with cells.' };
  return { ok: true, block: { rows: lines } };
}

/** Comma-separated, every text safe from being taken for a formula, numbers as they are. */
export function writeCsv(rows: readonly (readonly SheetCell[])[]): string {
  // the mark at the start tells spreadsheets that the text is UTF-8
  return `\uFEFF${unparse(safe(rows), { newline: '\r\n' })}\r\n`;
}

/** As a spreadsheet takes it from the clipboard. */
export function writeCopiedCells(rows: readonly (readonly SheetCell[])[]): string {
  return unparse(safe(rows), { delimiter: '\t', newline: '\n' });
}

function safe(rows: readonly (readonly SheetCell[])[]): (string | number)[][] {
  return rows.map((cells) => cells.map((cell) => (typeof cell === 'string' ? guarded(cell) : (cell ?? ''))));
}

function readDelimited(text: string, delimiter: string): ReadBlock {
  const { data } = parse<string[]>(text.replace(/^\uFEFF/, ''), {
    delimiter,
    // one past the limit, so that going past it shows
    preview: BLOCK_LIMITS.rows + 2,
  });
  return blockOf(data);
}

/** What parts the cells of the first line: with as many commas, which stand before units too, the rarer marks win. Marks within quotes do not count, and cells further down may hold any of them. */
function delimiterOf(text: string): string {
  const [firstLine = ''] = text.replace(/"(?:[^"]|"")*"/g, '').split(/\r\n|\r|\n/, 1);
  const counted = [',', ';', '\t'].map((mark) => ({ mark, count: firstLine.split(mark).length }));
  return counted.reduce((most, each) => (each.count >= most.count ? each : most)).mark;
}

function tooLarge(lines: readonly BlockLine[]): string | undefined {
  // a row of headings comes on top
  if (lines.length > BLOCK_LIMITS.rows + 1)
    return `One step takes ${BLOCK_LIMITS.rows.toLocaleString('en')} rows; take it in parts.`;
  const wide = lines.find(({ cells }) => cells.length > BLOCK_LIMITS.columns);
  if (wide !== undefined)
    return `Row ${String(wide.number)} has ${String(wide.cells.length)} cells; ${String(BLOCK_LIMITS.columns)} are the most.`;
  const long = lines.find(({ cells }) => cells.some((cell) => cell.length > BLOCK_LIMITS.cellCharacters));
  if (long === undefined) return undefined;
  return `A cell in row ${String(long.number)} has more than ${BLOCK_LIMITS.cellCharacters.toLocaleString('en')} characters.`;
}

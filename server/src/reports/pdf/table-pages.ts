import { verdictShapes } from '@riseback/figures';
import type { ReportTable } from '../exports/report-table';
import { columnWidths } from './column-widths';
import { paintShapes } from './figure-painter';
import type { Sheet, TextStyle } from './sheet';
import { cellText, columnsOf, type SetColumn } from './table-columns';

export interface TableOptions {
  readonly title: string;
  /** Said under the title. */
  readonly note?: string;
  /** Columns that stay though they are empty or alike. */
  readonly kept?: readonly string[];
  /** Columns that wrap before others do, so that sentences have the room. */
  readonly narrow?: readonly string[];
  /** What is said instead where there are no rows. */
  readonly none?: string;
}

interface SetCell {
  readonly lines: readonly string[];
  readonly verdict: Verdict | undefined;
}
type Verdict = 'fail' | 'watch' | 'pass';

const CELL: TextStyle = { size: 7.2 };
/** Of the column that says what the row is of. */
const FIRST: TextStyle = { ...CELL, weight: 500 };
const NUMBER: TextStyle = { size: 7.2, tabular: true };
const HEAD: TextStyle = { size: 6.6, weight: 500, ink: 'ink3' };
const LINE = 9.2;
const HEAD_LINE = 8.2;
const PAD = { x: 3.5, y: 2.6 } as const;
const MARK = 9;
/** So that what was measured to fit does fit. */
const HAIR = 0.3;
/** A cell of more lines is cut: the whole text is in the spreadsheet. */
const MOST_LINES = 14;
/** Under a head stand so many rows at least. */
const KEPT_ROWS = 3;
/** Of a column that wraps before others do, pt. */
const NARROW = 92;
const NOTHING = '–';

/** A table over as many pages as it takes; each begins with its head. */
export function tablePages(
  sheet: Sheet,
  table: ReportTable,
  { title, note, kept = [], narrow = [], none }: TableOptions,
): void {
  if (table.rows.length === 0) {
    if (none === undefined) return;
    sheet.heading(title, 20);
    sheet.paragraph(none, { size: CELL.size, ink: 'ink2' });
    return;
  }
  const { columns, alike } = columnsOf(table, kept);
  sheet.heading(title, 24 + (KEPT_ROWS + 1) * (LINE + 2 * PAD.y));
  if (note !== undefined) sheet.paragraph(note, { size: CELL.size, ink: 'ink2' }, { gap: 3 });
  if (alike.length > 0) {
    const same = alike.map(([name, text]) => `${name}: ${text}`).join('; ');
    sheet.paragraph(`In every row: ${same}.`, { size: CELL.size, ink: 'ink2' }, { gap: 3 });
  }
  new TablePages(sheet, columns, table.rows, narrow).print();
}

/** A table in running text, as wide as the column that it stands in. */
export function tableInText(sheet: Sheet, head: readonly string[], rows: readonly (readonly string[])[]): void {
  const columns = head.map((title, index) => ({ title, unit: '', index, numeric: false, marked: false }));
  new TablePages(sheet, columns, rows).print();
}

class TablePages {
  private readonly widths: readonly number[];
  private readonly heads: readonly (readonly string[])[];
  private readonly headHeight: number;

  constructor(
    private readonly sheet: Sheet,
    private readonly columns: readonly SetColumn[],
    private readonly rows: ReportTable['rows'],
    private readonly narrow: readonly string[] = [],
  ) {
    this.widths = columnWidths(
      columns.map((column) => this.wanted(column)),
      sheet.width,
    );
    this.heads = columns.map(({ title, unit }, i) => [
      ...sheet.lines(title, this.inner(i), HEAD),
      ...(unit === '' ? [] : [unit]),
    ]);
    this.headHeight = Math.max(...this.heads.map(({ length }) => length)) * HEAD_LINE + 2 * PAD.y;
  }

  print(): void {
    const { sheet } = this;
    sheet.within('Table', () => {
      this.head();
      this.rows.forEach((row, index) => {
        const cells = this.columns.map((column, i) => this.cellOf(row[column.index], i));
        const height = Math.max(1, ...cells.map(({ lines }) => lines.length)) * LINE + 2 * PAD.y;
        // the last row does not go over alone
        const needed = index === this.rows.length - 2 ? 2 * height : height;
        if (sheet.ensure(needed)) this.head();
        this.row(cells);
        sheet.y += height;
        sheet.rule(sheet.left, sheet.y, sheet.right);
      });
    });
    sheet.y += 6;
  }

  private head(): void {
    const { sheet } = this;
    sheet.ensure(this.headHeight + LINE);
    const foot = sheet.y + this.headHeight;
    sheet.within('TR', () => {
      this.eachColumn((x, width, i) => {
        const lines = this.heads[i] ?? [];
        const first = foot - PAD.y - (lines.length - 1) * HEAD_LINE - 1.5;
        sheet.tagged('TH', () =>
          this.lines(lines, x, width, first, HEAD_LINE, HEAD, this.columns[i]?.numeric ?? false),
        );
      });
    });
    sheet.rule(sheet.left, foot, sheet.right, 'ink', 0.9);
    sheet.y = foot;
  }

  private row(cells: readonly SetCell[]): void {
    const { sheet } = this;
    const first = sheet.y + PAD.y + CELL.size - 0.6;
    sheet.within('TR', () => {
      this.eachColumn((x, width, i) => {
        const { lines, verdict } = cells[i] ?? { lines: [], verdict: undefined };
        const numeric = this.columns[i]?.numeric ?? false;
        const style = numeric ? NUMBER : i === 0 ? FIRST : CELL;
        sheet.tagged(i === 0 ? 'TH' : 'TD', () => {
          if (verdict !== undefined) paintShapes(sheet, verdictShapes(verdict), x + PAD.x + 3, first - 2.6, 0.58);
          const inset = verdict === undefined ? 0 : MARK;
          this.lines(lines, x + inset, width - inset, first, LINE, style, numeric);
        });
      });
    });
  }

  private lines(
    lines: readonly string[],
    x: number,
    width: number,
    first: number,
    step: number,
    style: TextStyle,
    numeric: boolean,
  ): void {
    lines.forEach((line, i) => {
      const at = numeric ? x + width - PAD.x : x + PAD.x;
      this.sheet.print(line, at, first + i * step, style, numeric ? 'right' : 'left');
    });
  }

  private cellOf(cell: ReportTable['rows'][number][number], column: number): SetCell {
    const text = cellText(cell);
    if (text === '') return { lines: [NOTHING], verdict: undefined };
    const numeric = this.columns[column]?.numeric ?? false;
    const verdict = this.columns[column]?.marked === true ? verdictOf(text) : undefined;
    const room = this.inner(column) - (verdict === undefined ? 0 : MARK);
    const lines = numeric ? [text] : this.sheet.lines(text, room, column === 0 ? FIRST : CELL);
    if (lines.length <= MOST_LINES) return { lines, verdict };
    return { lines: [...lines.slice(0, MOST_LINES - 1), '…'], verdict };
  }

  private wanted(column: SetColumn) {
    const { sheet } = this;
    const first = column.index === this.columns[0]?.index;
    const style = column.numeric ? NUMBER : first ? FIRST : CELL;
    const words = [...column.title.split(' '), column.unit].map((word) => sheet.measure(word, HEAD));
    const texts = [...new Set(this.rows.map((row) => cellText(row[column.index])))];
    const mark = column.marked ? MARK : 0;
    const widest = (parts: readonly string[]) =>
      parts.reduce((most, part) => Math.max(most, sheet.measure(part, style)), 0);
    const most = this.narrow.includes(column.title) ? NARROW : Infinity;
    const natural = mark + Math.max(...words, Math.min(most, widest(texts)));
    const least = column.numeric
      ? natural
      : mark + Math.max(...words, Math.min(70, widest(texts.flatMap((text) => text.split(/\s+/)))));
    return { natural: natural + 2 * PAD.x + HAIR, least: Math.min(natural, least) + 2 * PAD.x + HAIR };
  }

  private inner(column: number): number {
    return (this.widths[column] ?? 0) - 2 * PAD.x;
  }

  private eachColumn(visit: (x: number, width: number, column: number) => void): void {
    let x = this.sheet.left;
    this.widths.forEach((width, i) => {
      visit(x, width, i);
      x += width;
    });
  }
}

function verdictOf(text: string): Verdict | undefined {
  const [word = ''] = text.split(/[:,\s]/u);
  return ({ Fail: 'fail', Watch: 'watch', Pass: 'pass' } as const)[word as 'Fail' | 'Watch' | 'Pass'];
}

import { broughtForward, type Forward, type LedgerModel, type LedgerRow } from '@riseback/figures';
import type { Sheet, TextStyle } from './sheet';

interface LedgerNames {
  readonly trapName: string;
  readonly endName: string;
  readonly opening: string;
}

/** One printed line: what stands in each column, in their order. */
type Cells = readonly string[];

interface Column {
  readonly title: string;
  readonly width: number;
  readonly numeric: boolean;
  readonly strong?: boolean;
}

const LINE = 12.6;
const CELL: TextStyle = { size: 7.6 };
const HEAD: TextStyle = { size: 6.8, weight: 500, ink: 'ink3' };
const PAD = 4;
/** The closing line, its rules and the words of the hand check. */
const FOOT = 3 * LINE;

/** A trap's account as bookkeepers rule it: copper margin, single rule over the total and a double one under it, the hand check apart. */
export class LedgerTable {
  private readonly columns: readonly Column[];

  constructor(
    private readonly sheet: Sheet,
    private readonly model: LedgerModel,
    private readonly names: LedgerNames,
  ) {
    const { titles } = model;
    const fixed: Column[] = [
      { title: 'No.', width: 26, numeric: true },
      { title: 'Element', width: this.elementWidth(), numeric: false, strong: true },
      { title: 'Place', width: 0, numeric: false },
      { title: 'Bore', width: 34, numeric: true },
      { title: titles.length, width: 50, numeric: true },
      { title: titles.rise, width: 54, numeric: true },
      { title: titles.flow, width: 52, numeric: true },
      { title: 'Flash %', width: 40, numeric: true },
      { title: `Static ${titles.adds}`, width: 48, numeric: true },
      { title: `Friction ${titles.adds}`, width: 54, numeric: true },
      { title: `Flash ${titles.adds}`, width: 48, numeric: true },
      { title: `Running ${titles.running}`, width: 56, numeric: true, strong: true },
      { title: `Hand check ${titles.adds}`, width: 60, numeric: true },
      { title: `running ${titles.running}`, width: 56, numeric: true },
    ];
    const rest = sheet.width - fixed.reduce((sum, { width }) => sum + width, 0);
    this.columns = fixed.map((column) => (column.width === 0 ? { ...column, width: rest } : column));
  }

  private elementWidth(): number {
    const strong: TextStyle = { ...CELL, weight: 600 };
    const widest = this.model.rows.map(({ element }) => this.sheet.measure(element, strong));
    return Math.min(130, Math.max(60, ...widest) + 2.5 * PAD);
  }

  print(): void {
    const { sheet, model, names } = this;
    sheet.within('Table', () => {
      sheet.ensure(5 * LINE);
      this.head();
      this.line(blank({ 1: names.endName, 2: names.opening, 11: model.opening, 13: model.opening }));
      model.rows.forEach((row, i) => {
        const last = i === model.rows.length - 1;
        if (sheet.room < LINE + (last ? FOOT : LINE)) this.turn(i);
        this.line(rowCells(row), row.lifts);
      });
      this.closing();
    });
    sheet.y += 7;
  }

  /** Carries the account over to a new page. */
  private turn(count: number): void {
    const { sheet } = this;
    if (count > 0) this.line(this.forward('Carried forward', broughtForward(this.model, count)));
    sheet.newPage();
    this.head();
    if (count > 0) this.line(this.forward('Brought forward', broughtForward(this.model, count)));
  }

  private forward(words: string, sums: Forward): Cells {
    return blank({
      2: words,
      4: sums.length,
      5: sums.rise,
      8: sums.static,
      9: sums.friction,
      10: sums.flashSteam,
      11: sums.running,
      12: sums.handAdds,
      13: sums.handRunning,
    });
  }

  private closing(): void {
    const { sheet, model, names } = this;
    const { left, right } = sheet;
    const { length, rise, static: lift, friction, flashSteam, running, handAdds, handRunning } = model.closing;
    sheet.rule(left, sheet.y, right, 'ink', 0.9);
    const sums = {
      4: length,
      5: rise,
      8: lift,
      9: friction,
      10: flashSteam,
      11: running,
      12: handAdds,
      13: handRunning,
    };
    this.line(blank({ 1: names.trapName, 2: 'Back pressure', ...sums }), false, true);
    sheet.rule(left, sheet.y + 0.4, right, 'ink', 0.9);
    sheet.rule(left, sheet.y + 2.6, right, 'ink', 0.9);
  }

  private head(): void {
    const { sheet } = this;
    const baseline = sheet.y + 9;
    sheet.within('TR', () =>
      this.cells((x, { title, numeric, width }) => {
        sheet.tagged('TH', () =>
          sheet.print(title, numeric ? x + width - PAD : x + PAD, baseline, HEAD, numeric ? 'right' : 'left'),
        );
      }),
    );
    this.margins(LINE + 1);
    sheet.y += LINE + 1;
    sheet.rule(sheet.left, sheet.y, sheet.right, 'ink', 0.9);
  }

  private line(texts: Cells, lifts = false, total = false): void {
    const { sheet } = this;
    const { left, right, y } = sheet;
    if (lifts) sheet.decoration(() => sheet.fill(`M${left} ${y}H${right}v${LINE}H${left}Z`, 'ground'));
    this.margins(LINE);
    sheet.within('TR', () =>
      this.cells((x, { numeric, width, strong = false }, i) => {
        const weight = total || strong ? 600 : 400;
        const ink = i === 0 ? ('ink3' as const) : ('ink' as const);
        const style: TextStyle = { ...CELL, weight, ink, tabular: numeric };
        const text = sheet.fitted(texts[i] ?? '', width + this.beside(texts, i) - 1.5 * PAD, style);
        sheet.tagged('TD', () => {
          if (text !== '')
            sheet.print(text, numeric ? x + width - PAD : x + PAD, y + 8.8, style, numeric ? 'right' : 'left');
        });
      }),
    );
    sheet.y += LINE;
    if (!total) sheet.rule(left, sheet.y, right);
  }

  /** The room of the empty cells after a word, which may run on over them. */
  private beside(texts: Cells, column: number): number {
    if (this.columns[column]?.numeric !== false) return 0;
    let room = 0;
    for (let i = column + 1; i < texts.length && texts[i] === ''; i += 1) room += this.columns[i]?.width ?? 0;
    return room;
  }

  /** The copper margin after the numbers, and the double line before the hand check. */
  private margins(height: number): void {
    const { sheet, columns } = this;
    const margin = sheet.left + (columns[0]?.width ?? 0);
    const hand = sheet.right - (columns[12]?.width ?? 0) - (columns[13]?.width ?? 0);
    sheet.decoration(() => {
      sheet.stroke(`M${margin} ${sheet.y}v${height}M${margin + 2.2} ${sheet.y}v${height}`, 'copperLine', 0.7);
      sheet.stroke(`M${hand} ${sheet.y}v${height}M${hand + 2} ${sheet.y}v${height}`, 'ruleStrong', 0.6);
    });
  }

  private cells(visit: (x: number, column: Column, index: number) => void): void {
    let x = this.sheet.left;
    this.columns.forEach((column, i) => {
      // beside a double line a text begins a little later
      visit(i === 1 ? x + 3 : x, column, i);
      x += column.width;
    });
  }
}

function rowCells(row: LedgerRow): Cells {
  const { no, element, place, bore, length, rise, flow, flash, static: lift, friction, flashSteam } = row;
  const adds = [lift, friction, flashSteam, row.running, row.handAdds, row.handRunning];
  return [String(no), element, place, bore, length, rise, flow, flash, ...adds];
}

function blank(filled: Readonly<Record<number, string>>): Cells {
  return Array.from({ length: 14 }, (_, i) => filled[i] ?? '');
}

import {
  displayUnit,
  type DisplayUnits,
  formatForEditing,
  formatQuantity,
  type QuantityKind,
  toDisplay,
} from '@riseback/units';

/** A number in the reader's unit with all its digits, and how many decimals the screen prints of it. */
export interface NumberCell {
  readonly number: number;
  readonly decimals: number;
  /** As the screen prints it, to the last digit. */
  readonly printed?: string;
}
/** A text with numbers in it: in a spreadsheet with all their digits, on paper as the screen prints them. */
export interface TextCell {
  readonly text: string;
  readonly printed: string;
}
export type TableCell = string | NumberCell | TextCell | undefined;

export interface TableColumn {
  readonly title: string;
  /** '' for texts and plain numbers. */
  readonly unit: string;
}

/** One list of the report, the same in every kind of file that holds tables. */
export interface ReportTable {
  /** What a person calls it: at most 31 characters, since it names a sheet. */
  readonly name: string;
  readonly columns: readonly TableColumn[];
  readonly rows: readonly (readonly TableCell[])[];
}

/** How one column is filled from the thing that a row is of. Titles, quantities and words are those of the lists on the screen. */
export interface ReportColumn<R> {
  readonly title: string;
  readonly quantity?: QuantityKind;
  /** The unit in the head where the cells are names that carry one, such as nominal sizes. */
  readonly unit?: string;
  /** SI where the column has a quantity. */
  readonly value: (row: R) => number | string | TextCell | undefined;
}

/** One digit fewer than conversion costs, so that 12 ft stored in metres are 12 and not 11.999999999999998. */
const DIGITS = 12;

export function tableOf<R>(
  name: string,
  columns: readonly ReportColumn<R>[],
  rows: readonly R[],
  units: DisplayUnits,
): ReportTable {
  return {
    name,
    columns: columns.map((column) => ({ title: column.title, unit: unitOf(column, units) })),
    rows: rows.map((row) =>
      columns.map(({ quantity, value }) => {
        const found = value(row);
        if (typeof found !== 'number') return found === '' ? undefined : found;
        return quantity === undefined ? plainNumber(found) : quantityCell(found, quantity, units);
      }),
    ),
  };
}

export function quantityCell(si: number, quantity: QuantityKind, units: DisplayUnits): NumberCell {
  const printed = formatQuantity(si, quantity, units);
  return {
    number: Number(toDisplay(si, quantity, units).toPrecision(DIGITS)),
    decimals: decimalsOf(printed),
    printed,
  };
}

export function isNumber(cell: TableCell): cell is NumberCell {
  return typeof cell === 'object' && 'number' in cell;
}

/** With all its digits; '' for nothing. */
export function exactText(cell: TableCell): string {
  if (cell === undefined || typeof cell === 'string') return cell ?? '';
  return isNumber(cell) ? String(cell.number) : cell.text;
}

/** A quantity in words. */
export type Tell = (si: number, quantity: QuantityKind) => string;

export function exactly(units: DisplayUnits): Tell {
  return (si, quantity) => `${formatForEditing(si, quantity, units)} ${displayUnit(quantity, units.system)}`;
}

export function asPrinted(units: DisplayUnits): Tell {
  return (si, quantity) => formatQuantity(si, quantity, units, { withUnit: true });
}

export function plainNumber(number: number): NumberCell {
  return { number, decimals: decimalsOf(String(number)) };
}

/** "Load, lb/h": what stands over a column in a file. */
export function heading({ title, unit }: TableColumn): string {
  return unit === '' ? title : `${title}, ${unit}`;
}

function unitOf<R>({ quantity, unit }: ReportColumn<R>, { system }: DisplayUnits): string {
  return quantity === undefined ? (unit ?? '') : displayUnit(quantity, system);
}

/** Of a number as it is printed. */
export function decimalsOf(printed: string): number {
  const point = printed.indexOf('.');
  return point < 0 ? 0 : printed.length - point - 1;
}

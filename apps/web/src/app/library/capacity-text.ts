import { CapacityPoint } from '@riseback/network';
import { displayUnit, type DisplayUnits, formatQuantity, parseQuantity, type QuantityKind } from '@riseback/units';
import Papa from 'papaparse';

/** One of the two columns, and where its unit comes from. */
export interface CapacityColumn {
  readonly title: string;
  readonly unit: string;
  /** What is to be known of its unit: that it was assumed, or why the heading cannot be followed. */
  readonly note: string;
  readonly wrong: boolean;
}

export interface CapacityRow {
  /** As counted in the text, from 1. */
  readonly line: number;
  readonly differential: string;
  readonly flow: string;
  readonly point: CapacityPoint | null;
  /** Why the row cannot be taken; '' when it can. */
  readonly complaint: string;
}

export interface CapacityReading {
  readonly differential: CapacityColumn;
  readonly flow: CapacityColumn;
  readonly rows: readonly CapacityRow[];
  /** In order of rising differential; null while anything is wrong. */
  readonly points: readonly CapacityPoint[] | null;
}

interface Line {
  readonly number: number;
  readonly cells: readonly string[];
}

type Side = 'differential' | 'flow';
const KIND: Readonly<Record<Side, QuantityKind>> = { differential: 'pressureDifference', flow: 'massFlow' };
const WORD: Readonly<Record<Side, string>> = { differential: 'Differential', flow: 'Capacity' };
/** What a heading might name by mistake; enough to tell a unit from any other word. */
const OTHER_KINDS: readonly QuantityKind[] = ['pressure', 'massFlow', 'pressureDifference', 'temperature', 'velocity'];
const MOST_POINTS = 200;

/**
 * Reads capacity points from two columns, as they come from a spreadsheet, a CSV file or the keyboard. A unit in a heading, in
 * brackets or as its last words, counts for its column and tells which column is which; a unit in a cell counts for that cell;
 * without either the person's own units are taken, and said. Nothing is guessed at: what is not understood is named with its line.
 * @returns null when there is nothing to read
 */
export function readCapacityText(text: string, units: DisplayUnits): CapacityReading | null {
  const lines = linesOf(text);
  if (lines.length === 0) return null;
  const headings = lines.slice(0, lines.findIndex(hasNumber) === -1 ? lines.length : lines.findIndex(hasNumber));
  const titles = [0, 1].map((i) =>
    headings
      .map(({ cells }) => cells[i] ?? '')
      .join(' ')
      .trim(),
  );
  const swapped = isSwapped(titles, units);
  const at: Readonly<Record<Side, number>> = swapped ? { differential: 1, flow: 0 } : { differential: 0, flow: 1 };
  const differential = columnOf('differential', titles[at.differential] ?? '', units);
  const flow = columnOf('flow', titles[at.flow] ?? '', units);
  const taken = new Map<number, number>();
  const points: CapacityPoint[] = [];
  const rows = lines.slice(headings.length).map((line): CapacityRow => {
    const read = rowOf(line, at, { differential: differential.unit, flow: flow.unit }, units);
    const complaint = typeof read === 'string' ? read : twiceComplaint(read, line.number, taken);
    if (typeof read !== 'string' && complaint === '') points.push(read);
    return {
      line: line.number,
      differential: shown(read, 'differential', line.cells[at.differential] ?? '', units),
      flow: shown(read, 'flow', line.cells[at.flow] ?? '', units),
      point: typeof read === 'string' ? null : read,
      complaint,
    };
  });
  const good = !differential.wrong && !flow.wrong && points.length > 0 && points.length <= MOST_POINTS;
  return {
    differential,
    flow,
    rows,
    points:
      good && rows.every(({ complaint }) => complaint === '')
        ? points.sort((a, b) => a.differentialPa - b.differentialPa)
        : null,
  };
}

/** Tabs part cells where there are any, else semicolons, else commas, else spaces. */
function linesOf(text: string): Line[] {
  const delimiter = ['\t', ';', ','].find((mark) => text.includes(mark));
  const rows =
    delimiter === undefined
      ? text.split(/\r?\n/).map((line) => line.trim().split(/\s+/))
      : Papa.parse<string[]>(text, { delimiter }).data;
  return rows
    .map((cells, i) => ({ number: i + 1, cells: cells.map((cell) => cell.trim()) }))
    .filter(({ cells }) => cells.some((cell) => cell !== ''));
}

function hasNumber({ cells }: Line): boolean {
  return cells.slice(0, 2).some((cell) => /^[+\-−]?[.,]?\d/.test(cell));
}

function isSwapped([first = '', second = '']: readonly string[], units: DisplayUnits): boolean {
  const names = (title: string, side: Side) => unitNamed(title, KIND[side], units) !== undefined;
  return (
    (names(first, 'flow') && !names(second, 'flow')) || (names(second, 'differential') && !names(first, 'differential'))
  );
}

function columnOf(side: Side, title: string, units: DisplayUnits): CapacityColumn {
  const own = displayUnit(KIND[side], units.system);
  const unit = unitNamed(title, KIND[side], units);
  if (unit !== undefined) return { title, unit, note: '', wrong: false };
  const named = candidates(title).find(
    (candidate) => bracketed(title).includes(candidate) || isAnyUnit(candidate, units),
  );
  if (named !== undefined) {
    const refused = parseQuantity(`1 ${named}`, KIND[side], units);
    return { title, unit: own, note: refused.ok ? '' : `${WORD[side]}: ${refused.reason}`, wrong: true };
  }
  const why = title === '' ? 'No heading names a unit' : `The heading “${title}” names no unit`;
  return { title, unit: own, note: `${WORD[side]}: ${why}: numbers are taken as ${own}.`, wrong: false };
}

/** The unit that a heading names for a kind. */
function unitNamed(title: string, kind: QuantityKind, units: DisplayUnits): string | undefined {
  return candidates(title).find((candidate) => parseQuantity(`1 ${candidate}`, kind, units).ok);
}

function isAnyUnit(text: string, units: DisplayUnits): boolean {
  return OTHER_KINDS.some((kind) => parseQuantity(`1 ${text}`, kind, units).ok);
}

/** What may be a unit in a heading: what stands in brackets, after a comma, the whole, its last two words, its last word. */
function candidates(title: string): string[] {
  const words = title.split(/\s+/);
  const afterComma = title.includes(',') ? [title.slice(title.lastIndexOf(',') + 1).trim()] : [];
  return [...bracketed(title), ...afterComma, title, words.slice(-2).join(' '), words.at(-1) ?? ''].filter(
    (text, i, all) => text !== '' && all.indexOf(text) === i,
  );
}

function bracketed(title: string): string[] {
  return [...title.matchAll(/[([]([^)\]]+)[)\]]/g)].map(([, inside]) => (inside ?? '').trim());
}

function rowOf(
  { cells }: Line,
  at: Readonly<Record<Side, number>>,
  columnUnits: Readonly<Record<Side, string>>,
  units: DisplayUnits,
): CapacityPoint | string {
  const filled = cells.filter((cell) => cell !== '').length;
  if (filled !== 2 || cells.slice(0, 2).includes('')) {
    return `${String(filled)} ${filled === 1 ? 'value' : 'values'} in the row; two are wanted, in the first two columns.`;
  }
  const differential = cellOf(cells[at.differential] ?? '', 'differential', columnUnits, units);
  if (typeof differential === 'string') return differential;
  const flow = cellOf(cells[at.flow] ?? '', 'flow', columnUnits, units);
  if (typeof flow === 'string') return flow;
  const point = { differentialPa: differential, flowKgS: flow };
  if (CapacityPoint.safeParse(point).success) return point;
  return differential > 0 && flow > 0 ? 'Larger than any plant has: look at the unit.' : 'Both must be above nothing.';
}

/** A bare number is in the column's unit; a cell may name a unit of its own. */
function cellOf(
  cell: string,
  side: Side,
  columnUnits: Readonly<Record<Side, string>>,
  units: DisplayUnits,
): number | string {
  const bare = parseQuantity(`${cell} ${columnUnits[side]}`, KIND[side], units);
  if (bare.ok) return bare.si;
  const own = parseQuantity(cell, KIND[side], units);
  if (own.ok) return own.si;
  const suggestion = own.suggestion === undefined ? '' : ` Did you mean ${own.suggestion}?`;
  return `${WORD[side]} “${cell}”: ${own.reason}${suggestion}`;
}

function twiceComplaint({ differentialPa }: CapacityPoint, line: number, taken: Map<number, number>): string {
  const earlier = taken.get(differentialPa);
  if (earlier !== undefined) return `This differential stands in line ${String(earlier)} already.`;
  taken.set(differentialPa, line);
  return '';
}

/** What a cell was understood as; as it was typed where the row was not. */
function shown(read: CapacityPoint | string, side: Side, cell: string, units: DisplayUnits): string {
  if (typeof read === 'string') return cell;
  return formatQuantity(side === 'differential' ? read.differentialPa : read.flowKgS, KIND[side], units);
}

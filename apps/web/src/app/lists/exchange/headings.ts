import { displayUnit, type DisplayUnits, parseQuantity, type QuantityKind } from '@riseback/units';

/** A column of a list as a block can name it. */
export interface BlockField {
  readonly key: string;
  readonly title: string;
  readonly quantity?: QuantityKind | undefined;
  /** False for results and what is worked out: such columns go out and never come in. */
  readonly readable: boolean;
  readonly result: boolean;
}

/** Which field a column of the block is, and the unit of its bare numbers where the heading names one. */
export interface ColumnMatch {
  readonly key: string;
  readonly unit: string;
}

/** Before the title of every result, so that a result is never taken for the input of the same name. */
const RESULT_MARK = 'Result: ';

/** "Load, lb/h": what stands over a column in a file. */
export function headingOf({ title, quantity, result }: BlockField, unit: string): string {
  const named = `${result ? RESULT_MARK : ''}${title}`;
  return quantity === undefined || unit === '' ? named : `${named}, ${unit}`;
}

/** What each cell of a row names; null for what names no field of the list. A field is named once. */
export function matchHeadings(
  cells: readonly string[],
  fields: readonly BlockField[],
  units: DisplayUnits,
): (ColumnMatch | null)[] {
  const taken = new Set<string>();
  return cells.map((cell) => {
    const match = matchHeading(cell, fields, units, taken);
    if (match !== null) taken.add(match.key);
    return match;
  });
}

/** Whether the first row of a block holds headings: most of what stands in it names a field. */
export function isHeadingRow(cells: readonly string[], matches: readonly (ColumnMatch | null)[]): boolean {
  const written = cells.filter((cell) => cell.trim() !== '').length;
  const named = matches.filter((match) => match !== null).length;
  return named > 0 && 2 * named >= written;
}

/** Without headings, cells fall into the columns in sight from one on. */
export function matchInOrder(count: number, keys: readonly string[], from: string): (ColumnMatch | null)[] {
  const start = Math.max(0, keys.indexOf(from));
  return Array.from({ length: count }, (_, index) => {
    const key = keys[start + index];
    return key === undefined ? null : { key, unit: '' };
  });
}

/** A bare number gets the heading's unit; what has a unit of its own keeps it. */
export function withHeadingUnit(text: string, unit: string): string {
  return unit !== '' && BARE_NUMBER.test(text.trim()) ? `${text.trim()} ${unit}` : text;
}

const BARE_NUMBER = /^[-+−]?[\d.,/\s-]*\d[\d.,\s]*(?:e[-+]?\d+)?$/i;

function matchHeading(
  cell: string,
  fields: readonly BlockField[],
  units: DisplayUnits,
  taken: ReadonlySet<string>,
): ColumnMatch | null {
  const written = folded(cell);
  if (written === '') return null;
  const free = fields.filter(({ key }) => !taken.has(key));
  const exact = free.find((field) => folded(headingOf(field, '')) === written);
  if (exact !== undefined) return { key: exact.key, unit: '' };
  const byKey = free.find(({ key, result }) => !result && key.toLowerCase() === written);
  if (byKey !== undefined) return { key: byKey.key, unit: storedUnit(byKey) };
  const longestFirst = [...free].sort((a, b) => b.title.length - a.title.length);
  for (const field of longestFirst) {
    const unit = unitBehind(cell, headingOf(field, ''));
    if (unit === undefined || field.quantity === undefined) continue;
    if (unit === displayUnit(field.quantity, units.system)) return { key: field.key, unit: '' };
    if (parseQuantity(`1 ${unit}`, field.quantity, units).ok) return { key: field.key, unit };
  }
  return null;
}

/** The rest of "Load (lb/h)", "Load, lb/h" or "Load lb/h" behind the title; undefined where it does not begin with it. */
function unitBehind(cell: string, title: string): string | undefined {
  const text = cell.trim().replace(/\s+/g, ' ');
  if (text.slice(0, title.length).toLowerCase() !== title.toLowerCase()) return undefined;
  const rest = text.slice(title.length);
  if (!/^[\s,:;([]/.test(rest)) return undefined;
  return rest
    .replace(/^[\s,:;]+/, '')
    .replace(/^[([](.*)[)\]]$/, '$1')
    .trim();
}

/** The unit that a key of the network file carries in its name. */
function storedUnit({ quantity }: BlockField): string {
  switch (quantity) {
    case 'pressure':
      return 'Pa abs';
    case 'gaugePressure':
      return 'Pa g';
    case 'pressureDifference':
      return 'Pa';
    case 'length':
    case 'diameter':
    case 'roughness':
      return 'm';
    case 'massFlow':
      return 'kg/s';
    case 'temperature':
    case 'temperatureDifference':
      return 'K';
    case 'heatLossPerLength':
      return 'W/m';
    default:
      // a key such as "accuracy" cannot be told from its column's title, whose numbers are per cent
      return '';
  }
}

function folded(text: string): string {
  return text.trim().replace(/\s+/g, ' ').toLowerCase();
}

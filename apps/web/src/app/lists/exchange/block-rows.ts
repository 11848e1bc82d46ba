import type { DisplayUnits } from '@riseback/units';
import type { BlockRow } from './block-plan';
import type { BlockTarget } from './block-target';
import type { Block } from './block-text';
import { type ColumnMatch, isHeadingRow, matchHeadings, matchInOrder, withHeadingUnit } from './headings';

/** How a block is read: whether it has headings, and which field each of its columns is. */
export interface BlockMapping {
  readonly headings: boolean;
  readonly columns: readonly (ColumnMatch | null)[];
}

/** The columns of the list in sight, and the one that the person is in. */
export interface GridColumns {
  readonly keys: readonly string[];
  readonly fromKey: string;
}

/** The rows of the list in their order, and the one that the person is in. */
export interface GridRows {
  readonly ids: readonly string[];
  readonly fromRow: number;
}

/** By the headings where there are some, else from the active cell on. */
export function startingMapping(
  block: Block,
  target: BlockTarget,
  units: DisplayUnits,
  grid: GridColumns,
): BlockMapping {
  const cells = block.rows[0]?.cells ?? [];
  const named = matchHeadings(cells, target.fields, units);
  if (isHeadingRow(cells, named)) return { headings: true, columns: padded(named, widthOf(block)) };
  return { headings: false, columns: inOrder(block, target, grid) };
}

/** What the columns are taken for once the person has said whether the first row is headings. */
export function mappingFor(
  headings: boolean,
  block: Block,
  target: BlockTarget,
  units: DisplayUnits,
  grid: GridColumns,
): BlockMapping {
  if (!headings) return { headings, columns: inOrder(block, target, grid) };
  return { headings, columns: padded(matchHeadings(block.rows[0]?.cells ?? [], target.fields, units), widthOf(block)) };
}

/**
 * The rows below the headings, by key. Without a column of names they are for the rows of the list from the active one down.
 * @param options `clears`: empty cells are told too
 */
export function rowsOf(
  block: Block,
  mapping: BlockMapping,
  target: BlockTarget,
  { ids, fromRow }: GridRows,
  { clears = false }: { readonly clears?: boolean } = {},
): BlockRow[] {
  const readable = new Set(target.fields.filter(({ readable: takes }) => takes).map(({ key }) => key));
  const named = mapping.columns.some((column) => column?.key === target.nameKey);
  const lines = mapping.headings ? block.rows.slice(1) : block.rows;
  return lines.map(({ number, cells }, index) => {
    const texts = new Map<string, string>();
    const emptied: string[] = [];
    mapping.columns.forEach((column, place) => {
      const text = cells[place] ?? '';
      if (column === null || !readable.has(column.key)) return;
      if (text.trim() !== '') texts.set(column.key, withHeadingUnit(text, column.unit));
      else if (clears) emptied.push(column.key);
    });
    const row = emptied.length === 0 ? { number, texts } : { number, texts, emptied };
    return named ? row : { ...row, onto: ids[fromRow + index] ?? null };
  });
}

export function widthOf({ rows }: Block): number {
  return rows.reduce((width, { cells }) => Math.max(width, cells.length), 0);
}

function inOrder(block: Block, target: BlockTarget, { keys, fromKey }: GridColumns): (ColumnMatch | null)[] {
  const known = new Set(target.fields.map(({ key }) => key));
  return matchInOrder(
    widthOf(block),
    keys.filter((key) => known.has(key)),
    fromKey,
  );
}

function padded(columns: readonly (ColumnMatch | null)[], width: number): (ColumnMatch | null)[] {
  return Array.from({ length: width }, (_, index) => columns[index] ?? null);
}

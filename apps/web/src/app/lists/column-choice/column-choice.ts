import * as z from 'zod';
import { COLUMN_GROUPS } from '../columns/column';
import type { TableColumn } from '../list-table';

/** Which columns of a list show and in which order. A column that came later than the choice stands where it does at first. */
export const ColumnChoice = z.object({ order: z.array(z.string()), hidden: z.array(z.string()) });
export type ColumnChoice = z.infer<typeof ColumnChoice>;

export interface ArrangedColumn {
  readonly column: TableColumn;
  readonly shown: boolean;
  /** The name of the row and the way to the drawing stay where they are. */
  readonly fixed: boolean;
}

/** All columns in their order. Groups stay together, since the heads above them span them. */
export function arrangeColumns(columns: readonly TableColumn[], choice: ColumnChoice | null): ArrangedColumn[] {
  const fixedCount = columns.findIndex(({ face }) => face === 'drawingLink') + 1 || 1;
  const fixed = new Set(columns.slice(0, fixedCount).map(({ key }) => key));
  const place = new Map((choice?.order ?? []).map((key, index) => [key, index]));
  const hidden = new Set(choice?.hidden);
  const ranks = ranksOf(columns, place);
  const isShown = ({ key, minor }: TableColumn): boolean =>
    fixed.has(key) || (place.has(key) ? !hidden.has(key) : !minor);
  return COLUMN_GROUPS.flatMap((group) => {
    const members = columns.filter((column) => column.group === group);
    const movable = members.filter(({ key }) => !fixed.has(key));
    const sorted = [...movable].sort((a, b) => (ranks.get(a.key) ?? 0) - (ranks.get(b.key) ?? 0));
    return [...members.filter(({ key }) => fixed.has(key)), ...sorted];
  }).map((column) => ({ column, shown: isShown(column), fixed: fixed.has(column.key) }));
}

/** The columns moved by one place within its group, or left as they are at its ends. */
export function moveColumn(columns: readonly ArrangedColumn[], key: string, by: -1 | 1): readonly ArrangedColumn[] {
  const from = columns.findIndex(({ column }) => column.key === key);
  const [moved, other] = [columns[from], columns[from + by]];
  if (moved === undefined || other === undefined) return columns;
  if (moved.fixed || other.fixed || moved.column.group !== other.column.group) return columns;
  const next = [...columns];
  next[from] = other;
  next[from + by] = moved;
  return next;
}

export function choiceOf(columns: readonly ArrangedColumn[]): ColumnChoice {
  return {
    order: columns.map(({ column }) => column.key),
    hidden: columns.filter(({ shown }) => !shown).map(({ column }) => column.key),
  };
}

/** A column without a place of its own goes behind the one before it. */
function ranksOf(columns: readonly TableColumn[], place: ReadonlyMap<string, number>): Map<string, number> {
  const ranks = new Map<string, number>();
  let last = -1;
  columns.forEach(({ key }, index) => {
    last = place.get(key) ?? last + (index + 1) / (columns.length + 1) ** 2;
    ranks.set(key, last);
  });
  return ranks;
}

import type { EditOp } from '@riseback/network';
import type { RowTexts } from './row-rules';

/** One row of a block by the keys of the list's columns; empty cells are not among its texts. */
export interface BlockRow {
  /** In the pasted text or the sheet, from 1. */
  readonly number: number;
  readonly texts: RowTexts;
  /** Columns of the block whose cell is empty here, where empty cells are to clear; none where they change nothing. */
  readonly emptied?: readonly string[];
  /** The element that it is for where the block does not name its rows; null where the list has no such row. */
  readonly onto?: string | null;
}

export interface BadCell {
  readonly row: number;
  readonly rowName: string;
  readonly key: string;
  readonly title: string;
  readonly text: string;
  /** What is wrong and what would be right. */
  readonly reason: string;
  readonly suggestion?: string;
}

export type RowFate = 'new' | 'changed' | 'same' | 'bad';

export interface PlannedRow {
  readonly number: number;
  readonly name: string;
  readonly fate: RowFate;
}

/** What a block comes to. With bad cells there are no ops: all of it is taken or nothing. */
export interface BlockPlan {
  readonly rows: readonly PlannedRow[];
  readonly bad: readonly BadCell[];
  readonly ops: readonly EditOp[];
  /** Nodes without a pipe that new pipes join, and that may be laid out along them. */
  readonly arrangeable: number;
  /** Why the whole cannot be taken although every cell can be read; '' when it can. */
  readonly refusal: string;
}

export interface PlanOptions {
  /** Whether those nodes are laid out; all others stay where they are in any case. */
  readonly arrange?: boolean;
}

/** Ops that one edit may hold (`EditBatch` of libs/network). */
export const MAXIMUM_OPS = 20_000;

export function countOf({ rows }: BlockPlan, fate: RowFate): number {
  return rows.filter((row) => row.fate === fate).length;
}

/** "Add 12 and change 3". */
export function planWords(plan: BlockPlan, one: string, many: string): string {
  const [added, changed] = [countOf(plan, 'new'), countOf(plan, 'changed')];
  const what = (count: number): string => `${String(count)} ${count === 1 ? one : many}`;
  if (added === 0) return `change ${what(changed)}`;
  return changed === 0 ? `add ${what(added)}` : `add ${what(added)} and change ${String(changed)}`;
}

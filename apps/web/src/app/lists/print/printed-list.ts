import type { Status } from '../../shared/status-mark/status-mark';
import type { ListTable } from '../list-table';

export interface PrintedColumn {
  readonly key: string;
  /** Title and unit. */
  readonly head: string;
  readonly numeric: boolean;
  readonly opensResults: boolean;
}

export interface PrintedRow {
  readonly id: string;
  readonly cells: readonly string[];
}

export interface PrintedList {
  readonly columns: readonly PrintedColumn[];
  readonly rows: readonly PrintedRow[];
}

const STATUS_WORDS: Readonly<Record<Status, string>> = {
  fail: 'Fail',
  watch: 'Watch',
  pass: 'Pass',
  none: 'Not checked',
};

/** Every row that the filter leaves, in the order shown, whether it is in sight or not: what goes on paper. */
export function printedList(table: ListTable, keys: readonly string[], ids: readonly string[]): PrintedList {
  const wanted = new Set(keys);
  // a staff repeats in a picture what Back says in figures, and nothing on paper leads to the drawing
  const shown = table.columns.filter(({ key, face }) => wanted.has(key) && (face === 'text' || face === 'verdict'));
  const ordered = [...shown].sort((a, b) => keys.indexOf(a.key) - keys.indexOf(b.key));
  const firstResult = ordered.findIndex(({ group }) => group === 'result');
  return {
    columns: ordered.map(({ key, title, unit, numeric }, i) => ({
      key,
      head: unit === '' ? title : `${title} ${unit}`,
      numeric,
      opensResults: i === firstResult,
    })),
    rows: ids.map((id) => ({ id, cells: ordered.map(({ key }) => printedCell(table, id, key)) })),
  };
}

function printedCell({ cell }: ListTable, id: string, key: string): string {
  const { text, status } = cell(id, key);
  return status === undefined ? text : [STATUS_WORDS[status], text].filter((word) => word !== '').join(': ');
}

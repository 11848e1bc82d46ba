import type { ListTable } from './list-table';

export interface Sorting {
  readonly key: string;
  readonly direction: 'ascending' | 'descending';
}

const COLLATOR = new Intl.Collator('en', { numeric: true, sensitivity: 'base' });

/** The rows to show, in their order: those that hold every word of the filter, sorted when asked; empty cells always last. */
export function arrangeRows(table: ListTable, filter: string, sorting: Sorting | null): string[] {
  const ids = filterRows(table, filter);
  if (sorting === null) return ids;
  const sign = sorting.direction === 'ascending' ? 1 : -1;
  const keyed = ids.map((id) => ({ id, value: table.sortValue(id, sorting.key) }));
  keyed.sort((a, b) => {
    if (a.value === undefined || b.value === undefined)
      return Number(a.value === undefined) - Number(b.value === undefined);
    return sign * compare(a.value, b.value);
  });
  return keyed.map(({ id }) => id);
}

/** Ascending, then descending, then the file's own order. */
export function nextSorting(sorting: Sorting | null, key: string): Sorting | null {
  if (sorting?.key !== key) return { key, direction: 'ascending' };
  return sorting.direction === 'ascending' ? { key, direction: 'descending' } : null;
}

function filterRows(table: ListTable, filter: string): string[] {
  const words = filter.toLowerCase().split(/\s+/).filter(Boolean);
  if (words.length === 0) return [...table.ids];
  const keys = table.columns.filter(({ group, face }) => group === 'element' && face === 'text').map(({ key }) => key);
  return table.ids.filter((id) => {
    const text = keys.map((key) => table.cell(id, key).text.toLowerCase()).join(' ');
    return words.every((word) => text.includes(word));
  });
}

function compare(a: number | string, b: number | string): number {
  return typeof a === 'number' && typeof b === 'number' ? a - b : COLLATOR.compare(String(a), String(b));
}

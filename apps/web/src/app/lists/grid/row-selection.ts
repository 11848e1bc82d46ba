/** Ticked rows by id, and the row from which Shift extends. */
export interface RowSelection {
  readonly ids: ReadonlySet<string>;
  readonly anchor: string | null;
}

export const NO_ROWS: RowSelection = { ids: new Set(), anchor: null };

export function toggleRow({ ids }: RowSelection, id: string): RowSelection {
  const next = new Set(ids);
  if (!next.delete(id)) next.add(id);
  return { ids: next, anchor: id };
}

/** Adds every row between the anchor and this one, in the order shown. Without an anchor, only this one. */
export function extendRows(selection: RowSelection, order: readonly string[], id: string): RowSelection {
  const from = selection.anchor === null ? -1 : order.indexOf(selection.anchor);
  const to = order.indexOf(id);
  if (from < 0 || to < 0) return { ids: new Set([...selection.ids, id]), anchor: id };
  const between = order.slice(Math.min(from, to), Math.max(from, to) + 1);
  return { ids: new Set([...selection.ids, ...between]), anchor: selection.anchor };
}

/** All shown rows, or none when all were ticked. */
export function toggleAllRows(selection: RowSelection, order: readonly string[]): RowSelection {
  const all = order.length > 0 && order.every((id) => selection.ids.has(id));
  return all ? NO_ROWS : { ids: new Set(order), anchor: order[0] ?? null };
}

/** Without rows that are gone or filtered out: what is not seen is not changed. */
export function keepShown(selection: RowSelection, order: readonly string[]): RowSelection {
  const shown = new Set(order);
  const ids = new Set([...selection.ids].filter((id) => shown.has(id)));
  if (ids.size === selection.ids.size) return selection;
  return { ids, anchor: selection.anchor !== null && shown.has(selection.anchor) ? selection.anchor : null };
}

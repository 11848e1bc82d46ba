import { displayUnit, formatForEditing } from '@riseback/units';
import type { Column, ListContext, ListedElement } from '../columns/column';
import type { Status } from '../../shared/status-mark/status-mark';
import type { CellView, ListTable } from '../list-table';
import type { SheetCell } from './block-text';
import type { BlockPlan, BlockRow, PlanOptions } from './block-plan';
import { type DraftedList, draftRows } from './draft-rows';
import { type BlockField, headingOf } from './headings';

/** A list as spreadsheets see it; what its rows are made of stays inside. */
export interface BlockTarget {
  readonly fields: readonly BlockField[];
  /** The column whose cells name the rows. */
  readonly nameKey: string;
  readonly plan: (rows: readonly BlockRow[], options?: PlanOptions) => BlockPlan;
  /** Headings and rows for a file or the clipboard. */
  readonly sheet: (keys: readonly string[], ids: readonly string[]) => (readonly SheetCell[])[];
}

/** @param cell what the list shows */
export function blockTarget<E extends ListedElement>(
  list: DraftedList<E>,
  context: ListContext,
  cell: ListTable['cell'],
): BlockTarget {
  const columns = list.columns.filter(({ wanted }) => wanted === undefined || wanted(context));
  const elementOf = new Map(list.elements.map((element) => [element.id, element]));
  const fields = columns.filter(({ face }) => face === undefined || face === 'verdict').map(fieldOf);
  return {
    fields,
    nameKey: list.rules.name,
    plan: (rows, options) => draftRows(list, rows, context, options),
    sheet: (keys, ids) => {
      const shown = keys.flatMap((key) => fields.find((field) => field.key === key) ?? []);
      const headings = shown.map((field) => headingOf(field, unitOf(columns, field.key, context)));
      const rows = ids.flatMap((id) => {
        const element = elementOf.get(id);
        if (element === undefined) return [];
        return [shown.map(({ key }) => sheetCell(columns, key, element, context) ?? printed(cell(id, key)))];
      });
      return [headings, ...rows];
    },
  };
}

const STATUS_WORDS: Readonly<Record<Status, string>> = {
  fail: 'Fail',
  watch: 'Watch',
  pass: 'Pass',
  none: 'Not checked',
};

/** What stands in for results that are not there yet belongs to the screen. */
function printed({ text, status, waiting }: CellView): string | undefined {
  const words = status === undefined ? [text] : [STATUS_WORDS[status], text];
  return waiting ? undefined : words.filter(Boolean).join(': ') || undefined;
}

function fieldOf<E>({ key, title, quantity, group, editor, sheet }: Column<E>): BlockField {
  return {
    key,
    title,
    quantity,
    readable: sheet !== undefined || (editor !== undefined && editor.by !== 'dialog'),
    result: group === 'result',
  };
}

function unitOf<E>(columns: readonly Column<E>[], key: string, { units }: ListContext): string {
  const quantity = columns.find((column) => column.key === key)?.quantity;
  return quantity === undefined ? '' : displayUnit(quantity, units.system);
}

/** A number with all its digits, a text as it reads back; undefined where the print does. */
function sheetCell<E extends ListedElement>(
  columns: readonly Column<E>[],
  key: string,
  element: E,
  context: ListContext,
): SheetCell {
  const column = columns.find((each) => each.key === key);
  if (column === undefined) return undefined;
  if (column.sheet !== undefined) return column.sheet.write(element, context);
  if (column.quantity === undefined || column.show !== undefined) return undefined;
  const value = column.value(element, context);
  return typeof value === 'number' ? Number(formatForEditing(value, column.quantity, context.units)) : undefined;
}

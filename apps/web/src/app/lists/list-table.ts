import type { TrapResult } from '@riseback/contracts';
import { displayUnit, type DisplayUnits, formatQuantity } from '@riseback/units';
import type { Status } from '../shared/status-mark/status-mark';
import { type CellEditor, cellEditor } from './cell-editor';
import type { Column, ColumnGroup, ListContext, ListedElement, Waiting } from './columns/column';

/** A column as the grid sees it. */
export interface TableColumn {
  readonly key: string;
  readonly title: string;
  readonly unit: string;
  readonly group: ColumnGroup;
  readonly widthPx: number;
  readonly numeric: boolean;
  readonly minor: boolean;
  readonly editable: boolean;
  readonly face: 'text' | 'verdict' | 'staff' | 'drawingLink';
  /** Inputs that many rows can be given at once. */
  readonly bulk: boolean;
}

export interface CellView {
  readonly text: string;
  /** Not an input of the row itself: worked out, or its id where a tag is missing. */
  readonly derived: boolean;
  /** Stands in for all results of the row and runs on over their cells. */
  readonly waiting: boolean;
  readonly status?: Status;
  readonly trap?: TrapResult;
  /** Said in full when the cell is the active one. */
  readonly sentences: readonly string[];
}

/** Rows and columns of one list at one moment. The elements' own types stay inside. */
export interface ListTable {
  readonly columns: readonly TableColumn[];
  readonly ids: readonly string[];
  readonly nameOf: (id: string) => string;
  readonly cell: (id: string, key: string) => CellView;
  readonly editor: (id: string, key: string) => CellEditor | null;
  readonly sortValue: (id: string, key: string) => number | string | undefined;
}

const NOTHING: CellView = { text: '', derived: false, waiting: false, sentences: [] };

export function tabulate<E extends ListedElement>(
  allColumns: readonly Column<E>[],
  elements: readonly E[],
  context: ListContext,
): ListTable {
  const columns = allColumns.filter(({ wanted }) => wanted === undefined || wanted(context));
  const elementOf = new Map(elements.map((element) => [element.id, element]));
  const columnOf = new Map(columns.map((column) => [column.key, column]));
  const firstResult = columns.find(({ group }) => group === 'result')?.key;
  const at = <T>(id: string, key: string, read: (column: Column<E>, element: E) => T, otherwise: T): T => {
    const [column, element] = [columnOf.get(key), elementOf.get(id)];
    return column === undefined || element === undefined ? otherwise : read(column, element);
  };
  return {
    columns: columns.map((column) => tableColumn(column, context.units)),
    ids: elements.map(({ id }) => id),
    nameOf: (id) => nameOf(elementOf.get(id), id),
    cell: (id, key) =>
      at(id, key, (column, element) => cellView(column, element, context, key === firstResult), NOTHING),
    editor: (id, key) =>
      at(
        id,
        key,
        ({ editor, title, quantity }, element) =>
          editor === undefined ? null : cellEditor(editor, { title, key, quantity }, element, context),
        null,
      ),
    sortValue: (id, key) => at(id, key, (column, element) => column.value(element, context), undefined),
  };
}

function tableColumn<E>(column: Column<E>, units: DisplayUnits): TableColumn {
  const { key, title, group, widthPx, quantity, unit, minor, editor, face } = column;
  return {
    key,
    title,
    unit: quantity === undefined ? (unit ?? '') : displayUnit(quantity, units.system),
    group,
    widthPx,
    numeric: quantity !== undefined && face === undefined,
    minor: minor === true,
    editable: editor !== undefined,
    face: face ?? 'text',
    bulk: editor !== undefined && editor.by !== 'dialog',
  };
}

function cellView<E extends ListedElement>(
  column: Column<E>,
  element: E,
  context: ListContext,
  isFirstResult: boolean,
): CellView {
  const derived = column.derived?.(element) ?? false;
  if (column.face === 'verdict') return verdictView(column, element, context);
  if (column.group === 'result') {
    const waiting = context.waiting(element.id);
    if (waiting !== null) return isFirstResult ? waitingView(waiting) : NOTHING;
  }
  const trap = column.face === 'staff' ? context.traps.get(element.id) : undefined;
  return {
    text: printed(column, element, context),
    derived,
    waiting: false,
    sentences: [],
    ...(trap === undefined ? {} : { trap }),
  };
}

function waitingView({ words, sentence }: Waiting): CellView {
  return { text: words, derived: false, waiting: true, sentences: sentence === '' ? [] : [sentence] };
}

function verdictView<E extends ListedElement>(column: Column<E>, element: E, context: ListContext): CellView {
  const findings = context.findings.get(element.id) ?? [];
  const worst = findings[0]?.status;
  const passes = worst === undefined && column.value(element, context) !== undefined;
  return {
    text: printed(column, element, context),
    derived: false,
    waiting: false,
    sentences: findings.map(({ word, sentences }) => `${word}. ${sentences.join(' ')}`),
    ...(worst !== undefined ? { status: worst } : passes ? { status: 'pass' as const } : {}),
  };
}

function printed<E>(column: Column<E>, element: E, context: ListContext): string {
  if (column.show !== undefined) return column.show(element, context);
  const value = column.value(element, context);
  if (value === undefined) return '';
  if (typeof value === 'string') return value;
  return column.quantity === undefined ? String(value) : formatQuantity(value, column.quantity, context.units);
}

function nameOf(element: ListedElement | undefined, id: string): string {
  if (element === undefined) return id;
  if ('name' in element) return element.name;
  return element.tag ?? element.id;
}

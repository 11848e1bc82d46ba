import type { TrapResult } from '@riseback/contracts';
import { applyBatch, type EditOp, jsonEqual } from '@riseback/network';
import {
  displayUnit,
  type DisplayUnits,
  formatForEditing,
  formatQuantity,
  parseQuantity,
  type QuantityKind,
  unitsAccepted,
} from '@riseback/units';
import type { Status } from '../shared/status-mark/status-mark';
import type {
  Choice,
  Column,
  ColumnEditor,
  ColumnGroup,
  DialogName,
  ListContext,
  ListedElement,
  Proposal,
  Waiting,
} from './columns/column';

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

/** An editor bound to one cell. `propose` judges a text without changing anything. */
export type CellEditor =
  | {
      readonly by: 'quantity';
      readonly initial: string;
      readonly optional: boolean;
      readonly units: readonly string[];
      readonly propose: (text: string) => Proposal;
      /** How the text is understood; '' while it is not. */
      readonly echo: (text: string) => string;
    }
  | {
      readonly by: 'text';
      readonly initial: string;
      readonly optional: boolean;
      readonly maxLength: number;
      readonly suggestions: readonly string[];
      readonly propose: (text: string) => Proposal;
    }
  | {
      readonly by: 'choice';
      readonly choices: readonly Choice[];
      readonly chosen: string;
      readonly propose: (value: string) => Proposal;
    }
  | { readonly by: 'dialog'; readonly dialog: DialogName };

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
        ({ editor, title }, element) => (editor === undefined ? null : bound(editor, title, key, element, context)),
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

function bound<E extends ListedElement>(
  editor: ColumnEditor<E>,
  title: string,
  key: string,
  element: E,
  context: ListContext,
): CellEditor {
  const empty = (): Proposal => ({ ok: false, reason: `${title} cannot be empty.` });
  switch (editor.by) {
    case 'dialog':
      return editor;
    case 'choice':
      return {
        by: 'choice',
        choices: editor.choices(element, context),
        chosen: editor.chosen(element, context),
        propose: (value) => tried(editor.propose(value, element, context), title, key, undefined, context),
      };
    case 'text': {
      const initial = textOf(element, key, context);
      return {
        by: 'text',
        initial,
        optional: editor.optional,
        maxLength: editor.maxLength,
        suggestions: editor.suggestions?.(context) ?? [],
        propose: (text) => {
          const typed = text.trim();
          if (typed === '' && !editor.optional) return empty();
          return tried(
            editor.propose(typed === '' ? undefined : typed, element, context),
            title,
            key,
            undefined,
            context,
          );
        },
      };
    }
    case 'quantity': {
      const { quantity, optional } = editor;
      const si = editor.si(element, context);
      const initial = si === undefined ? '' : formatForEditing(si, quantity, context.units);
      return {
        by: 'quantity',
        initial,
        optional,
        units: unitsAccepted(quantity).slice(0, 4),
        propose: (text) => {
          const typed = text.trim();
          // what was not touched is not rounded
          if (typed === initial) return { ok: true, ops: [] };
          if (typed === '') {
            return optional
              ? tried(editor.propose(undefined, element, context), title, key, quantity, context)
              : empty();
          }
          const parsed = parseQuantity(typed, quantity, context.units);
          return parsed.ok ? tried(editor.propose(parsed.si, element, context), title, key, quantity, context) : parsed;
        },
        echo: (text) => {
          const parsed = text.trim() === '' ? undefined : parseQuantity(text, quantity, context.units);
          return parsed?.ok === true ? parsed.echo : '';
        },
      };
    }
  }
}

/** The reducer's own judgement before the edit is made, so that a refusal stands at the cell; ops that change nothing fall away. */
function tried(
  proposal: Proposal,
  title: string,
  key: string,
  quantity: QuantityKind | undefined,
  { document, units }: ListContext,
): Proposal {
  if (!proposal.ok) return proposal;
  const ops = proposal.ops.filter(changesSomething);
  const applied = applyBatch(document, ops);
  if (applied.ok) return { ok: true, ops };
  const reasons = applied.errors.map(({ detail }) => inWords(detail, title, key, quantity, units));
  return { ok: false, reason: reasons.join(' ') };
}

function changesSomething(op: EditOp): boolean {
  return op.op !== 'set' || !jsonEqual(op.from, op.to);
}

/** "subcoolingK must be at most 300" as the column's title with the bound in the person's unit. */
function inWords(
  detail: string,
  title: string,
  key: string,
  quantity: QuantityKind | undefined,
  units: DisplayUnits,
): string {
  const named = detail.replace(new RegExp(`^${key}\\b`), title);
  if (quantity === undefined || named === detail) return `${named}.`;
  return `${named.replace(/(?<= )-?\d[\d.e+]*$/, (si) => formatQuantity(Number(si), quantity, units, { withUnit: true }))}.`;
}

/** What a text cell holds while it is edited: a pipe's ends by tag, everything else as stored. */
function textOf(element: ListedElement, key: string, { document }: ListContext): string {
  const value = new Map<string, unknown>(Object.entries(element)).get(key);
  if (typeof value !== 'string') return '';
  return key === 'from' || key === 'to' ? (document.nodes.get(value)?.value.tag ?? value) : value;
}

function nameOf(element: ListedElement | undefined, id: string): string {
  if (element === undefined) return id;
  if ('name' in element) return element.name;
  return element.tag ?? element.id;
}

import {
  applyBatch,
  type EditOp,
  FileNode,
  Gauge,
  makeSetOp,
  mistakesOf,
  type NetworkDocument,
  newElementId,
  nextOrdinal,
  PipeRun,
  type Placed,
  TrapModel,
} from '@riseback/network';
import { inWords } from '../cell-editor';
import type { Column, ListContext, ListedElement } from '../columns/column';
import type { ListedCollection } from '../list-definitions';
import {
  type BadCell,
  type BlockPlan,
  type BlockRow,
  MAXIMUM_OPS,
  type PlannedRow,
  type PlanOptions,
} from './block-plan';
import { nearlyEqual } from './nearly-equal';
import { arrangingOps, newlyJoined, placesBelow } from './new-places';
import { readCell, readEmptyCell, writtenText } from './read-cell';
import { findRow, type RowTarget } from './row-target';
import type { RowRules } from './row-rules';

const SCHEMAS = { nodes: FileNode, pipes: PipeRun, trapModels: TrapModel, gauges: Gauge } as const;

export interface DraftedList<E> {
  readonly collection: ListedCollection;
  readonly one: string;
  readonly columns: readonly Column<E>[];
  readonly elements: readonly E[];
  readonly rules: RowRules<E>;
}

/** A row on its way from texts to an element. */
interface Draft<E> {
  readonly row: BlockRow;
  readonly target: RowTarget<E>;
  element: E;
  /** Keys that cells have set. */
  readonly touched: Set<string>;
  readonly bad: BadCell[];
}

/**
 * Reads rows of a spreadsheet as changes of a list: rows that name an element of it change that, the others become new ones, placed
 * where nothing stands. The columns' own editors read the cells, so that what can be typed can be pasted.
 */
export function draftRows<E extends ListedElement>(
  list: DraftedList<E>,
  rows: readonly BlockRow[],
  context: ListContext,
  { arrange = false }: PlanOptions = {},
): BlockPlan {
  const drafts = begun(list, rows, context);
  const whole = { ...context, document: withBlanks(list, drafts, context.document) };
  for (const draft of drafts) readRow(list, draft, whole);
  const bad = drafts.flatMap((draft) => draft.bad);
  const planned = drafts.map((draft) => plannedRow(draft, list));
  const nothing = { rows: planned, bad, ops: [], arrangeable: 0 };
  if (bad.length > 0) return { ...nothing, refusal: '' };
  const changing = opsOf(list, drafts, context.document);
  const pipes = changing.flatMap((op) => (op.op === 'add' && op.in === 'pipes' ? [PipeRun.parse(op.value)] : []));
  const arrangeable = newlyJoined(context.document, pipes).length;
  const ops = arrange && arrangeable > 0 ? [...changing, ...arrangingOps(context.document, pipes)] : changing;
  const refusal = refusalOf(ops, context.document);
  return refusal === '' ? { rows: planned, bad, ops, arrangeable, refusal } : { ...nothing, refusal };
}

/** Mistakes of a hostile block could be thousands. */
const MISTAKES_TOLD = 5;

function refusalOf(ops: readonly EditOp[], document: NetworkDocument): string {
  if (ops.length > MAXIMUM_OPS) {
    const [count, most] = [ops.length, MAXIMUM_OPS].map((number) => number.toLocaleString('en'));
    return `These are ${count ?? ''} changes; one step takes ${most ?? ''}. Take the rows in parts.`;
  }
  const applied = applyBatch(document, ops);
  if (applied.ok) return '';
  return applied.errors
    .slice(0, MISTAKES_TOLD)
    .map(({ detail }) => `${detail}.`)
    .join(' ');
}

function begun<E extends ListedElement>(
  list: DraftedList<E>,
  rows: readonly BlockRow[],
  { document }: ListContext,
): Draft<E>[] {
  const find = findRow(list, document);
  const ids: string[] = [];
  return rows.map((row) => {
    const target = find(row);
    if (target.element !== undefined) return { row, target, element: target.element, touched: new Set(), bad: [] };
    const id = numberedId(document, list.rules.prefix(row.texts), ids);
    return { row, target, element: list.rules.blank(id, row.texts), touched: new Set(), bad: [] };
  });
}

/** Counts on from the ids given out, so that a long block need not search the document for each of its rows. */
function numberedId(document: NetworkDocument, prefix: string, given: string[]): string {
  const last = given.findLast((id) => id.startsWith(prefix));
  const id =
    last === undefined ? newElementId(document, prefix) : `${prefix}${String(Number(last.slice(prefix.length)) + 1)}`;
  given.push(id);
  return id;
}

/** The document with the new rows in it, so that editors find their elements. Never applied. */
function withBlanks<E extends ListedElement>(
  list: DraftedList<E>,
  drafts: readonly Draft<E>[],
  document: NetworkDocument,
): NetworkDocument {
  const collection = new Map<string, Placed<ListedElement>>(document[list.collection]);
  for (const { target, element } of drafts)
    if (target.element === undefined) collection.set(element.id, { ordinal: collection.size, value: element });
  return { ...document, [list.collection]: collection };
}

function readRow<E extends ListedElement>(list: DraftedList<E>, draft: Draft<E>, context: ListContext): void {
  const { row, target } = draft;
  if (target.refusal !== undefined) {
    draft.bad.push(badCell(list, draft, list.rules.name, target.refusal));
    return;
  }
  const set = (keys: Readonly<Record<string, unknown>>): void => {
    draft.element = { ...draft.element, ...keys };
    for (const key of Object.keys(keys)) draft.touched.add(key);
  };
  const take = (ops: readonly EditOp[]): void => {
    for (const op of ops) set(op.op === 'set' && op.in !== 'network' ? { [op.key]: op.to } : {});
  };
  if (target.newName !== undefined) set({ [list.rules.name]: target.newName });
  const together = list.rules.together?.(row.texts, draft.element, context.document);
  if (together !== undefined) set(together.set);
  const done = new Set([list.rules.name, ...(together?.done ?? [])]);
  for (const column of list.columns) {
    const text = row.texts.get(column.key) ?? '';
    if (text.trim() === '' || done.has(column.key)) continue;
    if (target.element !== undefined && text.trim() === writtenText(column, target.element, context)) continue;
    const read = readCell(column, text, draft.element, context);
    if (read.ok) take(read.ops);
    else draft.bad.push(badCell(list, draft, column.key, read.reason, read.suggestion));
  }
  // a new row has nothing to clear
  const emptied = new Set(target.element === undefined ? [] : row.emptied);
  for (const column of list.columns) {
    if (!emptied.has(column.key) || done.has(column.key)) continue;
    const read = readEmptyCell(column, draft.element, context);
    if (read?.ok === true) take(read.ops);
    else if (read !== undefined) draft.bad.push(badCell(list, draft, column.key, read.reason, read.suggestion));
  }
  if (draft.bad.length === 0) draft.bad.push(...mistakesIn(list, draft, context));
}

/** What the network's own schema says of the row as a whole, at the column that it is about. */
function mistakesIn<E extends ListedElement>(list: DraftedList<E>, draft: Draft<E>, { units }: ListContext): BadCell[] {
  const value = stored(list, draft);
  const read = SCHEMAS[list.collection].safeParse(value);
  if (read.success) return [];
  return mistakesOf(read.error, value).map(({ pointer, detail }) => {
    const column = columnAt(list, pointer);
    const words = inWords(detail, column, units);
    const missing = detail.endsWith('is missing');
    return badCell(
      list,
      draft,
      column.key,
      missing ? `${column.title} is missing: a new ${list.one} needs it.` : words,
    );
  });
}

/** The innermost key of a pointer that is a column; keys that two columns share stand under the first of them. */
function columnAt<E>({ columns, rules }: DraftedList<E>, pointer: string): Column<E> {
  const named = pointer.split('/').reverse();
  for (const key of [...named, rules.whole, rules.name]) {
    const column = columns.find((each) => each.key === key);
    if (column !== undefined) return column;
  }
  throw new RangeError(`The list has no column ${rules.name}`);
}

function badCell<E extends ListedElement>(
  list: DraftedList<E>,
  { row, target }: Draft<E>,
  key: string,
  reason: string,
  suggestion?: string,
): BadCell {
  return {
    row: row.number,
    rowName: target.name,
    key,
    title: list.columns.find((column) => column.key === key)?.title ?? key,
    text: row.texts.get(key) ?? '',
    reason,
    ...(suggestion === undefined ? {} : { suggestion }),
  };
}

function plannedRow<E extends ListedElement>(draft: Draft<E>, list: DraftedList<E>): PlannedRow {
  const { row, target, bad } = draft;
  const fate =
    bad.length > 0
      ? 'bad'
      : target.element === undefined
        ? 'new'
        : changes(draft, list).length > 0
          ? 'changed'
          : 'same';
  return { number: row.number, name: target.name, fate };
}

/** What is written down of a row: all of an element that was there, of a new one only what its cells gave. */
function stored<E extends ListedElement>(
  { rules }: DraftedList<E>,
  { target, element, touched }: Draft<E>,
): Record<string, unknown> {
  const keep = new Set([...rules.fixed, ...touched]);
  const entries = Object.entries(element).filter(
    ([key, value]) => value !== undefined && (target.element !== undefined || keep.has(key)),
  );
  return Object.fromEntries(entries);
}

function changes<E extends ListedElement>(
  { target, element, touched }: Draft<E>,
  { collection }: DraftedList<E>,
): EditOp[] {
  const before = new Map<string, unknown>(Object.entries(target.element ?? {}));
  const after = new Map<string, unknown>(Object.entries(element));
  return [...touched]
    .filter((key) => !nearlyEqual(before.get(key), after.get(key)))
    .map((key) => makeSetOp(collection, element.id, key, before.get(key), after.get(key)));
}

function opsOf<E extends ListedElement>(
  list: DraftedList<E>,
  drafts: readonly Draft<E>[],
  document: NetworkDocument,
): EditOp[] {
  const fresh = drafts.filter(({ target }) => target.element === undefined);
  const values = fresh.map((draft) => stored(list, draft));
  const places = list.collection === 'nodes' ? placesBelow(document, values.length) : [];
  const first = nextOrdinal(document, list.collection);
  return [
    ...drafts.filter(({ target }) => target.element !== undefined).flatMap((draft) => changes(draft, list)),
    ...values.map((value, index): EditOp => {
      const position = places[index];
      return {
        op: 'add',
        in: list.collection,
        ordinal: first + index,
        value: position === undefined ? value : { ...value, position },
      };
    }),
  ];
}

import { type CollectionName, type NetworkDocument, setOp } from '@riseback/network';
import type { QuantityKind } from '@riseback/units';
import type { Choice, Column, ColumnGroup, ListContext, ListedElement, Proposal } from './column';

interface Head {
  readonly title: string;
  readonly group?: ColumnGroup;
  readonly widthPx: number;
  readonly minor?: true;
}
type KeyOf<E, V> = { [K in keyof E]-?: E[K] extends V | undefined ? K : never }[keyof E] & string;
/** A key that a stored element may lack. Keys with a default are always there, so they say so themselves. */
type Optional = { readonly optional?: boolean };

/** A column of one number of the element, which takes typed units. */
export function quantityColumn<E extends ListedElement>(
  collection: CollectionName,
  key: KeyOf<E, number>,
  quantity: QuantityKind,
  { optional = false, ...head }: Head & Optional,
): Column<E> {
  const si = (element: E): number | undefined => numberAt(element, key);
  return {
    group: 'inputs',
    ...head,
    key,
    quantity,
    value: si,
    editor: {
      by: 'quantity',
      quantity,
      optional,
      si,
      propose: (to, element, { document }) => keySet(document, collection, element.id, key, to),
    },
  };
}

/** A column of one text of the element. */
export function textColumn<E extends ListedElement>(
  collection: CollectionName,
  key: KeyOf<E, string>,
  {
    optional = true,
    maxLength,
    suggestions,
    ...head
  }: Head & Optional & { maxLength: number; suggestions?: (context: ListContext) => readonly string[] },
): Column<E> {
  return {
    group: 'inputs',
    ...head,
    key,
    value: (element) => textAt(element, key),
    editor: {
      by: 'text',
      optional,
      maxLength,
      ...(suggestions === undefined ? {} : { suggestions }),
      propose: (text, element, { document }) => keySet(document, collection, element.id, key, text),
    },
  };
}

/** A column of one word out of a fixed set. `none` names the choice that removes the key. */
export function choiceColumn<E extends ListedElement, V extends string>(
  collection: CollectionName,
  key: KeyOf<E, string>,
  words: Readonly<Record<V, string>>,
  { none, ...head }: Head & { none?: string },
): Column<E> {
  const choices: Choice[] = [
    ...(none === undefined ? [] : [{ value: '', word: none }]),
    ...Object.entries<string>(words).map(([value, word]) => ({ value, word })),
  ];
  const wordOf = new Map(choices.map(({ value, word }) => [value, word]));
  return {
    group: 'inputs',
    ...head,
    key,
    value: (element) => {
      const value = textAt(element, key);
      return value === undefined ? undefined : (wordOf.get(value) ?? value);
    },
    editor: {
      by: 'choice',
      choices: () => choices,
      chosen: (element) => textAt(element, key) ?? '',
      propose: (value, element, { document }) =>
        keySet(document, collection, element.id, key, value === '' ? undefined : value),
    },
  };
}

/** A column of a result: read-only, to the right of the double line. */
export function resultColumn<E extends ListedElement>(
  key: string,
  quantity: QuantityKind,
  head: { title: string; widthPx: number; minor?: true },
  value: (element: E, context: ListContext) => number | undefined,
): Column<E> {
  return { ...head, key, quantity, group: 'result', value };
}

/** One key of one element. */
export function keySet(
  document: NetworkDocument,
  collection: CollectionName,
  id: string,
  key: string,
  to: unknown,
): Proposal {
  return { ok: true, ops: [setOp(document, collection, id, key, to)] };
}

function numberAt(element: ListedElement, key: string): number | undefined {
  const value = valueAt(element, key);
  return typeof value === 'number' ? value : undefined;
}

function textAt(element: ListedElement, key: string): string | undefined {
  const value = valueAt(element, key);
  return typeof value === 'string' ? value : undefined;
}

function valueAt(element: ListedElement, key: string): unknown {
  return new Map<string, unknown>(Object.entries(element)).get(key);
}

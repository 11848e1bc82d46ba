import { type NetworkDocument, type NetworkNode, inOrder } from '@riseback/network';
import type { ListedElement } from '../columns/column';
import type { BlockRow } from './block-plan';
import type { DraftedList } from './draft-rows';

/** Which element a row of a block is for. */
export interface RowTarget<E> {
  /** What to call the row. */
  readonly name: string;
  /** Absent where the row becomes a new element. */
  readonly element?: E;
  /** The tag that it is to get; a row that was found keeps its own. */
  readonly newName?: string;
  /** Why it is for none. */
  readonly refusal?: string;
}

/** Finds rows by their tags (else ids), each element once. */
export function findRow<E extends ListedElement>(
  list: DraftedList<E>,
  document: NetworkDocument,
): (row: BlockRow) => RowTarget<E> {
  const byName = grouped(list.elements, (element) => nameAt(element, list.rules.name));
  const byId = grouped(list.elements, ({ id }) => id);
  const strangers = namesElsewhere(list, document);
  const seen = new Map<string, number>();
  return ({ number, texts, onto }) => {
    if (onto !== undefined) return targetById(list.elements, onto);
    const name = (texts.get(list.rules.name) ?? '').trim();
    if (name === '')
      return {
        name: `Row ${String(number)}`,
        refusal: `Without a ${list.rules.name} nobody can tell which ${list.one} this row is. Type one, or leave the row out.`,
      };
    const folded = name.toLowerCase();
    const before = seen.get(folded);
    if (before !== undefined)
      return { name, refusal: `Row ${String(before)} has this ${list.rules.name} too. Change one, or leave one out.` };
    seen.set(folded, number);
    const [found, another] = byName.get(folded) ?? byId.get(folded) ?? [];
    if (another !== undefined)
      return { name, refusal: `Several rows of the list are called ${name}. Give them different names first.` };
    if (found !== undefined) return { name, element: found };
    const stranger = strangers.get(folded);
    if (stranger !== undefined) return { name, refusal: `${name} is the tag of a ${stranger}. Choose another tag.` };
    return { name, newName: name };
  };
}

const KIND_WORDS: Readonly<Record<NetworkNode['kind'], string>> = {
  trap: 'trap',
  junction: 'junction',
  receiver: 'receiver',
  flashVessel: 'flash vessel',
  pumpedInlet: 'pumped inlet',
};

function targetById<E extends ListedElement>(elements: readonly E[], id: string | null): RowTarget<E> {
  const element = elements.find((each) => each.id === id);
  if (element !== undefined) return { name: nameAt(element, 'tag') ?? nameAt(element, 'name') ?? element.id, element };
  return {
    name: 'no row',
    refusal: 'The list has no row left for this one. Copy the column of the tags too, and it becomes a new element.',
  };
}

/** Tags that other kinds of nodes have: a pipe that names one would not know which is meant. */
function namesElsewhere<E extends ListedElement>(
  { collection, elements }: DraftedList<E>,
  document: NetworkDocument,
): ReadonlyMap<string, string> {
  if (collection !== 'nodes') return new Map();
  const own = new Set(elements.map(({ id }) => id));
  return new Map(
    inOrder(document.nodes).flatMap(([id, { value }]) =>
      own.has(id) || value.tag === undefined ? [] : [[value.tag.toLowerCase(), KIND_WORDS[value.kind]] as const],
    ),
  );
}

function grouped<E>(elements: readonly E[], nameOf: (element: E) => string | undefined): Map<string, E[]> {
  const groups = new Map<string, E[]>();
  for (const element of elements) {
    const name = nameOf(element)?.toLowerCase();
    if (name === undefined) continue;
    const group = groups.get(name);
    if (group === undefined) groups.set(name, [element]);
    else group.push(element);
  }
  return groups;
}

function nameAt(element: ListedElement, key: 'tag' | 'name'): string | undefined {
  const value = new Map<string, unknown>(Object.entries(element)).get(key);
  return typeof value === 'string' ? value : undefined;
}

import { type EditOp, type NetworkDocument, removalOps, withDependents } from '@riseback/network';
import type { ListFacts, ListedCollection } from './list-definitions';

export interface Deletion {
  readonly title: string;
  readonly along: readonly string[];
  readonly label: string;
  readonly ops: readonly EditOp[];
}

const NAMES_SHOWN = 6;

/** What deleting rows of a list comes to: what goes along in words, and the ops. */
export function deletionOf(
  document: NetworkDocument,
  { collection, one, many }: Pick<ListFacts, 'collection' | 'one' | 'many'>,
  ids: readonly string[],
): Deletion {
  const going = withDependents(document, { [collection]: ids });
  const gone = new Set(ids);
  const [first = ''] = ids;
  const what = ids.length === 1 ? `${one} ${nameIn(document, collection, first)}` : `${String(ids.length)} ${many}`;
  const pipes = going.pipes.filter((id) => collection !== 'pipes' || !gone.has(id));
  return {
    title: `Delete ${what}?`,
    along: [
      ...named(
        pipes.map((id) => nameIn(document, 'pipes', id)),
        'pipe',
        'pipes',
      ),
      ...counted(going.overrides.length, 'setting of an operating case', 'settings of operating cases'),
      ...counted(collection === 'gauges' ? 0 : going.gauges.length, 'gauge', 'gauges'),
      ...(collection === 'trapModels' ? forgetting(document, gone) : []),
    ],
    label: `delete ${what}`,
    ops: removalOps(document, { [collection]: ids }),
  };
}

function forgetting(document: NetworkDocument, models: ReadonlySet<string>): string[] {
  const traps = [...document.nodes.values()].flatMap(({ value }) =>
    value.kind === 'trap' && value.trapModel !== undefined && models.has(value.trapModel)
      ? [value.tag ?? value.id]
      : [],
  );
  return named(traps, 'trap then has no model:', 'traps then have no model:');
}

function named(names: readonly string[], one: string, many: string): string[] {
  if (names.length === 0) return [];
  const shown = names.slice(0, NAMES_SHOWN).join(', ');
  const rest = names.length > NAMES_SHOWN ? ` and ${String(names.length - NAMES_SHOWN)} more` : '';
  return [`${String(names.length)} ${names.length === 1 ? one : many} ${shown}${rest}`];
}

function counted(count: number, one: string, many: string): string[] {
  return count === 0 ? [] : [`${String(count)} ${count === 1 ? one : many}`];
}

function nameIn(document: NetworkDocument, collection: ListedCollection, id: string): string {
  const element = document[collection].get(id)?.value;
  if (element === undefined) return id;
  return 'name' in element ? element.name : (element.tag ?? element.id);
}

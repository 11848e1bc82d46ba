import {
  type Collections,
  compareIds,
  type FileCase,
  isObject,
  jsonEqual,
  type NetworkFile,
  type Override,
  overrideId,
} from '@riseback/network';

/** What a comparison tells elements of by; the names are those of an edit's operations. */
export type ComparedCollection = keyof Collections;

/** An element as the file has it: a case with its overrides. */
export type ComparedElement = NetworkFile['nodes' | 'pipes' | 'trapModels' | 'cases' | 'gauges'][number] | Override;

/** A key of an element; undefined where the one or the other does not give it. */
export interface KeyChange {
  readonly key: string;
  readonly from: unknown;
  readonly to: unknown;
  /** Where it stands on the sheet, and nothing else. */
  readonly drawingOnly: boolean;
}

export interface ElementChange {
  readonly in: ComparedCollection;
  /** Of an override `caseId/nodeId`, as in a network document. */
  readonly id: string;
  readonly kind: 'added' | 'removed' | 'changed';
  readonly before: ComparedElement | undefined;
  readonly after: ComparedElement | undefined;
  /** What a changed element, or an override added or removed, differs in; of any other the element as a whole is the change. */
  readonly keys: readonly KeyChange[];
}

/** A setting of the network as a whole: `['name']`, `['method', 'friction']`, `['limits', 'velocity', 'failMS']`. */
export interface SettingChange {
  readonly path: readonly string[];
  readonly from: unknown;
  readonly to: unknown;
}

export interface NetworkComparison {
  readonly settings: readonly SettingChange[];
  /** By collection, in the order of the later file, and what it does not have any more behind. */
  readonly elements: readonly ElementChange[];
  /** Collections whose common elements are listed in another order. Nothing is computed otherwise for it. */
  readonly reordered: readonly ComparedCollection[];
}

/** Keys that place a symbol on the sheet. */
const DRAWING_KEYS: ReadonlySet<string> = new Set(['position', 'bends']);
const SETTINGS = ['site', 'method', 'limits'] as const;
const LISTS = ['nodes', 'pipes', 'trapModels', 'gauges'] as const;

/**
 * What differs between two network files. Elements are the same by their id, which never changes; a tag is a key like any other.
 * What cases change at a node is told key by key, of a case that both have: an added or removed case carries its own.
 */
export function compareNetworks(before: NetworkFile, after: NetworkFile): NetworkComparison {
  const [nodes, pipes, trapModels, gauges] = LISTS.map((list) => compareLists(list, before[list], after[list]));
  const elements = [nodes, pipes, trapModels, compareCases(before.cases, after.cases), gauges];
  const ofOverrides = commonCases(before, after).map(([was, is]) => compareOverrides(was, is));
  return {
    settings: [
      ...(before.name === after.name ? [] : [{ path: ['name'], from: before.name, to: after.name }]),
      ...SETTINGS.flatMap((setting) => settingChanges([setting], before[setting], after[setting])),
    ],
    elements: [...elements.flatMap((some) => some ?? []), ...ofOverrides.flat()],
    reordered: reorderedLists(before, after),
  };
}

/** How many values differ, those that only place a symbol apart: an element added or removed counts as one. */
export function countChanges({ settings, elements }: NetworkComparison): { inputs: number; drawingOnly: number } {
  const keys = elements.flatMap((element) => element.keys);
  const drawingOnly = keys.filter((change) => change.drawingOnly).length;
  const whole = elements.filter((element) => element.keys.length === 0).length;
  return { inputs: settings.length + whole + keys.length - drawingOnly, drawingOnly };
}

type Listed = { readonly id: string } & ComparedElement;

function compareLists(
  name: ComparedCollection,
  before: readonly Listed[],
  after: readonly Listed[],
  except: ReadonlySet<string> = new Set(),
): ElementChange[] {
  const earlier = new Map(before.map((element) => [element.id, element]));
  const later = new Set(after.map(({ id }) => id));
  const changed = after.flatMap((element): ElementChange[] => {
    const { id } = element;
    const was = earlier.get(id);
    if (was === undefined) return [{ in: name, id, kind: 'added', before: undefined, after: element, keys: [] }];
    const keys = keyChanges(was, element, except);
    return keys.length === 0 ? [] : [{ in: name, id, kind: 'changed', before: was, after: element, keys }];
  });
  const gone = before.filter(({ id }) => !later.has(id));
  return [
    ...changed,
    ...gone.map((was): ElementChange => {
      return { in: name, id: was.id, kind: 'removed', before: was, after: undefined, keys: [] };
    }),
  ];
}

function compareCases(before: readonly FileCase[], after: readonly FileCase[]): ElementChange[] {
  return compareLists('cases', before, after, new Set(['overrides']));
}

/** An override that is not there changes nothing: what is added or taken away are its keys. */
function compareOverrides(before: FileCase, after: FileCase): ElementChange[] {
  const [earlier, later] = [byNode(before), byNode(after)];
  return [...new Set([...later.keys(), ...earlier.keys()])].flatMap((node): ElementChange[] => {
    const [was, is] = [earlier.get(node), later.get(node)];
    const kind = was === undefined ? 'added' : is === undefined ? 'removed' : 'changed';
    const keys = keyChanges(was ?? { node }, is ?? { node }, new Set());
    if (kind === 'changed' && keys.length === 0) return [];
    return [{ in: 'overrides', id: overrideId(after.id, node), kind, before: was, after: is, keys }];
  });
}

function byNode({ overrides }: FileCase): ReadonlyMap<string, Override> {
  return new Map(overrides.map((override) => [override.node, override]));
}

function commonCases(before: NetworkFile, after: NetworkFile): [was: FileCase, is: FileCase][] {
  const earlier = new Map(before.cases.map((operatingCase) => [operatingCase.id, operatingCase]));
  return after.cases.flatMap((is): [FileCase, FileCase][] => {
    const was = earlier.get(is.id);
    return was === undefined ? [] : [[was, is]];
  });
}

function keyChanges(before: object, after: object, except: ReadonlySet<string>): KeyChange[] {
  const changes: KeyChange[] = [];
  for (const key of keysOfBoth(before, after)) {
    const [from, to] = [valueAt(before, key), valueAt(after, key)];
    if (jsonEqual(from, to) || except.has(key)) continue;
    changes.push({ key, from, to, drawingOnly: DRAWING_KEYS.has(key) });
  }
  return changes;
}

/** Settings lie in each other: what differs is told of the innermost, which has a name of its own. */
function settingChanges(path: readonly string[], from: unknown, to: unknown): SettingChange[] {
  if (jsonEqual(from, to)) return [];
  const [earlier, later] = [from ?? {}, to ?? {}];
  if (!isObject(earlier) || !isObject(later)) return [{ path, from, to }];
  const keys = keysOfBoth(earlier, later).sort(compareIds);
  return keys.flatMap((key) => settingChanges([...path, key], valueAt(earlier, key), valueAt(later, key)));
}

function reorderedLists(before: NetworkFile, after: NetworkFile): ComparedCollection[] {
  const lists = [...LISTS, 'cases' as const].filter((list) =>
    inAnotherOrder(
      before[list].map(({ id }) => id),
      after[list].map(({ id }) => id),
    ),
  );
  const overrides = commonCases(before, after).some(([was, is]) =>
    inAnotherOrder([...byNode(was).keys()], [...byNode(is).keys()]),
  );
  return overrides ? [...lists, 'overrides'] : lists;
}

/** Whether what both have stands in another order, whatever was put in or taken out between. */
function inAnotherOrder(before: readonly string[], after: readonly string[]): boolean {
  const [earlier, later] = [new Set(before), new Set(after)];
  const common = before.filter((id) => later.has(id));
  return after.filter((id) => earlier.has(id)).some((id, i) => id !== common[i]);
}

/** The later one's first. A network has thousands of elements, most of them with the same keys: nothing is made for each. */
function keysOfBoth(before: object, after: object): string[] {
  const keys = Object.keys(after);
  for (const key of Object.keys(before)) if (!Object.hasOwn(after, key)) keys.push(key);
  return keys;
}

function valueAt(value: object, key: string): unknown {
  return Object.hasOwn(value, key) ? (value as Readonly<Record<string, unknown>>)[key] : undefined;
}

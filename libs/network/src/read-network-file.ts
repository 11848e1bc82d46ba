import * as z from 'zod';
import { isObject } from './json-value';
import { jsonPointer, mistakesOf, quoted, type FileMistake } from './mistakes';
import {
  FileCase,
  FileNode,
  FileTrapModel,
  Gauge,
  MAXIMUM_ELEMENTS,
  NetworkFileShape,
  PipeRun,
  type NetworkFile,
  type NodeKind,
} from './network-file';
import { misfitDetail, misfitKeys, OVERRIDE_KEYS } from './override-keys';

/** People mend a file in rounds: more mistakes than this help nobody, and a hostile file could hold millions. */
export const MAXIMUM_MISTAKES = 100;

export type ReadNetworkFile =
  { readonly ok: true; readonly file: NetworkFile } | { readonly ok: false; readonly errors: FileMistake[] };

const ELEMENTS = {
  nodes: FileNode,
  pipes: PipeRun,
  trapModels: FileTrapModel,
  cases: FileCase,
  gauges: Gauge,
} as const;
type FileCollection = keyof typeof ELEMENTS;
type Elements = { [C in FileCollection]: z.infer<(typeof ELEMENTS)[C]>[] };

const anything = (collection: FileCollection) => z.array(z.unknown()).max(MAXIMUM_ELEMENTS[collection]).default([]);
/** The file but for its elements, which are read one by one, so that reading can stop where nobody would read on. */
const FileFrame = z.strictObject({
  ...NetworkFileShape.shape,
  nodes: anything('nodes'),
  pipes: anything('pipes'),
  trapModels: anything('trapModels'),
  cases: anything('cases'),
  gauges: anything('gauges'),
});

/**
 * Reads parsed JSON of any origin as a network file, defaults filled in, or names every mistake with its pointer
 * (the first {@link MAXIMUM_MISTAKES}, and a closing note). Never throws.
 */
export function readNetworkFile(json: unknown): ReadNetworkFile {
  const found = new MistakeList();
  const frame = FileFrame.safeParse(json);
  if (!frame.success) found.add(mistakesOf(frame.error, json));
  if (!isObject(json)) return { ok: false, errors: found.report() };

  const elements: Elements = {
    nodes: readElements('nodes', json, found),
    pipes: readElements('pipes', json, found),
    trapModels: readElements('trapModels', json, found),
    cases: readElements('cases', json, found),
    gauges: readElements('gauges', json, found),
  };
  checkIds(json, found);
  checkReferences(json, found);
  if (!frame.success || !found.isEmpty()) return { ok: false, errors: found.report() };
  return { ok: true, file: { ...frame.data, ...elements } };
}

class MistakeList {
  private readonly mistakes: FileMistake[] = [];

  isEmpty(): boolean {
    return this.mistakes.length === 0;
  }

  isFull(): boolean {
    return this.mistakes.length > MAXIMUM_MISTAKES;
  }

  add(mistakes: readonly FileMistake[]): void {
    // one above the maximum is kept, to know whether a closing note is due
    this.mistakes.push(...mistakes.slice(0, MAXIMUM_MISTAKES + 1 - this.mistakes.length));
  }

  report(): FileMistake[] {
    if (!this.isFull()) return this.mistakes;
    const note = { pointer: '', detail: `There are more mistakes; these are the first ${MAXIMUM_MISTAKES}` };
    return [...this.mistakes.slice(0, MAXIMUM_MISTAKES), note];
  }
}

function readElements<C extends FileCollection>(
  collection: C,
  json: Record<string, unknown>,
  found: MistakeList,
): Elements[C] {
  // the schema belongs to C, which the compiler cannot follow through the table
  const schema = ELEMENTS[collection] as unknown as z.ZodType<Elements[C][number]>;
  const elements: Elements[C][number][] = [];
  for (const [index, value] of rawList(json, collection).entries()) {
    if (found.isFull()) break;
    const path = [collection, index];
    const tooLong = longLists(value, path);
    if (tooLong.length > 0) {
      found.add(tooLong);
      continue;
    }
    const read = schema.safeParse(value);
    if (read.success) elements.push(read.data);
    else found.add(mistakesOf(read.error, value, path));
  }
  return elements as Elements[C];
}

/** Lists that no element can have: zod would check each item before it counts them. */
function longLists(element: unknown, path: readonly PropertyKey[]): FileMistake[] {
  if (!isObject(element)) return [];
  return Object.entries(element)
    .filter(([, value]) => Array.isArray(value) && value.length > MAXIMUM_ELEMENTS.overrides)
    .map(([key]) => ({
      pointer: jsonPointer([...path, key]),
      detail: `${quoted(key)} must have at most ${MAXIMUM_ELEMENTS.overrides} items`,
    }));
}

/** The list of a collection up to its maximum; what lies beyond is one mistake of the frame. */
function rawList(json: Record<string, unknown>, collection: FileCollection): unknown[] {
  const value = Object.hasOwn(json, collection) ? json[collection] : undefined;
  return Array.isArray(value) ? value.slice(0, MAXIMUM_ELEMENTS[collection]) : [];
}

function text(element: unknown, key: string): string | undefined {
  const value = isObject(element) && Object.hasOwn(element, key) ? element[key] : undefined;
  return typeof value === 'string' ? value : undefined;
}

/** Ids are unique over nodes and pipes together, and within each other collection; a case overrides a node once. */
function checkIds(json: Record<string, unknown>, found: MistakeList): void {
  const firstPlace = new Map<string, string>();
  checkUnique(json, 'nodes', firstPlace, found);
  checkUnique(json, 'pipes', firstPlace, found);
  for (const collection of ['trapModels', 'cases', 'gauges'] as const) checkUnique(json, collection, new Map(), found);
}

function checkUnique(
  json: Record<string, unknown>,
  collection: FileCollection,
  firstPlace: Map<string, string>,
  found: MistakeList,
): void {
  for (const [index, element] of rawList(json, collection).entries()) {
    const id = text(element, 'id');
    if (id === undefined) continue;
    const pointer = jsonPointer([collection, index, 'id']);
    const first = firstPlace.get(id);
    if (first === undefined) firstPlace.set(id, pointer);
    else
      found.add([{ pointer, detail: `The id ${quoted(id)} is already that of ${first}; every element needs its own` }]);
  }
}

/** Every reference leads to an element of the file. It is checked on what was handed in, so that one slip names no other. */
function checkReferences(json: Record<string, unknown>, found: MistakeList): void {
  const known = {
    node: idsOf(json, 'nodes'),
    pipe: idsOf(json, 'pipes'),
    'trap model': idsOf(json, 'trapModels'),
  };
  const refer = (to: keyof typeof known, element: unknown, key: string, path: readonly PropertyKey[]): void => {
    const id = text(element, key);
    if (id === undefined || known[to].has(id)) return;
    found.add([{ pointer: jsonPointer([...path, key]), detail: `There is no ${to} ${quoted(id)}` }]);
  };
  for (const [i, node] of rawList(json, 'nodes').entries()) {
    if (text(node, 'kind') === 'trap') refer('trap model', node, 'trapModel', ['nodes', i]);
  }
  for (const [i, pipe] of rawList(json, 'pipes').entries()) {
    refer('node', pipe, 'from', ['pipes', i]);
    refer('node', pipe, 'to', ['pipes', i]);
  }
  for (const [i, gauge] of rawList(json, 'gauges').entries()) {
    refer('node', gauge, 'node', ['gauges', i]);
    refer('pipe', gauge, 'pipe', ['gauges', i]);
  }
  const kinds = kindsOf(json);
  for (const [i, operatingCase] of rawList(json, 'cases').entries()) {
    const seen = new Set<string>();
    for (const [j, override] of rawOverrides(operatingCase).entries()) {
      const path = ['cases', i, 'overrides', j];
      refer('node', override, 'node', path);
      found.add(overrideMistakes(override, path, kinds, seen));
    }
  }
}

function overrideMistakes(
  override: unknown,
  path: readonly PropertyKey[],
  kinds: ReadonlyMap<string, NodeKind>,
  seen: Set<string>,
): FileMistake[] {
  const node = text(override, 'node');
  if (node === undefined || !isObject(override)) return [];
  if (seen.has(node)) {
    return [
      { pointer: jsonPointer([...path, 'node']), detail: `This case already has an override for ${quoted(node)}` },
    ];
  }
  seen.add(node);
  const kind = kinds.get(node);
  return kind === undefined
    ? []
    : misfitKeys(override, kind).map((key) => ({
        pointer: jsonPointer([...path, key]),
        detail: misfitDetail(key, node, kind),
      }));
}

function rawOverrides(operatingCase: unknown): unknown[] {
  const value =
    isObject(operatingCase) && Object.hasOwn(operatingCase, 'overrides') ? operatingCase['overrides'] : undefined;
  return Array.isArray(value) ? value.slice(0, MAXIMUM_ELEMENTS.overrides) : [];
}

function idsOf(json: Record<string, unknown>, collection: FileCollection): Set<string> {
  return new Set(rawList(json, collection).flatMap((element) => text(element, 'id') ?? []));
}

function kindsOf(json: Record<string, unknown>): Map<string, NodeKind> {
  const kinds = new Map<string, NodeKind>();
  for (const node of rawList(json, 'nodes')) {
    const id = text(node, 'id');
    const kind = text(node, 'kind');
    if (id !== undefined && kind !== undefined && isKind(kind)) kinds.set(id, kind);
  }
  return kinds;
}

function isKind(kind: string): kind is NodeKind {
  return Object.hasOwn(OVERRIDE_KEYS, kind);
}

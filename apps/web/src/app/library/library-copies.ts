import type { LibraryModel } from '@riseback/contracts';
import {
  type EditOp,
  inOrder,
  type NetworkDocument,
  newElementId,
  nextOrdinal,
  jsonEqual,
  setOp,
  type Trap,
  type TrapModel,
} from '@riseback/network';

/** Keys that a network's copy has from the library; a trap's type is the trap's own, and retiring concerns the library only. */
const COPIED = [
  'name',
  'orificeDiameterM',
  'maximumDifferentialPa',
  'bodyPressurePa',
  'bodyTemperatureK',
  'maximumBackPressureFraction',
  'capacity',
] as const satisfies readonly (keyof LibraryModel & keyof TrapModel)[];

/** A copy in a network beside what the library holds now. */
export interface CopyNews {
  readonly copy: TrapModel;
  readonly newest: LibraryModel;
  /** `newer`: there is something to take; `retired`: the site no longer wants it chosen. */
  readonly kind: 'newer' | 'retired';
  /** Traps of this model. */
  readonly traps: readonly Trap[];
}

/** Copies that the library has moved on from, in the file's order. A newer version that changes nothing in the network is no news. */
export function newsOfCopies(document: NetworkDocument, library: readonly LibraryModel[]): CopyNews[] {
  const newestById = new Map(library.map((model) => [model.id, model]));
  return inOrder(document.trapModels).flatMap(([, { value: copy }]): CopyNews[] => {
    const newest = copy.libraryId === undefined ? undefined : newestById.get(copy.libraryId);
    if (newest === undefined || copy.libraryVersion === undefined) return [];
    const traps = trapsOf(document, copy.id);
    if (newest.retired) return [{ copy, newest, kind: 'retired', traps }];
    if (newest.version <= copy.libraryVersion || changedKeys(copy, newest).length === 0) return [];
    return [{ copy, newest, kind: 'newer', traps }];
  });
}

/** Models of the library that a network has no copy of and that may be chosen. */
export function notCopied(document: NetworkDocument, library: readonly LibraryModel[]): LibraryModel[] {
  const copied = new Set(Array.from(document.trapModels.values(), ({ value }) => value.libraryId));
  return library.filter(({ id, retired }) => !retired && !copied.has(id));
}

/** Gives a trap a model of the library: the network's copy of it, made here where there is none. */
export function chooseFromLibraryOps(document: NetworkDocument, trapId: string, model: LibraryModel): EditOp[] {
  const present = Array.from(document.trapModels.values(), ({ value }) => value).find(
    ({ libraryId }) => libraryId === model.id,
  );
  const id = present?.id ?? newElementId(document, 'M');
  const copy: EditOp[] =
    present === undefined
      ? [{ op: 'add', in: 'trapModels', ordinal: nextOrdinal(document, 'trapModels'), value: { ...copyOf(model, id) } }]
      : [];
  return [...copy, ...chooseOps(document, trapId, id)];
}

/** Gives a trap a model that the network has. */
export function chooseOps(document: NetworkDocument, trapId: string, modelId: string): EditOp[] {
  const op = setOp(document, 'nodes', trapId, 'trapModel', modelId);
  return op.from === modelId ? [] : [op];
}

/** Brings a copy to a version of the library. */
export function takeVersionOps(document: NetworkDocument, copy: TrapModel, newest: LibraryModel): EditOp[] {
  return [
    ...changedKeys(copy, newest).map((key) => setOp(document, 'trapModels', copy.id, key, newest[key])),
    setOp(document, 'trapModels', copy.id, 'libraryVersion', newest.version),
  ];
}

/** The network's own copy of a version of the library. */
export function copyOf(model: LibraryModel, id: string): TrapModel {
  const content = Object.fromEntries(COPIED.flatMap((key) => (model[key] === undefined ? [] : [[key, model[key]]])));
  return { ...content, id, name: model.name, libraryId: model.id, libraryVersion: model.version };
}

function changedKeys(copy: TrapModel, newest: LibraryModel): (typeof COPIED)[number][] {
  return COPIED.filter((key) => !jsonEqual(copy[key], newest[key]));
}

function trapsOf(document: NetworkDocument, modelId: string): Trap[] {
  return inOrder(document.nodes).flatMap(([, { value }]) =>
    value.kind === 'trap' && value.trapModel === modelId ? [value] : [],
  );
}

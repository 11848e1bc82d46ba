import { COLLECTION_NAMES, inOrder, type NetworkDocument, type Placed } from './network-document';
import { FORMAT, FORMAT_VERSION, type NetworkFile, type Override } from './network-file';
import { overrideId, splitOverrideId } from './override-keys';

/** The document of a file that `readNetworkFile` has accepted. Ordinals count from 0 in the order of each list. */
export function fromFile(file: NetworkFile): NetworkDocument {
  return {
    name: file.name,
    site: file.site,
    method: file.method,
    limits: file.limits,
    nodes: placed(file.nodes),
    pipes: placed(file.pipes),
    trapModels: placed(file.trapModels),
    cases: placed(file.cases.map(({ overrides: _, ...operatingCase }) => operatingCase)),
    overrides: new Map(
      file.cases.flatMap((operatingCase) =>
        operatingCase.overrides.map((value, ordinal) => [overrideId(operatingCase.id, value.node), { ordinal, value }]),
      ),
    ),
    gauges: placed(file.gauges),
  };
}

/** The file of a document: what `fromFile` took comes out equal. Where a trap model was copied from stays behind. */
export function toFile(document: NetworkDocument): NetworkFile {
  const overrides = overridesByCase(document);
  return {
    format: FORMAT,
    version: FORMAT_VERSION,
    name: document.name,
    site: document.site,
    method: document.method,
    limits: document.limits,
    nodes: values(document.nodes),
    pipes: values(document.pipes),
    trapModels: values(document.trapModels).map(({ libraryId: _i, libraryVersion: _v, ...model }) => model),
    cases: values(document.cases).map((operatingCase) => ({
      ...operatingCase,
      overrides: overrides.get(operatingCase.id) ?? [],
    })),
    gauges: values(document.gauges),
  };
}

/** The overrides of each case, in their order. */
export function overridesByCase(document: NetworkDocument): Map<string, Override[]> {
  const byCase = new Map<string, Override[]>();
  for (const [id, { value }] of inOrder(document.overrides)) {
    const { caseId } = splitOverrideId(id);
    const list = byCase.get(caseId);
    if (list === undefined) byCase.set(caseId, [value]);
    else list.push(value);
  }
  return byCase;
}

/** How many elements of all kinds a document holds. */
export function elementCount(document: NetworkDocument): number {
  return COLLECTION_NAMES.reduce((count, collection) => count + document[collection].size, 0);
}

function placed<T extends { readonly id: string }>(list: readonly T[]): Map<string, Placed<T>> {
  return new Map(list.map((value, ordinal) => [value.id, { ordinal, value }]));
}

function values<T>(collection: ReadonlyMap<string, Placed<T>>): T[] {
  return inOrder(collection).map(([, { value }]) => value);
}

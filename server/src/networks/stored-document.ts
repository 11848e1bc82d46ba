import type { StoredDocument } from '@riseback/contracts';
import { inOrder, splitOverrideId, type NetworkDocument, type Placed } from '@riseback/network';

/** A document as it crosses the wire: lists in the file's order, each element with its ordinal. */
export function toStoredDocument(document: NetworkDocument): StoredDocument {
  return {
    name: document.name,
    site: document.site,
    method: document.method,
    limits: document.limits,
    nodes: listed(document.nodes),
    pipes: listed(document.pipes),
    trapModels: listed(document.trapModels),
    cases: listed(document.cases),
    overrides: inOrder(document.overrides).map(([id, placed]) => ({ caseId: splitOverrideId(id).caseId, ...placed })),
    gauges: listed(document.gauges),
  };
}

function listed<T>(collection: ReadonlyMap<string, Placed<T>>): Placed<T>[] {
  return inOrder(collection).map(([, placed]) => placed);
}

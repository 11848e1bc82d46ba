import type { StoredDocument } from '@riseback/contracts';
import type { NetworkDocument, Placed } from '@riseback/network';

/** The document as the wire carries it, as the reducer wants it. */
export function toDocument(stored: StoredDocument): NetworkDocument {
  return {
    name: stored.name,
    site: stored.site,
    method: stored.method,
    limits: stored.limits,
    nodes: byId(stored.nodes),
    pipes: byId(stored.pipes),
    trapModels: byId(stored.trapModels),
    cases: byId(stored.cases),
    overrides: new Map(
      stored.overrides.map(({ caseId, ordinal, value }) => [`${caseId}/${value.node}`, { ordinal, value }]),
    ),
    gauges: byId(stored.gauges),
  };
}

function byId<T extends { id: string }>(placed: readonly Placed<T>[]): ReadonlyMap<string, Placed<T>> {
  return new Map(placed.map((element) => [element.value.id, element]));
}

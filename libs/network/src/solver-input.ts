import { canonicalText, sortedBy } from './canonical-text';
import { overridesByCase } from './document-file';
import type { NetworkDocument, Placed } from './network-document';
import type { Limits, Method, SiteConditions } from './file-settings';
import type { FileTrapModel, NetworkNode, OperatingCase, Override, PipeRun } from './network-file';

type WithoutKeys<T, K extends PropertyKey> = T extends unknown ? Omit<T, K> : never;
type SolverNode = WithoutKeys<NetworkNode, 'tag' | 'position' | 'area' | 'note'>;
type SolverPipe = Omit<PipeRun, 'tag' | 'bends' | 'area' | 'note'>;
type SolverTrapModel = Omit<FileTrapModel, 'name'>;
type SolverCase = Omit<OperatingCase, 'name'> & { readonly overrides: readonly Override[] };

/** What can change a number of a solve, and nothing else. */
export interface SolverInput {
  readonly site: SiteConditions;
  readonly method: Method;
  readonly limits: Limits;
  readonly nodes: readonly SolverNode[];
  readonly pipes: readonly SolverPipe[];
  readonly trapModels: readonly SolverTrapModel[];
  readonly cases: readonly SolverCase[];
}

/**
 * What can change a number: without names, tags, positions, bends, areas, notes and gauges, sorted by id. Two documents with equal
 * input have equal results, so that moving a symbol makes nothing stale and undo finds its old results.
 */
export function solverInput(document: NetworkDocument): SolverInput {
  const overrides = overridesByCase(document);
  return {
    site: document.site,
    method: document.method,
    limits: document.limits,
    nodes: sortedBy(values(document.nodes), 'id').map(({ tag: _t, position: _p, area: _a, note: _n, ...node }) => node),
    pipes: sortedBy(values(document.pipes), 'id').map(({ tag: _t, bends: _b, area: _a, note: _n, ...pipe }) => pipe),
    trapModels: sortedBy(values(document.trapModels), 'id').map(
      ({ name: _n, libraryId: _i, libraryVersion: _v, ...model }) => model,
    ),
    cases: sortedBy(values(document.cases), 'id').map(({ name: _, ...operatingCase }) => ({
      ...operatingCase,
      overrides: sortedBy(overrides.get(operatingCase.id) ?? [], 'node'),
    })),
  };
}

/** The RFC 8785 text of {@link solverInput}: the text behind `solver_hash`. */
export function solverInputText(document: NetworkDocument): string {
  return canonicalText(solverInput(document));
}

function values<T>(collection: ReadonlyMap<string, Placed<T>>): T[] {
  return Array.from(collection.values(), ({ value }) => value);
}

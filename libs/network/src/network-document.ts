import { Method, SiteConditions, type Limits } from './file-settings';
import {
  type Gauge,
  type NetworkNode,
  type OperatingCase,
  type Override,
  type PipeRun,
  type TrapModel,
} from './network-file';

/** An element with its place in the file's order. Elements are listed by ordinal, then id. */
export interface Placed<T> {
  readonly ordinal: number;
  readonly value: T;
}

/** What each collection of a network holds. An override's id is `caseId/nodeId`; its value carries `node` only. */
export interface Collections {
  readonly nodes: NetworkNode;
  readonly pipes: PipeRun;
  readonly trapModels: TrapModel;
  readonly cases: OperatingCase;
  readonly overrides: Override;
  readonly gauges: Gauge;
}
export type CollectionName = keyof Collections;
export const COLLECTION_NAMES = [
  'nodes',
  'pipes',
  'trapModels',
  'cases',
  'overrides',
  'gauges',
] as const satisfies readonly CollectionName[];

/** What a document holds of the network itself. */
export interface NetworkSettings {
  readonly name: string;
  readonly site: SiteConditions;
  readonly method: Method;
  readonly limits: Limits;
}

/** A network in memory. Immutable: an edit makes a new document that shares what did not change. */
export type NetworkDocument = NetworkSettings & {
  readonly [C in CollectionName]: ReadonlyMap<string, Placed<Collections[C]>>;
};

/** A network with nothing in it, by the default method. */
export function emptyDocument(name: string, site: SiteConditions = SiteConditions.parse({})): NetworkDocument {
  return {
    name,
    site,
    method: Method.parse({}),
    limits: {},
    nodes: new Map(),
    pipes: new Map(),
    trapModels: new Map(),
    cases: new Map(),
    overrides: new Map(),
    gauges: new Map(),
  };
}

/** The elements of a collection in the file's order, with their ids. */
export function inOrder<T>(collection: ReadonlyMap<string, Placed<T>>): [string, Placed<T>][] {
  return [...collection].sort(([a, left], [b, right]) => left.ordinal - right.ordinal || compareIds(a, b));
}

/** By code unit, as RFC 8785 sorts: the same on every machine, whatever its language. */
export function compareIds(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

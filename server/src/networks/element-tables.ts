import {
  Gauge,
  NetworkNode,
  OperatingCase,
  Override,
  PipeRun,
  TrapModel,
  type CollectionName,
  type Collections,
} from '@riseback/network';
import type { SQLiteColumn, SQLiteTable } from 'drizzle-orm/sqlite-core';
import type * as z from 'zod';
import { caseOverrides, cases, gauges, nodes, pipes, trapModels } from '../platform/db/schema';

/** The columns that every table of elements has. */
type ElementColumns = Record<'networkId' | 'ordinal' | 'changedIn' | 'properties', SQLiteColumn>;

export interface ElementTable<T> {
  readonly table: SQLiteTable & ElementColumns;
  /** Checks what comes out of the table, properties included. */
  readonly schema: z.ZodType<T>;
  /** The columns that make the id within the network, in the order in which `/` joins them. */
  readonly idColumns: Readonly<Record<string, SQLiteColumn>>;
  /** The element's keys that have a column; every other key is in `properties`. */
  readonly columns: Readonly<Record<string, SQLiteColumn>>;
  /** Whether `position` is kept as x and y. */
  readonly hasPosition?: true;
}

/** In an order in which each table comes after those it refers to. */
export const ELEMENT_TABLES: { readonly [C in CollectionName]: ElementTable<Collections[C]> } = {
  nodes: {
    table: nodes,
    schema: NetworkNode,
    idColumns: { id: nodes.id },
    columns: { id: nodes.id, kind: nodes.kind, tag: nodes.tag, elevationM: nodes.elevationM },
    hasPosition: true,
  },
  pipes: {
    table: pipes,
    schema: PipeRun,
    idColumns: { id: pipes.id },
    columns: { id: pipes.id, tag: pipes.tag, from: pipes.from, to: pipes.to, lengthM: pipes.lengthM },
  },
  trapModels: {
    table: trapModels,
    schema: TrapModel,
    idColumns: { id: trapModels.id },
    columns: {
      id: trapModels.id,
      name: trapModels.name,
      libraryId: trapModels.libraryId,
      libraryVersion: trapModels.libraryVersion,
    },
  },
  cases: {
    table: cases,
    schema: OperatingCase,
    idColumns: { id: cases.id },
    columns: { id: cases.id, name: cases.name },
  },
  overrides: {
    table: caseOverrides,
    schema: Override,
    idColumns: { caseId: caseOverrides.caseId, node: caseOverrides.node },
    columns: { node: caseOverrides.node },
  },
  gauges: {
    table: gauges,
    schema: Gauge,
    idColumns: { id: gauges.id },
    columns: { id: gauges.id, tag: gauges.tag, node: gauges.node, pipe: gauges.pipe, distanceM: gauges.distanceM },
  },
};

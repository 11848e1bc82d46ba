import { COLLECTION_NAMES, type CollectionName, type NetworkDocument, type Placed } from '@riseback/network';
import { and, eq, getTableColumns, sql, type SQL } from 'drizzle-orm';
import type { Queries } from '../platform/db/database';
import { ELEMENT_TABLES, type ElementTable } from './element-tables';

export type ElementMaps = Pick<NetworkDocument, CollectionName>;
/** An element that a batch touched. */
export interface Touched {
  readonly collection: CollectionName;
  readonly id: string;
}

/** SQLite takes about 30,000 variables a statement; no table has more than a dozen columns. */
const ROWS_A_STATEMENT = 1_000;

type Row = Record<string, unknown>;

/** Reads and writes the six tables of elements alike: `element-tables.ts` says which keys have a column. */
export class ElementRepository {
  constructor(private readonly db: Queries) {}

  read(networkId: string): ElementMaps {
    return {
      nodes: this.readTable(ELEMENT_TABLES.nodes, networkId),
      pipes: this.readTable(ELEMENT_TABLES.pipes, networkId),
      trapModels: this.readTable(ELEMENT_TABLES.trapModels, networkId),
      cases: this.readTable(ELEMENT_TABLES.cases, networkId),
      overrides: this.readTable(ELEMENT_TABLES.overrides, networkId),
      gauges: this.readTable(ELEMENT_TABLES.gauges, networkId),
    };
  }

  /** Writes a new network's elements. */
  insertAll(networkId: string, version: number, elements: ElementMaps): void {
    for (const collection of COLLECTION_NAMES) {
      const present: ReadonlyMap<string, Placed<object>> = elements[collection];
      const rows = Array.from(present, ([id, placed]) => ({ id, placed }));
      upsert(this.db, ELEMENT_TABLES[collection], networkId, version, rows);
    }
  }

  /** Makes the rows of the touched elements what they are in the document; all other rows stay untouched. */
  writeTouched(networkId: string, version: number, elements: ElementMaps, touched: readonly Touched[]): void {
    for (const collection of COLLECTION_NAMES) {
      const table = ELEMENT_TABLES[collection];
      const present: { id: string; placed: Placed<object> }[] = [];
      for (const { id } of touched.filter((element) => element.collection === collection)) {
        const placed = elements[collection].get(id);
        if (placed === undefined)
          this.db
            .delete(table.table)
            .where(isElement(table, networkId, id))
            .run();
        else present.push({ id, placed });
      }
      upsert(this.db, table, networkId, version, present);
    }
  }

  private readTable<T>(table: ElementTable<T>, networkId: string): ReadonlyMap<string, Placed<T>> {
    const rows = this.db
      .select()
      .from(table.table)
      .where(eq(table.table.networkId, networkId))
      .orderBy(table.table.ordinal, ...Object.values(table.idColumns))
      .all() as Row[];
    return new Map(
      rows.map((row) => [idOf(table, row), { ordinal: Number(row['ordinal']), value: elementOf(table, row) }]),
    );
  }
}

/** An upsert, not a delete and an insert, so that what points at a row never sees it gone. */
function upsert(
  db: Queries,
  table: ElementTable<unknown>,
  networkId: string,
  version: number,
  elements: readonly { readonly id: string; readonly placed: Placed<object> }[],
): void {
  for (let start = 0; start < elements.length; start += ROWS_A_STATEMENT) {
    const rows = elements.slice(start, start + ROWS_A_STATEMENT).map(({ id, placed }) => ({
      networkId,
      changedIn: version,
      ordinal: placed.ordinal,
      ...rowOf(table, id, placed.value),
    }));
    db.insert(table.table)
      .values(rows)
      .onConflictDoUpdate({
        target: [table.table.networkId, ...Object.values(table.idColumns)],
        set: excluded(table, Object.keys(rows[0] ?? {})),
      })
      .run();
  }
}

function excluded(table: ElementTable<unknown>, keys: readonly string[]): Record<string, SQL> {
  const columns = getTableColumns(table.table);
  return Object.fromEntries(
    keys.flatMap((key) => {
      const column = columns[key];
      return column === undefined ? [] : [[key, sql.raw(`excluded.${column.name}`)]];
    }),
  );
}

function rowOf(table: ElementTable<unknown>, id: string, element: object): Row {
  const properties = new Map<string, unknown>(Object.entries(element));
  const row: Row = {};
  for (const key of Object.keys(table.columns)) {
    row[key] = properties.get(key) ?? null;
    properties.delete(key);
  }
  if (table.hasPosition) {
    const position = properties.get('position') as { x: number; y: number } | undefined;
    row['x'] = position?.x ?? null;
    row['y'] = position?.y ?? null;
    properties.delete('position');
  }
  const parts = id.split('/');
  Object.keys(table.idColumns).forEach((key, i) => (row[key] = parts[i]));
  return { ...row, properties: Object.fromEntries(properties) };
}

function elementOf<T>(table: ElementTable<T>, row: Row): T {
  const element: Row = { ...(row['properties'] as Row) };
  for (const key of Object.keys(table.columns)) {
    if (row[key] !== null) element[key] = row[key];
  }
  if (table.hasPosition && row['x'] !== null) element['position'] = { x: row['x'], y: row['y'] };
  return table.schema.parse(element);
}

function idOf(table: ElementTable<unknown>, row: Row): string {
  return Object.keys(table.idColumns)
    .map((key) => String(row[key]))
    .join('/');
}

function isElement(table: ElementTable<unknown>, networkId: string, id: string): SQL | undefined {
  const parts = id.split('/');
  return and(
    eq(table.table.networkId, networkId),
    ...Object.values(table.idColumns).map((column, i) => eq(column, parts[i] ?? '')),
  );
}

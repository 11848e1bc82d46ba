import { createHash } from 'node:crypto';
import type Sqlite from 'better-sqlite3';

/** A table of a backup that tells of the backup itself and is none of the content. */
export const FACTS_TABLE = 'riseback_backup';

/**
 * SHA-256 over the schema and every row, in an order of their own: the same for two files that hold the same, however
 * their pages lie. Rows go by primary key, then in the order in which they were written.
 */
export function contentHash(sqlite: Sqlite.Database): string {
  const hash = createHash('sha256');
  const schema = sqlite
    .prepare(
      "select type, name, sql from sqlite_schema where name not glob 'sqlite_*' and name <> ? order by type, name",
    )
    .all(FACTS_TABLE) as { type: string; name: string; sql: string | null }[];
  for (const { type, name, sql } of schema) hash.update(encode([type, name, sql]));
  for (const { name } of schema.filter(({ type }) => type === 'table')) {
    hash.update(encode([name]));
    const rows = sqlite.prepare(`select * from ${quoted(name)} order by ${orderOf(sqlite, name)}`);
    for (const row of rows.raw(true).safeIntegers(true).iterate()) hash.update(encode(row as unknown[]));
  }
  return hash.digest('hex');
}

function orderOf(sqlite: Sqlite.Database, table: string): string {
  const keys = sqlite.prepare('select name from pragma_table_info(?) where pk > 0 order by pk').pluck().all(table);
  return [...keys.map((name) => quoted(String(name))), 'rowid'].join(', ');
}

function quoted(name: string): string {
  return `"${name.replaceAll('"', '""')}"`;
}

/** Each value with its type and, where its end is not plain, its length: no two rows share a text. */
function encode(values: readonly unknown[]): string {
  return `${values.map(encodeValue).join(',')}\n`;
}

function encodeValue(value: unknown): string {
  if (value === null) return 'n';
  if (typeof value === 'bigint') return `i${value}`;
  if (typeof value === 'number') return `r${Object.is(value, -0) ? '-0' : value}`;
  if (Buffer.isBuffer(value)) return `b${value.toString('hex')}`;
  const text = String(value);
  return `s${text.length}:${text}`;
}

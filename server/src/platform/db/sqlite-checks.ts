import Sqlite from 'better-sqlite3';

/** What is wrong with a file, by SQLite's own words; a head that is none of SQLite's makes even the check throw. */
export function damageOf(sqlite: Sqlite.Database, check: 'quick_check' | 'integrity_check'): string | undefined {
  try {
    const answer: unknown = sqlite.pragma(`${check}(1)`, { simple: true });
    return answer === 'ok' ? undefined : String(answer);
  } catch (error) {
    if (error instanceof Sqlite.SqliteError && ['SQLITE_NOTADB', 'SQLITE_CORRUPT'].includes(error.code))
      return error.message;
    throw error;
  }
}

/** How many rows point at nothing. */
export function orphanCount(sqlite: Sqlite.Database): number {
  return (sqlite.pragma('foreign_key_check') as unknown[]).length;
}

/** Whether it has a table of that name; none named: any table at all. */
export function hasTable(sqlite: Sqlite.Database, name?: string): boolean {
  const found = sqlite
    .prepare("select 1 from sqlite_schema where type = 'table' and (? is null or name = ?) limit 1")
    .get(name ?? null, name ?? null);
  return found !== undefined;
}

import Sqlite from 'better-sqlite3';

/** Another process serves this database. Stops the start. */
export class DatabaseInUseError extends Error {
  override readonly name = 'DatabaseInUseError';
}

/**
 * Holds a database for this process alone until it ends: one process, one writing connection. The lock is the operating
 * system's own on a file beside the database, so that one left by a killed process does not count.
 * @throws DatabaseInUseError
 */
export function holdExclusively(databasePath: string): { release(): void } {
  if (databasePath === ':memory:') return { release: () => undefined };
  const lock = new Sqlite(`${databasePath}-in-use`, { timeout: 0 });
  try {
    lock.exec('begin exclusive');
  } catch {
    lock.close();
    throw new DatabaseInUseError(
      `Another Riseback serves the database ${databasePath}. Stop that one first, or name another database in RISEBACK_DB.`,
    );
  }
  return { release: () => lock.close() };
}

import { closeSync, fsyncSync, openSync, renameSync } from 'node:fs';
import { dirname } from 'node:path';
import Sqlite from 'better-sqlite3';
import * as z from 'zod';
import { contentHash, FACTS_TABLE } from '../db/content-hash';
import { damageOf, hasTable, orphanCount } from '../db/sqlite-checks';

/** What a backup says of itself, in a table of its own, so that one rename brings the copy and its hash at once. */
export interface BackupFacts {
  readonly contentHash: string;
  readonly madeAt: string;
}

/** A file is no backup that can be relied on; the message names it and says why. */
export class UnusableBackupError extends Error {
  override readonly name = 'UnusableBackupError';
}

const FactsRow = z.object({ content_hash: z.string().length(64), made_at: z.string() });

/**
 * Makes a backup of a fresh copy: one file without a write-ahead log, checked from end to end, with its content hash in
 * it, on the disk when this returns. It reads every page, so a server runs it beside its own thread.
 * @throws UnusableBackupError when the copy is not whole
 */
export function sealCopy(path: string, madeAt: string): BackupFacts {
  const copy = new Sqlite(path, { fileMustExist: true });
  try {
    copy.pragma('journal_mode = delete');
    demandWhole(copy);
    const facts: BackupFacts = { contentHash: contentHash(copy), madeAt };
    copy.transaction(() => {
      // a copy of a restored backup that was put in place by hand brings its old one along
      copy.exec(`drop table if exists ${FACTS_TABLE}`);
      copy.exec(`create table ${FACTS_TABLE} (content_hash text not null, made_at text not null) strict`);
      copy.prepare(`insert into ${FACTS_TABLE} values (?, ?)`).run(facts.contentHash, facts.madeAt);
    })();
    return facts;
  } finally {
    copy.close();
    syncPath(path);
  }
}

/** Reads a backup from end to end. @throws UnusableBackupError when it is not whole or not what it says it is */
export function verifyBackup(path: string): BackupFacts {
  const backup = openBackup(path);
  try {
    demandWhole(backup);
    const facts = factsOf(backup);
    if (contentHash(backup) !== facts.contentHash) {
      throw new UnusableBackupError(`${path} does not hold what it held when it was made: take another backup`);
    }
    return facts;
  } finally {
    backup.close();
  }
}

/** Whether a file is a backup, by its own word, without reading it through. */
export function isBackup(path: string): boolean {
  const file = openBackup(path);
  try {
    return damageOf(file, 'quick_check') === undefined && hasTable(file, FACTS_TABLE);
  } catch {
    return false;
  } finally {
    file.close();
  }
}

/** Renames a sealed copy to its own name, over an older backup; after a power cut there is the one or the other. */
export function publish(part: string, path: string): void {
  renameSync(part, path);
  syncPath(dirname(path));
}

export function syncPath(path: string): void {
  const handle = openSync(path, 'r');
  try {
    fsyncSync(handle);
  } finally {
    closeSync(handle);
  }
}

function openBackup(path: string): Sqlite.Database {
  try {
    return new Sqlite(path, { readonly: true, fileMustExist: true });
  } catch (error) {
    throw new UnusableBackupError(`${path} cannot be opened (${(error as Error).message})`);
  }
}

function demandWhole(sqlite: Sqlite.Database): void {
  const damage = damageOf(sqlite, 'integrity_check');
  if (damage !== undefined) throw new UnusableBackupError(`${sqlite.name} is damaged (${damage})`);
  const orphans = orphanCount(sqlite);
  if (orphans > 0) throw new UnusableBackupError(`${orphans} rows of ${sqlite.name} point at nothing`);
}

function factsOf(backup: Sqlite.Database): BackupFacts {
  if (!hasTable(backup, FACTS_TABLE)) throw new UnusableBackupError(`${backup.name} is no backup of Riseback`);
  const row = FactsRow.parse(backup.prepare(`select * from ${FACTS_TABLE}`).get());
  return { contentHash: row.content_hash, madeAt: row.made_at };
}

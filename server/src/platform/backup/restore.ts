import { constants, copyFileSync, existsSync, linkSync, mkdirSync, mkdtempSync, renameSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { appendAuditHead, auditHeadLogOf, GENESIS_HASH, type AuditHead } from '../db/audit-head-log';
import { contentHash, FACTS_TABLE } from '../db/content-hash';
import { openDatabase } from '../db/database';
import { holdExclusively } from '../exclusive-use';
import { publish, syncPath, UnusableBackupError, verifyBackup, type BackupFacts } from './sealed-copy';

export interface Restored extends BackupFacts {
  /** Where the database that was there has gone; absent when there was none. */
  readonly before?: string;
}

const LOG_ENDINGS = ['-wal', '-shm', '-journal'];

/**
 * Puts a backup in the place of the database. The one that is there, however damaged, is kept beside it.
 * @throws UnusableBackupError for a backup that is not whole; DatabaseInUseError while a server runs;
 *   UnusableDatabaseError for one that a newer program made
 */
export function restoreBackup(file: string, databasePath: string, now: Date): Restored {
  const hold = holdExclusively(databasePath);
  try {
    return inFolderBeside(databasePath, (folder) => {
      const part = join(folder, 'restored.db');
      const facts = copyBack(file, part);
      proveUsable(part, join(folder, 'trial.db'));
      const before = setAside(databasePath, `${databasePath}-before-restore-${stampOf(now)}`);
      noteRestored(part, databasePath, now);
      publish(part, databasePath);
      return before === undefined ? facts : { ...facts, before };
    });
  } finally {
    hold.release();
  }
}

/** Does all of a restore but the last step, in a folder beside the database that is then removed; a server may run. */
export function drillRestore(file: string, databasePath: string): BackupFacts {
  return inFolderBeside(databasePath, (folder) => {
    const part = join(folder, 'restored.db');
    const facts = copyBack(file, part);
    proveUsable(part, join(folder, 'trial.db'));
    return facts;
  });
}

/** On the database's own disk, so that its room is tried too and a rename is enough at the end. */
function inFolderBeside<T>(databasePath: string, work: (folder: string) => T): T {
  mkdirSync(dirname(databasePath), { recursive: true, mode: 0o700 });
  const folder = mkdtempSync(join(dirname(databasePath), 'restoring-'));
  try {
    return work(folder);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** The content of the backup without its note on itself, proved against that note. */
function copyBack(file: string, part: string): BackupFacts {
  const facts = verifyBackup(file);
  copyFileSync(file, part, constants.COPYFILE_EXCL);
  const copy = new Sqlite(part, { fileMustExist: true });
  try {
    copy.exec(`drop table ${FACTS_TABLE}`);
    if (contentHash(copy) !== facts.contentHash) {
      throw new UnusableBackupError(`The copy of ${file} is not what the backup holds: try again on another disk`);
    }
  } finally {
    copy.close();
  }
  syncPath(part);
  return facts;
}

/** On a second copy, so that what is put in place is what was saved; the server migrates it at its start. */
function proveUsable(part: string, trial: string): void {
  copyFileSync(part, trial);
  openDatabase(trial).$client.close();
}

/** @returns where it went */
function setAside(databasePath: string, aside: string): string | undefined {
  if (!existsSync(databasePath)) {
    // a log without its database would be taken for the restored one's
    for (const ending of LOG_ENDINGS) rmSync(databasePath + ending, { force: true });
    return undefined;
  }
  if (foldLogIn(databasePath)) {
    // Both names until the restored file takes one of them: a power cut never leaves the place empty.
    linkOrRename(databasePath, aside);
    return aside;
  }
  for (const ending of ['', ...LOG_ENDINGS]) {
    if (existsSync(databasePath + ending)) renameSync(databasePath + ending, aside + ending);
  }
  return aside;
}

/** Brings the write-ahead log into the file and removes it. @returns false when the file is too damaged for that */
function foldLogIn(databasePath: string): boolean {
  try {
    const sqlite = new Sqlite(databasePath, { fileMustExist: true });
    try {
      return sqlite.pragma('journal_mode = delete', { simple: true }) === 'delete';
    } finally {
      sqlite.close();
    }
  } catch {
    return false;
  }
}

/** What the head log said of entries after the backup binds no longer. */
function noteRestored(part: string, databasePath: string, now: Date): void {
  const sqlite = new Sqlite(part, { readonly: true });
  try {
    const head = sqlite.prepare('select seq, hash from audit order by seq desc limit 1').get() as
      Pick<AuditHead, 'seq' | 'hash'> | undefined;
    const { seq, hash } = head ?? { seq: 0, hash: GENESIS_HASH };
    appendAuditHead(auditHeadLogOf(databasePath), { seq, hash, at: now.toISOString(), why: 'restored' });
  } finally {
    sqlite.close();
  }
}

/** Some file systems of removable disks know no second names. */
function linkOrRename(from: string, to: string): void {
  try {
    linkSync(from, to);
  } catch {
    renameSync(from, to);
  }
}

function stampOf(time: Date): string {
  return time.toISOString().replaceAll(/[-:]|\.\d+/g, '');
}

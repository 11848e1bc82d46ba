import { appendFileSync, closeSync, existsSync, fstatSync, openSync, readFileSync, readSync } from 'node:fs';
import { dirname, join } from 'node:path';
import * as z from 'zod';
import type { Database } from './database';

/** One line of `audit-head.log`: how far the log in the database had come. Its hash covers every row before it. */
const AuditHead = z.object({
  seq: z.number().int().min(0),
  hash: z.string().length(64),
  at: z.string(),
  /** The database was made anew, or a backup was put back: what was noted before does not bind it. */
  why: z.enum(['created', 'restored']).optional(),
});
export type AuditHead = z.infer<typeof AuditHead>;

/** What the first row is chained to, and the head of a log without rows. */
export const GENESIS_HASH = '0'.repeat(64);

/** Longer than any line. */
const TAIL_BYTES = 1_024;

/** Beside the database; on a disk or a machine of its own it shows even what somebody with every right here has done. */
export function auditHeadLogOf(databasePath: string): string {
  return join(dirname(databasePath), 'audit-head.log');
}

/** Every line that can be read; one cut short by a power cut is none. */
export function readAuditHeads(path: string): AuditHead[] {
  if (!existsSync(path)) return [];
  return readFileSync(path, 'utf8')
    .split('\n')
    .map(parseHead)
    .filter((head) => head !== undefined);
}

export function appendAuditHead(path: string, head: AuditHead): void {
  const glue = endsInTheMiddle(path) ? '\n' : '';
  appendFileSync(path, `${glue}${JSON.stringify(head)}\n`, { mode: 0o600 });
}

/**
 * From now on appends the head of the database's log to the file beside it after each transaction that moved it. It is
 * not forced onto the disk: after a power cut it may lag behind the database, never lead it.
 */
export function keepAuditHeads(
  db: Database,
  { isNew, report }: { readonly isNew: boolean; readonly report: (error: unknown) => void },
): void {
  const path = auditHeadLogOf(db.$client.name);
  const newest = db.$client.prepare('select seq, hash, at from audit order by seq desc limit 1');
  const headNow = (): AuditHead | undefined => newest.get() as AuditHead | undefined;
  let noted = headNow()?.seq ?? 0;
  const append = (head: AuditHead): void => {
    try {
      appendAuditHead(path, head);
    } catch (error) {
      // The transaction is committed whatever becomes of this line; the next one carries its hash on.
      report(error);
    }
  };

  if (isNew) append({ seq: 0, hash: GENESIS_HASH, at: new Date().toISOString(), why: 'created' });
  else catchUp(path, headNow(), append, report);

  const transaction = db.transaction.bind(db);
  db.transaction = (work, config) => {
    const result = transaction(work, config);
    if (db.$client.inTransaction) return result;
    const head = headNow();
    if (head === undefined || head.seq === noted) return result;
    noted = head.seq;
    append(head);
    return result;
  };
}

/** A process killed between its commit and its line left the file one behind; a file ahead tells of a log cut short. */
function catchUp(
  path: string,
  head: AuditHead | undefined,
  append: (head: AuditHead) => void,
  report: (error: unknown) => void,
): void {
  const last = lastAuditHead(path);
  const seq = head?.seq ?? 0;
  if (last !== undefined && last.seq > seq) {
    report(new Error(`the audit log ends at entry ${seq}, but had reached ${last.seq}: run npm run verify-audit`));
  } else if (head !== undefined && (last === undefined || last.seq < seq)) {
    append(head);
  }
}

function lastAuditHead(path: string): AuditHead | undefined {
  return tailOf(path)
    .split('\n')
    .map(parseHead)
    .findLast((head) => head !== undefined);
}

function endsInTheMiddle(path: string): boolean {
  const tail = tailOf(path);
  return tail !== '' && !tail.endsWith('\n');
}

function tailOf(path: string): string {
  if (!existsSync(path)) return '';
  const file = openSync(path, 'r');
  try {
    const { size } = fstatSync(file);
    const tail = Buffer.alloc(Math.min(size, TAIL_BYTES));
    readSync(file, tail, 0, tail.length, size - tail.length);
    return tail.toString();
  } finally {
    closeSync(file);
  }
}

function parseHead(line: string): AuditHead | undefined {
  try {
    return AuditHead.parse(JSON.parse(line));
  } catch {
    return undefined;
  }
}

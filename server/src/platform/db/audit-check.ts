import { asc, getTableColumns, gt, sql } from 'drizzle-orm';
import { auditHash, type AuditRow } from './audit';
import { GENESIS_HASH, type AuditHead } from './audit-head-log';
import type { Queries } from './database';
import { audit } from './schema';

/** What does not follow, and the entry at which it shows. */
export interface AuditMismatch {
  readonly seq: number;
  readonly what: string;
}

export interface AuditCheck {
  readonly entries: number;
  readonly headHash: string;
  /** The first thing that does not match; absent when everything does. */
  readonly mismatch?: AuditMismatch;
  /** What a person should know although nothing is wrong. */
  readonly notes: readonly string[];
}

/** Its details as the text that is stored: one that was changed may be no JSON any more. */
type StoredRow = Omit<AuditRow, 'details'> & { readonly details: string };

const PAGE_ROWS = 1_000;

/**
 * Follows the chain from its first row to its last and compares it with the heads that were written down beside the
 * database. A row changed, inserted, removed or moved breaks the chain; a tail cut off, or a chain made anew from some
 * row on, holds in itself and shows against the heads.
 * @param heads read before the database is, so that what is written meanwhile is in the database at least
 */
export function checkAudit(db: Queries, heads: readonly AuditHead[]): AuditCheck {
  const { expected, notes } = bindingHeads(heads);
  let seq = 0;
  let hash = GENESIS_HASH;
  for (const row of rowsOf(db)) {
    const what = mismatchOf(row, seq, hash, expected.get(seq + 1));
    if (what !== undefined) return { entries: seq, headHash: hash, notes, mismatch: { seq: seq + 1, what } };
    seq = row.seq;
    hash = row.hash;
  }
  const last = greatest(expected.keys());
  if (last <= seq) return { entries: seq, headHash: hash, notes };
  const what = `The log ends at entry ${seq}, but had reached entry ${last} (${expected.get(last)?.at}): its tail was cut off.`;
  return { entries: seq, headHash: hash, notes, mismatch: { seq: seq + 1, what } };
}

/** The first row that does not follow from the one before it, or undefined when the whole chain holds. */
export function firstBrokenAuditRow(db: Queries): number | undefined {
  return checkAudit(db, []).mismatch?.seq;
}

function mismatchOf(
  { hash: ownHash, details, ...row }: StoredRow,
  seq: number,
  hash: string,
  head: AuditHead | undefined,
): string | undefined {
  const next = seq + 1;
  if (row.seq > next) return `Entry ${next} is missing: after entry ${seq} comes entry ${row.seq}.`;
  if (row.previousHash !== hash) {
    return `Entry ${next} does not follow entry ${seq}: an entry was inserted, removed, moved or replaced here.`;
  }
  const read = parsed(details);
  if (read === undefined || auditHash({ ...row, details: read.json }) !== ownHash)
    return `Entry ${next} is not as it was written: it was changed afterwards.`;
  if (head === undefined || head.hash === ownHash) return undefined;
  return `Entry ${next} is not the one that was noted on ${head.at}: the log was written anew up to here.`;
}

/** A list with a limit at a time: the log may be larger than the memory. */
function* rowsOf(db: Queries): Generator<StoredRow> {
  const columns = { ...getTableColumns(audit), details: sql<string>`${audit.details}` };
  for (let seq = Number.MIN_SAFE_INTEGER; ;) {
    const page = db
      .select(columns)
      .from(audit)
      .where(gt(audit.seq, seq))
      .orderBy(asc(audit.seq))
      .limit(PAGE_ROWS)
      .all();
    yield* page;
    const last = page.at(-1);
    if (last === undefined) return;
    seq = last.seq;
  }
}

function parsed(details: string): { readonly json: unknown } | undefined {
  try {
    return { json: JSON.parse(details) };
  } catch {
    return undefined;
  }
}

function bindingHeads(heads: readonly AuditHead[]): { expected: ReadonlyMap<number, AuditHead>; notes: string[] } {
  const expected = new Map<number, AuditHead>();
  const notes: string[] = [];
  for (const head of heads) {
    if (head.why !== undefined) {
      const reached = greatest(expected.keys());
      if (reached > head.seq) notes.push(noteOf(head, reached));
      expected.clear();
    }
    if (head.seq > 0 && !expected.has(head.seq)) expected.set(head.seq, head);
  }
  return { expected, notes };
}

function noteOf(head: AuditHead, reached: number): string {
  if (head.why === 'created')
    return `On ${head.at} a new database was begun here; the one before had ${reached} entries.`;
  return `On ${head.at} a backup that ends at entry ${head.seq} was put back; entries up to ${reached} had been written.`;
}

function greatest(numbers: Iterable<number>): number {
  let most = 0;
  for (const number of numbers) most = Math.max(most, number);
  return most;
}

import { createHash } from 'node:crypto';
import { canonicalText } from '@riseback/network';
import { desc } from 'drizzle-orm';
import { GENESIS_HASH } from './audit-head-log';
import type { Queries } from './database';
import { audit } from './schema';

/** What happened, as the log keeps it. */
export interface AuditEntry {
  readonly at: Date;
  /** Absent where nobody is signed in, as at a failed sign-in. */
  readonly personId?: string;
  readonly sessionId?: string;
  readonly siteId?: string;
  /** A verb of the project's own, such as `network.edit`. */
  readonly action: string;
  /** The id of what it was done to. */
  readonly subject: string;
  /** Plain JSON; never a password, a token or a whole network. */
  readonly details?: Readonly<Record<string, unknown>>;
}

export type AuditRow = typeof audit.$inferSelect;

/**
 * Appends to the log, in the transaction of what it records, so that neither is ever stored without the other. Each row
 * holds the hash of the one before it: a row changed, inserted, removed or moved breaks the chain from there on.
 */
export function appendAudit(tx: Queries, entry: AuditEntry): void {
  const last = tx.select({ seq: audit.seq, hash: audit.hash }).from(audit).orderBy(desc(audit.seq)).limit(1).get();
  const row: Omit<AuditRow, 'hash'> = {
    seq: (last?.seq ?? 0) + 1,
    at: entry.at.toISOString(),
    personId: entry.personId ?? null,
    sessionId: entry.sessionId ?? null,
    siteId: entry.siteId ?? null,
    action: entry.action,
    subject: entry.subject,
    details: entry.details ?? {},
    previousHash: last?.hash ?? GENESIS_HASH,
  };
  tx.insert(audit)
    .values({ ...row, hash: auditHash(row) })
    .run();
}

/** SHA-256 over the previous hash and the RFC 8785 text of the row. */
export function auditHash({ previousHash, ...row }: Omit<AuditRow, 'hash'>): string {
  return createHash('sha256').update(previousHash).update(canonicalText(row)).digest('hex');
}

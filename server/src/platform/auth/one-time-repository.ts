import { and, count, eq, isNotNull, isNull, lt, or } from 'drizzle-orm';
import { appendAudit, type AuditEntry } from '../db/audit';
import type { Database, Queries } from '../db/database';
import { oneTimeSecrets, recoveryCodes } from '../db/schema';

export type OneTimeSecretRow = typeof oneTimeSecrets.$inferSelect;

export class OneTimeRepository {
  constructor(private readonly db: Database) {}

  find(personId: string): OneTimeSecretRow | undefined {
    return this.db.select().from(oneTimeSecrets).where(eq(oneTimeSecrets.personId, personId)).get();
  }

  unusedRecoveryCodes(personId: string): number {
    const unused = and(eq(recoveryCodes.personId, personId), isNull(recoveryCodes.usedAt));
    return this.db.select({ left: count() }).from(recoveryCodes).where(unused).get()?.left ?? 0;
  }

  /** Lays down a secret that is still to be confirmed, in the place of another such; a confirmed one stays. */
  begin(row: OneTimeSecretRow): void {
    const { sealedSecret, createdAt } = row;
    this.db
      .insert(oneTimeSecrets)
      .values(row)
      .onConflictDoUpdate({
        target: oneTimeSecrets.personId,
        set: { sealedSecret, createdAt },
        setWhere: isNull(oneTimeSecrets.confirmedAt),
      })
      .run();
  }

  /** @returns false when that very secret waits for no confirmation any more */
  confirm(
    { personId, sealedSecret }: OneTimeSecretRow,
    step: number,
    codeHashes: readonly string[],
    audit: AuditEntry,
  ): boolean {
    return this.db.transaction((tx) => {
      const waiting = and(
        eq(oneTimeSecrets.personId, personId),
        eq(oneTimeSecrets.sealedSecret, sealedSecret),
        isNull(oneTimeSecrets.confirmedAt),
      );
      const confirmedAt = audit.at.toISOString();
      const { changes } = tx.update(oneTimeSecrets).set({ confirmedAt, lastStep: step }).where(waiting).run();
      if (changes === 0) return false;
      replaceRecoveryCodes(tx, personId, codeHashes, confirmedAt);
      appendAudit(tx, audit);
      return true;
    });
  }

  /** @returns false when a code of that half-minute, or of a later one, was taken before */
  takeStep(personId: string, step: number): boolean {
    const fresh = and(
      eq(oneTimeSecrets.personId, personId),
      isNotNull(oneTimeSecrets.confirmedAt),
      or(isNull(oneTimeSecrets.lastStep), lt(oneTimeSecrets.lastStep, step)),
    );
    return this.db.update(oneTimeSecrets).set({ lastStep: step }).where(fresh).run().changes > 0;
  }

  /** @returns false when the person has no such code, or used it before */
  takeRecoveryCode(personId: string, codeHash: string, audit: AuditEntry): boolean {
    return this.db.transaction((tx) => {
      const unused = and(
        eq(recoveryCodes.personId, personId),
        eq(recoveryCodes.codeHash, codeHash),
        isNull(recoveryCodes.usedAt),
      );
      const { changes } = tx.update(recoveryCodes).set({ usedAt: audit.at.toISOString() }).where(unused).run();
      if (changes > 0) appendAudit(tx, audit);
      return changes > 0;
    });
  }

  renewRecoveryCodes(personId: string, codeHashes: readonly string[], audit: AuditEntry): void {
    this.db.transaction((tx) => {
      replaceRecoveryCodes(tx, personId, codeHashes, audit.at.toISOString());
      appendAudit(tx, audit);
    });
  }

  remove(personId: string, audit: AuditEntry): void {
    this.db.transaction((tx) => {
      tx.delete(oneTimeSecrets).where(eq(oneTimeSecrets.personId, personId)).run();
      tx.delete(recoveryCodes).where(eq(recoveryCodes.personId, personId)).run();
      appendAudit(tx, audit);
    });
  }
}

function replaceRecoveryCodes(tx: Queries, personId: string, codeHashes: readonly string[], createdAt: string): void {
  tx.delete(recoveryCodes).where(eq(recoveryCodes.personId, personId)).run();
  tx.insert(recoveryCodes)
    .values(codeHashes.map((codeHash) => ({ personId, codeHash, createdAt })))
    .run();
}

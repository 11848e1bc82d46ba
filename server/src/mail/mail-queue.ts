import type { MailPurpose } from '@riseback/contracts';
import type { Queries } from '../platform/db/database';

/** A mail to be sent. Who may not get it (disabled, or declined that purpose) is left out when it is put in the outbox. */
export interface NewMail {
  readonly purpose: MailPurpose;
  /** Whose administrators see it in the outbox; null for what belongs to no site, such as a reset that a person asked for. */
  readonly siteId: string | null;
  /** A person with an account; absent for who has none yet. */
  readonly recipientId?: string;
  /** For who has no account; a person's own address is their row's. */
  readonly email?: string;
  /** What the mail tells: as the purpose's schema in mail-data.ts, which throws for anything else. */
  readonly data: Readonly<Record<string, unknown>>;
}

/** The door to the outbox. */
export interface MailQueue {
  /**
   * Writes the mail's row in the transaction of what causes it, so that neither is ever stored without the other. It is
   * sent by and by, once that transaction is committed.
   */
  enqueue(tx: Queries, mail: NewMail): void;
}

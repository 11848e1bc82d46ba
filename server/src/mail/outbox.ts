import type { Queries } from '../platform/db/database';
import { MAIL_DATA } from './mail-data';
import type { MailQueue, NewMail } from './mail-queue';
import type { OutboxRepository } from './outbox-repository';

/** Takes mails in; a sender takes them out again. */
export class Outbox implements MailQueue {
  private wake: () => void = () => undefined;

  constructor(
    private readonly repository: OutboxRepository,
    private readonly newId: () => string,
    private readonly now: () => Date,
  ) {}

  /** @param wake told of each mail, once the transaction that it was written in has ended */
  wakeWith(wake: () => void): void {
    this.wake = wake;
  }

  enqueue(tx: Queries, mail: NewMail): void {
    // a mistake of ours shows where it is made, not days later when the mail is written
    const data = MAIL_DATA[mail.purpose].parse(mail.data);
    const email = this.addressOf(tx, mail);
    if (email === undefined) return;
    const at = this.now().toISOString();
    this.repository.insert(
      {
        id: this.newId(),
        purpose: mail.purpose,
        siteId: mail.siteId,
        recipientId: mail.recipientId ?? null,
        email,
        data,
        state: 'waiting',
        attempts: 0,
        nextTryAt: at,
        createdAt: at,
        sentAt: null,
        lastError: null,
      },
      tx,
    );
    // Transactions are synchronous: by the next turn this one is committed, or there is nothing to be found.
    setImmediate(() => this.wake());
  }

  /** @returns undefined where nobody is to be written to */
  private addressOf(tx: Queries, { purpose, recipientId, email }: NewMail): string | undefined {
    if (recipientId === undefined) {
      if (email === undefined) throw new Error('a mail needs a recipient or an address');
      return email;
    }
    const recipient = this.repository.recipient(recipientId, tx);
    if (recipient === undefined) throw new Error(`nobody has the id ${recipientId}`);
    if (recipient.disabledAt !== null || this.repository.declines(recipientId, purpose, tx)) return undefined;
    return recipient.email;
  }
}

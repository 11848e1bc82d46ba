import { MAIL_DATA } from './mail-data';
import { letterHtml } from './letter/letter-html';
import { letterText } from './letter/letter-text';
import type { Reader } from './letter/letter-words';
import { writeLetter, type MailMatter } from './letter/write-letter';
import type { OutgoingMail } from './mail-transport';
import type { MailRow, OutboxRepository, Recipient } from './outbox-repository';

/** What a mail became when it was to be sent: a letter, or the reason why there is nothing to send any more. */
export type Composed = { readonly mail: OutgoingMail } | { readonly pointless: string };

/** Makes the tokens of links anew when their mail is sent, so that none is kept anywhere. */
export interface LinkTokens {
  /** @returns undefined when the link does not count any more */
  tokenOf(linkId: string): string | undefined;
}

/** For who has no account yet. */
const UNKNOWN_READER: Reader = { units: 'us', timeZone: 'UTC' };

/** Writes a mail of the outbox as it stands at the moment it is sent: to the address, in the units and in the time zone that then hold. */
export class MailComposer {
  constructor(
    private readonly outbox: OutboxRepository,
    private readonly links: LinkTokens,
    /** Where people open the application. */
    private readonly origin: URL,
  ) {}

  compose(row: MailRow): Composed {
    const recipient = row.recipientId === null ? undefined : this.outbox.recipient(row.recipientId);
    const pointless = recipient === undefined ? undefined : this.whyNot(row, recipient);
    if (pointless !== undefined) return { pointless };
    const matter = this.matterOf(row);
    if (matter === undefined) return { pointless: 'The link in it was used or withdrawn, or its time is over.' };
    const letter = writeLetter(matter, { reader: recipient ?? UNKNOWN_READER, origin: this.origin, at: row.createdAt });
    return {
      mail: {
        messageId: `<${row.id}@${this.origin.hostname}>`,
        to: { name: letter.name ?? '', address: recipient?.email ?? row.email },
        date: new Date(row.createdAt),
        siteId: row.siteId,
        subject: letter.subject,
        text: letterText(letter),
        html: letterHtml(letter),
      },
    };
  }

  /** What may have changed since the mail was put in. */
  private whyNot({ siteId, purpose }: MailRow, recipient: Recipient): string | undefined {
    if (recipient.disabledAt !== null) return 'The account is disabled.';
    const ofSite = purpose !== 'invitation' && purpose !== 'passwordReset';
    if (ofSite && siteId !== null && !this.outbox.hasRole(recipient.id, siteId))
      return 'The person has no role at the site any more.';
    return undefined;
  }

  private matterOf({ purpose, data }: MailRow): MailMatter | undefined {
    switch (purpose) {
      case 'invitation': {
        const parsed = MAIL_DATA.invitation.parse(data);
        const token = this.links.tokenOf(parsed.linkId);
        return token === undefined ? undefined : { purpose, data: parsed, token };
      }
      case 'passwordReset': {
        const parsed = MAIL_DATA.passwordReset.parse(data);
        const token = this.links.tokenOf(parsed.linkId);
        return token === undefined ? undefined : { purpose, data: parsed, token };
      }
      case 'submitted':
      case 'returned':
      case 'approved':
        return { purpose, data: MAIL_DATA[purpose].parse(data) };
      case 'mention':
      case 'comment':
        return { purpose, data: MAIL_DATA[purpose].parse(data) };
    }
  }
}

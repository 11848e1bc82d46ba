import type { OutboxMail, ReceivedMail, ReceivedMailContent } from '@riseback/contracts';
import type { SiteAccess } from '../platform/auth/access';
import { notFound } from '../platform/problem';
import type { OutboxRepository } from './outbox-repository';
import type { ReceivedMails } from './sink/received-mails';

const MOST_LISTED = 500;
const NO_SINK = 'Mails of this installation are really sent; none is kept here.';

/** What administrators see of their site's mails. */
export class MailService {
  /** @param received where the installation has a sink in the place of a mail server */
  constructor(
    private readonly outbox: OutboxRepository,
    private readonly received: ReceivedMails | undefined,
  ) {}

  listOutbox({ siteId }: SiteAccess): OutboxMail[] {
    return this.outbox.ofSite(siteId, MOST_LISTED).map((row) => {
      const { id, purpose, email, state, attempts, createdAt, recipientName, sentAt, nextTryAt, lastError } = row;
      return {
        ...{ id, purpose, email, state, attempts, createdAt },
        ...(recipientName === null ? {} : { recipientName }),
        ...(sentAt === null ? {} : { sentAt }),
        ...(state === 'waiting' ? { nextTryAt } : {}),
        ...(lastError === null ? {} : { lastError }),
      };
    });
  }

  /** @throws ProblemError 404 where there is no sink */
  listReceived({ siteId }: SiteAccess): ReceivedMail[] {
    if (this.received === undefined) throw notFound(NO_SINK);
    return this.received.ofSite(siteId).map(({ id, messageId, to, subject, receivedAt, times }) => {
      return { id, messageId, to, subject, receivedAt, times };
    });
  }

  /** @throws ProblemError 404 where there is no sink, or no such mail of the site in it */
  readReceived({ siteId }: SiteAccess, id: string): ReceivedMailContent {
    if (this.received === undefined) throw notFound(NO_SINK);
    const mail = this.received.find(siteId, id);
    if (mail === undefined) throw notFound('There is no such mail of this site; older ones are not kept.');
    const { messageId, to, from, subject, receivedAt, times, text, html } = mail;
    return { id, messageId, to, from, subject, receivedAt, times, text, html };
  }
}

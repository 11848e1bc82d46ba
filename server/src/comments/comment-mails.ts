import type { MailPurpose } from '@riseback/contracts';
import type { MailQueue } from '../mail/mail-queue';
import type { NetworkAccess } from '../platform/auth/access';
import type { Queries } from '../platform/db/database';
import type { CommentRow } from './comment-repository';

/** So much of a comment stands in its mail; the rest is read where it can be answered. */
const EXCERPT_LENGTH = 280;

export interface CommentMail {
  readonly comment: CommentRow;
  readonly networkName: string;
  readonly elementTag: string | undefined;
  readonly revision:
    { readonly letter: string; readonly title: string; readonly authors: readonly string[] } | undefined;
  /** Who has a role at the site: nobody else is told of what is there. */
  readonly peopleHere: ReadonlySet<string>;
}

/** Tells by mail, in the transaction of the comment, those whom it names and those whose revision it is on. */
export class CommentMails {
  constructor(private readonly queue: MailQueue) {}

  added(tx: Queries, access: NetworkAccess, mail: CommentMail): void {
    const { comment, revision, peopleHere } = mail;
    const named = new Set(comment.mentions);
    // who is named is told once, as that
    const authors = new Set((revision?.authors ?? []).filter((id) => !named.has(id)));
    const data = dataOf(access, mail);
    const send = (purpose: MailPurpose, recipients: Iterable<string>) => {
      for (const recipientId of recipients) {
        if (recipientId === access.person.id || !peopleHere.has(recipientId)) continue;
        this.queue.enqueue(tx, { purpose, siteId: access.siteId, recipientId, data });
      }
    };
    send('mention', named);
    send('comment', authors);
  }
}

function dataOf({ siteId, networkId, person }: NetworkAccess, mail: CommentMail): Record<string, unknown> {
  const { comment, networkName, elementTag, revision } = mail;
  const { revisionId, threadId, subject, body } = comment;
  return {
    siteId,
    networkId,
    networkName,
    byName: person.name,
    ...(revision === undefined || revisionId === null
      ? {}
      : { revisionId, letter: revision.letter, title: revision.title }),
    threadId,
    ...(subject.kind === 'whole' ? {} : { elementId: subject.elementId }),
    ...(elementTag === undefined ? {} : { elementTag }),
    excerpt: excerptOf(body),
  };
}

function excerptOf(body: string): string {
  const characters = Array.from(body);
  if (characters.length <= EXCERPT_LENGTH) return body;
  return `${characters.slice(0, EXCERPT_LENGTH).join('').trimEnd()} …`;
}

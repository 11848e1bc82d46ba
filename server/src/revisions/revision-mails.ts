import type { MailPurpose } from '@riseback/contracts';
import { roleMay } from '@riseback/contracts';
import type { MailQueue } from '../mail/mail-queue';
import type { Queries } from '../platform/db/database';
import type { RevisionWithHistory } from './revision-history';
import { revisionMailFacts } from './revision-mail-facts';
import type { RevisionRepository } from './revision-repository';

/** Who causes a mail, and where. */
export interface MailCause {
  readonly siteId: string;
  readonly networkId: string;
  readonly person: { readonly id: string; readonly name: string };
}

/** Tells those concerned by mail what became of a revision, in the transaction in which it does. */
export class RevisionMails {
  constructor(private readonly queue: MailQueue) {}

  /** To all who may sign it. */
  submitted(tx: Queries, revisions: RevisionRepository, cause: MailCause, to: RevisionWithHistory, note: string) {
    const reviewers = revisions.peopleOfSite(cause.siteId).filter(({ role }) => roleMay(role, 'sign'));
    const recipients = reviewers.map(({ id }) => id);
    this.send(tx, revisions, cause, { purpose: 'submitted', revision: to, recipients, note });
  }

  /** To those whose work it is. */
  judged(
    tx: Queries,
    revisions: RevisionRepository,
    cause: MailCause,
    revision: RevisionWithHistory,
    { purpose, note }: { readonly purpose: 'returned' | 'approved'; readonly note: string },
  ) {
    const recipients = authorsOf(revision);
    this.send(tx, revisions, cause, { purpose, revision, recipients, note });
  }

  private send(
    tx: Queries,
    revisions: RevisionRepository,
    { siteId, networkId, person }: MailCause,
    mail: {
      readonly purpose: MailPurpose;
      readonly revision: RevisionWithHistory;
      readonly recipients: readonly string[];
      readonly note: string;
    },
  ): void {
    const here = new Set(revisions.peopleOfSite(siteId).map(({ id }) => id));
    const recipients = [...new Set(mail.recipients)].filter((id) => id !== person.id && here.has(id));
    if (recipients.length === 0) return;
    const { id: revisionId, letter, title } = mail.revision.row;
    const data = {
      siteId,
      networkId,
      networkName: revisions.networkName(networkId) ?? '',
      byName: person.name,
      revisionId,
      letter,
      title,
      ...(mail.note === '' ? {} : { note: mail.note }),
      ...revisionMailFacts(revisions, revisionId),
    };
    for (const recipientId of recipients) {
      this.queue.enqueue(tx, { purpose: mail.purpose, siteId, recipientId, data });
    }
  }
}

/** Who froze it and who submitted it. */
export function authorsOf({ facts }: RevisionWithHistory): string[] {
  return [facts.frozenBy, ...(facts.submittedBy === undefined ? [] : [facts.submittedBy])];
}

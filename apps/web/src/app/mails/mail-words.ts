import type { MailPurpose, OutboxMail } from '@riseback/contracts';
import { timeWords } from '../account/time-words';
import type { Status } from '../shared/status-mark/status-mark';

const PURPOSES: Readonly<Record<MailPurpose, string>> = {
  invitation: 'Invitation',
  passwordReset: 'Link for a new password',
  submitted: 'A revision waits for review',
  returned: 'A revision was returned',
  approved: 'A revision was approved',
  mention: 'Named in a comment',
  comment: 'A comment on a revision',
};

export function purposeWords(purpose: MailPurpose): string {
  return PURPOSES[purpose];
}

export interface StateWords {
  readonly status: Status;
  readonly word: string;
  /** When, how often, and what went wrong. */
  readonly detail: string;
}

/** How a mail fares, in words. */
export function stateWords(mail: OutboxMail, timeZone: string): StateWords {
  const tried = mail.attempts === 1 ? '1 attempt' : `${String(mail.attempts)} attempts`;
  const why = mail.lastError === undefined ? '' : `: ${mail.lastError}`;
  switch (mail.state) {
    case 'sent':
      return {
        status: 'pass',
        word: 'Sent',
        detail: mail.sentAt === undefined ? '' : timeWords(mail.sentAt, timeZone),
      };
    case 'givenUp':
      return { status: 'fail', word: 'Given up', detail: `after ${tried}${why}` };
    case 'waiting': {
      const next = mail.nextTryAt === undefined ? '' : `next try ${timeWords(mail.nextTryAt, timeZone)}`;
      if (mail.attempts === 0) return { status: 'none', word: 'Waiting', detail: 'goes in a moment' };
      return { status: 'watch', word: 'Waiting', detail: [next, `${tried}${why}`].filter(Boolean).join('; ') };
    }
  }
}

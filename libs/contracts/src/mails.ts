import * as z from 'zod';

/** What mails are sent for. The first two cannot be declined: whoever asked for one waits for it. */
export const MAIL_PURPOSES = [
  'invitation',
  'passwordReset',
  'submitted',
  'returned',
  'approved',
  'mention',
  'comment',
] as const;
export const MailPurpose = z.enum(MAIL_PURPOSES);
export type MailPurpose = z.infer<typeof MailPurpose>;

/** What a person may do without: part of their profile. */
export const DECLINABLE_MAILS = ['submitted', 'returned', 'approved', 'mention', 'comment'] as const;
export const DeclinableMail = z.enum(DECLINABLE_MAILS);
export type DeclinableMail = z.infer<typeof DeclinableMail>;

export const MAIL_STATES = ['waiting', 'sent', 'givenUp'] as const;
export const MailState = z.enum(MAIL_STATES);
export type MailState = z.infer<typeof MailState>;

/** GET /api/sites/:siteId/mails: the outbox of a site, newest first; never what is in a mail. */
export const OutboxMail = z.object({
  id: z.string(),
  purpose: MailPurpose,
  email: z.string(),
  recipientName: z.string().optional(),
  state: MailState,
  attempts: z.number().int(),
  createdAt: z.iso.datetime(),
  sentAt: z.iso.datetime().optional(),
  nextTryAt: z.iso.datetime().optional(),
  lastError: z.string().optional(),
});
export type OutboxMail = z.infer<typeof OutboxMail>;

/** GET /api/sites/:siteId/received-mails: what the local mail sink of the demo took in; 404 where real mail is sent. */
export const ReceivedMail = z.object({
  id: z.string(),
  messageId: z.string(),
  to: z.string(),
  subject: z.string(),
  receivedAt: z.iso.datetime(),
  /** How many times a mail of this Message-ID came in. */
  times: z.number().int(),
});
export type ReceivedMail = z.infer<typeof ReceivedMail>;

export const ReceivedMailContent = z.object({
  ...ReceivedMail.shape,
  from: z.string(),
  text: z.string(),
  /** As sent; to be shown in a sandboxed frame only. */
  html: z.string(),
});
export type ReceivedMailContent = z.infer<typeof ReceivedMailContent>;

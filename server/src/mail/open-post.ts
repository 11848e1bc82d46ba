import { randomInt } from 'node:crypto';
import type { Config } from '../platform/config';
import type { Log } from '../platform/log';
import { MailComposer, type LinkTokens } from './mail-composer';
import { MailSender, type MailEnd } from './mail-sender';
import type { Outbox } from './outbox';
import type { OutboxRepository } from './outbox-repository';
import { openMailSink, type MailSink } from './sink/mail-sink';
import type { ReceivedMails } from './sink/received-mails';
import { SmtpTransport } from './smtp-transport';

export interface PostParts {
  readonly config: Config;
  /** Where people open the application, which links in mails lead to. */
  readonly address: string;
  readonly post: { readonly outbox: Outbox; readonly repository: OutboxRepository; readonly links: LinkTokens };
  /** For the sink, where there is one. */
  readonly received: ReceivedMails | undefined;
  readonly now: () => Date;
  readonly log: Log;
  readonly ended: (end: MailEnd) => void;
}

export interface Post {
  close(): Promise<void>;
}

/**
 * Begins to send what waits in the outbox: to the mail server that the settings name, else, outside production, into the
 * sink. In production without a mail server nothing is sent, and mails wait.
 */
export async function openPost(parts: PostParts): Promise<Post> {
  const { config, received, now, log, ended } = parts;
  const { outbox, repository, links } = parts.post;
  const report = (error: unknown) => log.error({ err: error }, 'mail');
  const sink =
    config.mail.kind === 'sink' && received !== undefined ? await openMailSink(received, now, report) : undefined;
  const url = config.mail.kind === 'smtp' ? config.mail.url : sink?.url;
  if (config.mail.kind === 'none' || url === undefined) return { close: () => Promise.resolve() };

  const composer = new MailComposer(repository, links, new URL(parts.address));
  const sender = new MailSender({
    outbox: repository,
    compose: (row) => composer.compose(row),
    transport: new SmtpTransport(url, config.mail.from),
    now,
    random: () => randomInt(1_000) / 1_000,
    ended,
    warn: (what, message) => log.warn(what, message),
    report,
  });
  outbox.wakeWith(() => sender.wake());
  sender.start();
  return { close: () => closeInOrder(sender, sink) };
}

/** The sink last: what is being sent goes into it. */
async function closeInOrder(sender: MailSender, sink: MailSink | undefined): Promise<void> {
  await sender.stop();
  await sink?.close();
}

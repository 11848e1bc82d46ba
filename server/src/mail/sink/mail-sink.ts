import type { AddressInfo } from 'node:net';
import { simpleParser, type AddressObject, type ParsedMail } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { IncomingMail, ReceivedMails } from './received-mails';

const LARGEST_MAIL_BYTES = 1024 * 1024;
const MOST_CLIENTS = 20;

export interface MailSink {
  /** What a transport is given. */
  readonly url: URL;
  close(): Promise<void>;
}

/**
 * A mail server on loopback that keeps what comes in and sends nothing on: mails of the demo reach nobody, and go the
 * same way as real ones until they leave the machine.
 */
export async function openMailSink(
  received: ReceivedMails,
  now: () => Date,
  report: (error: unknown) => void,
): Promise<MailSink> {
  const server = new SMTPServer({
    closeTimeout: 500,
    banner: 'Riseback keeps what comes in',
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    logger: false,
    maxClients: MOST_CLIENTS,
    size: LARGEST_MAIL_BYTES,
    onData: (stream, _session, done) => {
      simpleParser(stream).then(
        (mail) => {
          if (stream.sizeExceeded) done(new Error('552 the mail is too large'));
          else done(keep(received, mail, now()));
        },
        (error: unknown) => done(error instanceof Error ? error : new Error(String(error))),
      );
    },
  });
  server.on('error', report);
  const address = await new Promise<AddressInfo>((resolve, reject) => {
    server.server.once('error', reject);
    const listening = server.listen(0, '127.0.0.1', () => resolve(listening.address() as AddressInfo));
  });
  return {
    url: new URL(`smtp://127.0.0.1:${String(address.port)}`),
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}

/** @returns why it was not kept, for the sender to try again */
function keep(received: ReceivedMails, mail: ParsedMail, at: Date): Error | undefined {
  try {
    received.take(incoming(mail, at));
    return undefined;
  } catch (error) {
    return error instanceof Error ? error : new Error(String(error));
  }
}

function incoming(mail: ParsedMail, at: Date): IncomingMail {
  const site = mail.headers.get('x-riseback-site');
  return {
    messageId: mail.messageId ?? `<none-${at.toISOString()}@localhost>`,
    to: [mail.to ?? []].flat().map(addressText).join(', '),
    from: mail.from === undefined ? '' : addressText(mail.from),
    subject: mail.subject ?? '',
    receivedAt: at.toISOString(),
    text: mail.text ?? '',
    html: typeof mail.html === 'string' ? mail.html : '',
    ...(typeof site === 'string' ? { siteId: site } : {}),
  };
}

function addressText({ text }: AddressObject): string {
  return text;
}

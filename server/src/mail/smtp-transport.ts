import { createTransport, type Transporter } from 'nodemailer';
import { DeliveryError, type MailTransport, type OutgoingMail } from './mail-transport';

const LOOPBACK = ['localhost', '127.0.0.1', '[::1]'];
/** RFC 6409 and RFC 8314. */
const SUBMISSION_PORT = 587;
const SUBMISSIONS_PORT = 465;
const CONNECT_MS = 15_000;
const SILENCE_MS = 60_000;
const LONGEST_ERROR = 300;
/** Codes of nodemailer's for what is wrong with the way, not with the mail. */
const UNREACHABLE = [
  'ECONNECTION',
  'ETIMEDOUT',
  'EDNS',
  'ESOCKET',
  'ETLS',
  'EREQUIRETLS',
  'EAUTH',
  'ENOAUTH',
  'EPROTOCOL',
];

/** Sends through a mail server: encrypted always, except to this very machine. */
export class SmtpTransport implements MailTransport {
  private readonly transporter: Transporter;
  private readonly secrets: readonly string[];

  constructor(
    url: URL,
    private readonly from: string,
  ) {
    const secure = url.protocol === 'smtps:';
    const user = decodeURIComponent(url.username);
    const pass = decodeURIComponent(url.password);
    this.secrets = secretsOf(user, pass);
    this.transporter = createTransport({
      host: url.hostname.replace(/^\[(.*)\]$/, '$1'),
      port: url.port === '' ? (secure ? SUBMISSIONS_PORT : SUBMISSION_PORT) : Number(url.port),
      secure,
      requireTLS: !secure && !LOOPBACK.includes(url.hostname),
      ...(user === '' ? {} : { auth: { user, pass } }),
      connectionTimeout: CONNECT_MS,
      greetingTimeout: CONNECT_MS,
      socketTimeout: SILENCE_MS,
      // a mail is what it was given, never a file or a page of somebody's
      disableFileAccess: true,
      disableUrlAccess: true,
    });
  }

  async send({ messageId, to, date, siteId, subject, text, html }: OutgoingMail): Promise<void> {
    try {
      await this.transporter.sendMail({
        ...{ from: this.from, to, messageId, date, subject, text, html },
        headers: {
          'Auto-Submitted': 'auto-generated',
          ...(siteId === null ? {} : { 'X-Riseback-Site': siteId }),
        },
      });
    } catch (error) {
      throw new DeliveryError(this.wordsOf(error), isUnreachable(error));
    }
  }

  close(): void {
    this.transporter.close();
  }

  /** One line for people, without what signs in at the mail server: some servers repeat what they were sent. */
  private wordsOf(error: unknown): string {
    const words = error instanceof Error ? error.message : String(error);
    const plain = this.secrets.reduce((text, secret) => text.replaceAll(secret, '…'), words);
    return plain.replaceAll(/[\p{Cc}\s]+/gu, ' ').slice(0, LONGEST_ERROR);
  }
}

function secretsOf(user: string, pass: string): string[] {
  if (pass === '') return [];
  const base64 = (text: string) => Buffer.from(text).toString('base64');
  return [pass, encodeURIComponent(pass), base64(pass), base64(`\0${user}\0${pass}`)];
}

function isUnreachable(error: unknown): boolean {
  return (
    error instanceof Error && 'code' in error && typeof error.code === 'string' && UNREACHABLE.includes(error.code)
  );
}

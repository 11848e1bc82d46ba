import { MailComposer } from '../../server/src/mail/mail-composer';
import { MailSender, type MailEnd } from '../../server/src/mail/mail-sender';
import { DeliveryError, type MailTransport, type OutgoingMail } from '../../server/src/mail/mail-transport';
import type { TestServer } from './test-server';

export const ORIGIN = new URL('https://riseback.example');

/** A mail server that takes what it is given, or refuses it as told. */
export class TestTransport implements MailTransport {
  readonly sent: OutgoingMail[] = [];
  refusal: DeliveryError | undefined;
  /** Sends under way, and the most there were. */
  atOnce = 0;
  mostAtOnce = 0;

  async send(mail: OutgoingMail): Promise<void> {
    this.atOnce += 1;
    this.mostAtOnce = Math.max(this.mostAtOnce, this.atOnce);
    await new Promise((resolve) => setImmediate(resolve));
    this.atOnce -= 1;
    if (this.refusal !== undefined) throw this.refusal;
    this.sent.push(mail);
  }

  close(): void {
    this.refusal = new DeliveryError('closed', true);
  }

  /** The last mail to that address. */
  lastTo(email: string): OutgoingMail {
    const mail = this.sent.findLast(({ to }) => to.address === email);
    if (mail === undefined) throw new Error(`no mail went to ${email}`);
    return mail;
  }
}

/** What sends the outbox of a test's server, whenever the test says so. */
export class TestPost {
  readonly ends: MailEnd[] = [];
  readonly warnings: string[] = [];
  readonly errors: unknown[] = [];
  readonly sender: MailSender;

  constructor(
    server: TestServer,
    readonly transport = new TestTransport(),
  ) {
    const { repository, links } = server.app.post;
    const composer = new MailComposer(repository, links, ORIGIN);
    this.sender = new MailSender({
      outbox: repository,
      compose: (row) => composer.compose(row),
      transport,
      now: () => server.now(),
      random: () => 0,
      ended: (end) => this.ends.push(end),
      warn: (what, message) => this.warnings.push(`${message} ${JSON.stringify(what)}`),
      report: (error) => this.errors.push(error),
    });
  }

  get sent(): readonly OutgoingMail[] {
    return this.transport.sent;
  }

  /** Sends what is due and gives the mail that went to that address last. */
  async mailTo(email: string): Promise<OutgoingMail> {
    await this.sender.sendDue();
    return this.transport.lastTo(email);
  }
}

/** The token of the link in a mail. */
export function tokenIn(mail: Pick<OutgoingMail, 'text'>): string {
  const token = /#([A-Za-z0-9_-]{43})\n/.exec(mail.text)?.[1];
  if (token === undefined) throw new Error(`no link in: ${mail.text}`);
  return token;
}

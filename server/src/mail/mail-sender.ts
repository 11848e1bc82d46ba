import type { Composed } from './mail-composer';
import { DeliveryError, type MailTransport } from './mail-transport';
import type { MailRow, OutboxRepository } from './outbox-repository';
import { nextTry } from './retry-schedule';

/** How a try ended. */
export type MailEnd = 'sent' | 'failed' | 'givenUp';

export interface SenderParts {
  readonly outbox: OutboxRepository;
  readonly compose: (row: MailRow) => Composed;
  readonly transport: MailTransport;
  readonly now: () => Date;
  /** From 0 to 1. */
  readonly random: () => number;
  /** Told of each try. */
  readonly ended: (end: MailEnd) => void;
  /** Told of what a person should know: a mail server that cannot be reached, a mail that was given up. */
  readonly warn: (what: Readonly<Record<string, unknown>>, message: string) => void;
  readonly report: (error: unknown) => void;
}

/** While the mail server cannot be reached, one mail in this time tries whether it can be again. */
const PAUSE_MS = 60_000;
/** A database put back, or a clock set, is noticed within this time. */
const LONGEST_SLEEP_MS = 60_000;
const LONGEST_GOODBYE_MS = 1_500;

/**
 * Sends what waits in the outbox, one after the other. A mail is marked when the mail server has taken it; killed between
 * the two, it is sent once more under the same Message-ID. So each arrives at least once.
 */
export class MailSender {
  private passing: Promise<void> | undefined;
  private timer: NodeJS.Timeout | undefined;
  private pausedUntil = 0;
  private state: 'idle' | 'started' | 'stopped' = 'idle';

  constructor(private readonly parts: SenderParts) {}

  start(): void {
    this.state = 'started';
    this.wake();
  }

  /** For when there may be something to send. */
  wake(): void {
    void this.sendDue();
  }

  /** Sends all that is due, and never fails. */
  sendDue(): Promise<void> {
    this.passing ??= this.pass().finally(() => {
      this.passing = undefined;
      this.sleep();
    });
    return this.passing;
  }

  /** Waits for the mail that is being sent, a little; what is then not sent waits for the next start. */
  async stop(): Promise<void> {
    this.state = 'stopped';
    clearTimeout(this.timer);
    let patience: NodeJS.Timeout | undefined;
    const enough = new Promise<void>((resolve) => {
      patience = setTimeout(resolve, LONGEST_GOODBYE_MS);
    });
    await Promise.race([this.passing, enough]);
    clearTimeout(patience);
    this.parts.transport.close();
  }

  private async pass(): Promise<void> {
    try {
      while (this.state !== 'stopped' && this.time() >= this.pausedUntil) {
        const row = this.parts.outbox.firstDue(this.parts.now().toISOString());
        if (row === undefined) return;
        await this.deliver(row);
      }
    } catch (error) {
      // stopped in the middle of a sending that took too long: the database may be closed by now
      if (this.state === 'stopped') return;
      // Such as a full disk: what was sent could not be marked. Not at once again, or it would be sent without end.
      this.pausedUntil = this.time() + PAUSE_MS;
      this.parts.report(error);
    }
  }

  private async deliver(row: MailRow): Promise<void> {
    const { outbox, transport, now, ended } = this.parts;
    let composed: Composed;
    try {
      composed = this.parts.compose(row);
      if ('mail' in composed) await transport.send(composed.mail);
    } catch (error) {
      this.failed(row, error);
      return;
    }
    if ('pointless' in composed) {
      outbox.giveUp(row.id, composed.pointless, false);
      ended('givenUp');
    } else {
      outbox.markSent(row.id, now().toISOString());
      ended('sent');
    }
  }

  private failed({ id, purpose, attempts, createdAt }: MailRow, error: unknown): void {
    const { outbox, now, random, ended, warn, report } = this.parts;
    const known = error instanceof DeliveryError ? error : undefined;
    if (known === undefined) report(error);
    const words = known?.message ?? 'It could not be sent; the log has the reason.';
    if (known?.unreachable === true) this.pausedUntil = this.time() + PAUSE_MS;
    // What is wrong with one mail names its recipient, and is for the outbox; what is wrong with the way is for the log.
    const told = { mail: id, purpose, attempts: attempts + 1, ...(known?.unreachable === true ? { why: words } : {}) };
    const next = nextTry(attempts + 1, new Date(createdAt), now(), random());
    if (next === undefined) {
      outbox.giveUp(id, words, true);
      ended('givenUp');
      warn(told, 'a mail was given up');
      return;
    }
    outbox.postpone(id, next.toISOString(), words);
    ended('failed');
    warn(told, 'a mail could not be sent and is tried again');
  }

  private sleep(): void {
    clearTimeout(this.timer);
    if (this.state !== 'started') return;
    this.timer = setTimeout(() => this.wake(), this.sleepMs());
    // the server's socket keeps the process alive, not this
    this.timer.unref();
  }

  private sleepMs(): number {
    try {
      const next = this.parts.outbox.nextTryAt();
      const due = next === undefined ? LONGEST_SLEEP_MS : Date.parse(next) - this.time();
      const paused = this.pausedUntil - this.time();
      return Math.min(LONGEST_SLEEP_MS, Math.max(due, paused, 10));
    } catch {
      return LONGEST_SLEEP_MS;
    }
  }

  private time(): number {
    return this.parts.now().getTime();
  }
}

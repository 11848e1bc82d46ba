import type { Response } from 'express';

/** One event as it goes over the wire; `id` is what a browser sends back as Last-Event-ID. */
export interface ServerEvent {
  readonly event: string;
  readonly data: unknown;
  readonly id?: number;
}

/** How soon a browser that lost its stream asks again. */
const RETRY_MS = 1_000;
/** A reader that leaves this much unread is gone or too slow; it asks again from the last event that it has. */
const MOST_UNREAD_BYTES = 2 * 1024 * 1024;
/** What is on its way has so long to arrive; then a reader that does not read is dropped with all that it left. */
const DRAIN_MS = 5_000;

/** A response that stays open and carries server-sent events (HTML standard, 9.2). */
export class EventStream {
  constructor(private readonly res: Response) {
    res.status(200).set({
      'Content-Type': 'text/event-stream',
      'Cache-Control': 'no-store, no-transform',
      // nginx would hold events back to fill its buffer
      'X-Accel-Buffering': 'no',
    });
    res.flushHeaders();
    this.write(`retry: ${String(RETRY_MS)}\n\n`);
  }

  get open(): boolean {
    return !this.res.writableEnded && !this.res.destroyed;
  }

  send({ event, data, id }: ServerEvent): void {
    const idLine = id === undefined ? '' : `id: ${String(id)}\n`;
    // JSON text holds no line break, so one data line carries all of it
    this.write(`${idLine}event: ${event}\ndata: ${JSON.stringify(data)}\n\n`);
  }

  /** A comment: keeps proxies from taking the silence for an end. */
  beat(): void {
    this.write(': beat\n\n');
  }

  onClosed(told: () => void): void {
    this.res.once('close', told);
  }

  end(): void {
    this.res.end();
  }

  /** Ended before it is destroyed: what is on its way may arrive, so that the next request starts further on. */
  private giveUp(): void {
    this.res.end();
    const dropped = setTimeout(() => this.res.destroy(), DRAIN_MS).unref();
    this.res.once('close', () => clearTimeout(dropped));
  }

  private write(text: string): void {
    if (!this.open) return;
    if (this.res.writableLength > MOST_UNREAD_BYTES) this.giveUp();
    else this.res.write(text);
  }
}

import type { Wire } from './wire';

type Listener = (event: { readonly data: string }) => void;

const RETRY_MS = 30;

/** The browser's EventSource over a tab's wire, as far as the client uses it: it comes back by itself until it is closed. */
export class WireEventSource {
  static readonly CLOSED = 2;
  /** Whose wire the next one goes over: a browser would know its tab. */
  static wire: Wire | undefined;

  readyState = 0;
  private readonly wire = WireEventSource.wire;
  private readonly listeners = new Map<string, Listener[]>();
  private lastId: string | undefined;

  constructor(private readonly url: string) {
    void this.run();
  }

  addEventListener(name: string, listener: Listener): void {
    this.listeners.set(name, [...(this.listeners.get(name) ?? []), listener]);
  }

  close(): void {
    this.readyState = WireEventSource.CLOSED;
  }

  private get over(): boolean {
    return this.readyState === WireEventSource.CLOSED || this.wire === undefined || this.wire.dead;
  }

  private async run(): Promise<void> {
    while (!this.over) {
      await this.readOnce().catch(() => undefined);
      await new Promise((resolve) => setTimeout(resolve, RETRY_MS));
    }
  }

  private async readOnce(): Promise<void> {
    const address = this.wire?.reachable();
    if (this.wire === undefined || address === undefined) return;
    const headers = {
      ...this.wire.headers,
      Accept: 'text/event-stream',
      ...(this.lastId === undefined ? {} : { 'Last-Event-ID': this.lastId }),
    };
    const response = await fetch(address + this.url, { headers });
    if (!response.ok || response.body === null) return;
    const chunks = response.body.getReader();
    this.emit('open', '');
    const decoder = new TextDecoder();
    let text = '';
    for (;;) {
      const next = await Promise.race([chunks.read(), this.lost()]);
      if (next === 'lost' || next.done || this.wire.reachable() === undefined) break;
      text += decoder.decode(next.value, { stream: true });
      const blocks = text.split('\n\n');
      text = blocks.pop() ?? '';
      for (const block of blocks) this.take(block.split('\n'));
    }
    await chunks.cancel().catch(() => undefined);
  }

  /** Waits for the wire to break or the reader to close, which no read would notice. */
  private async lost(): Promise<'lost'> {
    while (!this.over && this.wire?.reachable() !== undefined) await new Promise((resolve) => setTimeout(resolve, 10));
    return 'lost';
  }

  private take(lines: readonly string[]): void {
    const field = (name: string) => lines.find((line) => line.startsWith(`${name}: `))?.slice(name.length + 2);
    this.lastId = field('id') ?? this.lastId;
    const event = field('event');
    if (event !== undefined) this.emit(event, field('data') ?? 'null');
  }

  private emit(name: string, data: string): void {
    if (this.over) return;
    for (const listener of this.listeners.get(name) ?? []) listener({ data });
  }
}

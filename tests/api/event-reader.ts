import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { HOST, type Client, type TestServer } from './test-server';

export interface ReadEvent {
  readonly event: string;
  readonly id: string | undefined;
  readonly data: unknown;
}

/** The application behind a real socket, because a stream never ends and supertest waits for the end. */
export async function listening(server: TestServer): Promise<{ http: Server; origin: string }> {
  const http = createServer(server.app.handler);
  await new Promise<void>((resolve) => {
    http.listen(0, '127.0.0.1', resolve);
  });
  return { http, origin: `http://127.0.0.1:${String((http.address() as AddressInfo).port)}` };
}

/** Reads one stream as a browser's EventSource does, without coming back by itself. */
export class EventReader {
  readonly events: ReadEvent[] = [];
  comments = 0;
  ended = false;
  private readonly abort = new AbortController();
  private wake: () => void = () => undefined;

  private constructor(readonly status: number) {}

  static async open(
    origin: string,
    client: Client,
    networkId: string,
    from: { since?: number; lastEventId?: number } = {},
  ): Promise<EventReader> {
    const query = from.since === undefined ? '' : `?since=${String(from.since)}`;
    const abort = new AbortController();
    const response = await fetch(`${origin}/api/networks/${networkId}/events${query}`, {
      signal: abort.signal,
      headers: {
        Host: HOST,
        Accept: 'text/event-stream',
        ...(client.cookie === undefined ? {} : { Cookie: client.cookie }),
        ...(from.lastEventId === undefined ? {} : { 'Last-Event-ID': String(from.lastEventId) }),
      },
    });
    const reader = new EventReader(response.status);
    reader.abort.signal.addEventListener('abort', () => abort.abort());
    if (response.body !== null) void reader.read(response.body);
    return reader;
  }

  close(): void {
    this.abort.abort();
  }

  of(event: string): ReadEvent[] {
    return this.events.filter((read) => read.event === event);
  }

  /** Waits for something to be so, at most two seconds. */
  async until(holds: () => boolean, what: string): Promise<void> {
    const late = Date.now() + 2_000;
    while (!holds()) {
      if (Date.now() > late) throw new Error(`Not within two seconds: ${what}`);
      await new Promise<void>((resolve) => {
        this.wake = resolve;
        setTimeout(resolve, 20);
      });
    }
  }

  private async read(body: ReadableStream<Uint8Array>): Promise<void> {
    const decoder = new TextDecoder();
    let text = '';
    try {
      const chunks = body.getReader();
      for (let next = await chunks.read(); !next.done; next = await chunks.read()) {
        text += decoder.decode(next.value, { stream: true });
        const blocks = text.split('\n\n');
        text = blocks.pop() ?? '';
        for (const block of blocks) this.take(block.split('\n'));
        this.wake();
      }
    } catch {
      // closed by this side
    }
    this.ended = true;
    this.wake();
  }

  private take(lines: readonly string[]): void {
    const field = (name: string) => lines.find((line) => line.startsWith(`${name}: `))?.slice(name.length + 2);
    const event = field('event');
    if (event !== undefined) this.events.push({ event, id: field('id'), data: JSON.parse(field('data') ?? 'null') });
    else if (lines.some((line) => line.startsWith(':'))) this.comments += 1;
  }
}

import { beforeEach, describe, expect, it } from 'vitest';
import type { OutboxItem, QueuedItem } from './kept-items';
import { type Answer, type Outbox, sendInOrder } from './send-in-order';

const PROBLEM = { type: 'about:blank', title: 'No', status: 400 };

function reading(seq: number): OutboxItem {
  return {
    kind: 'reading',
    personId: 'p1',
    networkId: 'n1',
    roundId: 'r1',
    body: {
      id: `reading-${String(seq)}`,
      gaugeId: 'G1',
      valuePa: seq,
      note: '',
      takenAt: '2026-12-01T10:00:00Z',
      deviceId: 'd1',
      deviceSeq: seq,
    },
  };
}

function photo(of: number): OutboxItem {
  const content = new ArrayBuffer(1);
  const readingId = `reading-${String(of)}`;
  return {
    kind: 'photo',
    personId: 'p1',
    networkId: 'n1',
    roundId: 'r1',
    readingId,
    photoId: `photo-${String(of)}`,
    mediaType: 'image/jpeg',
    content,
  };
}

const idOf = (item: OutboxItem) =>
  item.kind === 'reading' ? item.body.id : item.kind === 'photo' ? item.photoId : item.kind;

/** What the device keeps, as its database does: it outlives whoever sends. */
class KeptOutbox implements Outbox {
  private readonly items = new Map<number, OutboxItem>();
  private last = 0;

  add(item: OutboxItem): void {
    this.items.set((this.last += 1), item);
  }

  waiting(): Promise<readonly QueuedItem[]> {
    return Promise.resolve([...this.items].map(([place, item]) => ({ place, item })));
  }

  sent({ place }: QueuedItem): Promise<void> {
    this.items.delete(place);
    return Promise.resolve();
  }

  refused({ place, item }: QueuedItem, problem: typeof PROBLEM): Promise<void> {
    this.items.set(place, { ...item, refused: problem });
    return Promise.resolve();
  }
}

/** Stores each id once, whatever comes; a plan says what becomes of each request. */
class Server {
  readonly stored: string[] = [];
  requests = 0;
  inFlight = 0;
  mostInFlight = 0;

  constructor(
    private readonly plan: (request: number, id: string) => 'answer' | 'loseRequest' | 'loseAnswer' | Answer,
  ) {}

  readonly take = async (item: OutboxItem): Promise<Answer> => {
    const id = idOf(item);
    this.inFlight += 1;
    this.mostInFlight = Math.max(this.mostInFlight, this.inFlight);
    const fate = this.plan((this.requests += 1), id);
    await Promise.resolve();
    this.inFlight -= 1;
    if (typeof fate === 'object') return fate;
    if (fate === 'loseRequest') return { kind: 'noAnswer' };
    if (!this.stored.includes(id)) this.stored.push(id);
    return fate === 'loseAnswer' ? { kind: 'noAnswer' } : { kind: 'taken' };
  };
}

describe('sendInOrder', () => {
  let outbox: KeptOutbox;
  const all = Array.from({ length: 50 }, (_, i) => `reading-${String(i + 1)}`);

  beforeEach(() => {
    outbox = new KeptOutbox();
    for (let seq = 1; seq <= 50; seq += 1) outbox.add(reading(seq));
  });

  it('sends all in order, one at a time', async () => {
    const server = new Server(() => 'answer');
    expect(await sendInOrder(outbox, 'p1', server.take)).toBe('empty');
    expect(server.stored).toEqual(all);
    expect(server.mostInFlight).toBe(1);
    expect(await outbox.waiting()).toEqual([]);
  });

  it('stores each once and in order when every third request is lost and every fifth answer', async () => {
    const server = new Server((request) =>
      request % 3 === 0 ? 'loseRequest' : request % 5 === 0 ? 'loseAnswer' : 'answer',
    );
    let halts = 0;
    while ((await sendInOrder(outbox, 'p1', server.take)) !== 'empty') halts += 1;
    expect(halts).toBeGreaterThan(10);
    expect(server.stored).toEqual(all);
  });

  it('goes on where a tab that crashed after an answer had stopped', async () => {
    const server = new Server(() => 'answer');
    const crashing: Outbox = {
      waiting: () => outbox.waiting(),
      sent: (queued) => (server.requests === 20 ? Promise.reject(new Error('gone')) : outbox.sent(queued)),
      refused: (queued, problem) => outbox.refused(queued, problem),
    };
    await expect(sendInOrder(crashing, 'p1', server.take)).rejects.toThrow('gone');
    await sendInOrder(outbox, 'p1', server.take);
    expect(server.stored).toEqual(all);
    expect(server.requests).toBe(51);
  });

  it('sets aside what is refused and holds up nothing behind it', async () => {
    const server = new Server((_, id) => (id === 'reading-7' ? { kind: 'refused', problem: PROBLEM } : 'answer'));
    expect(await sendInOrder(outbox, 'p1', server.take)).toBe('empty');
    expect(server.stored).toEqual(all.filter((id) => id !== 'reading-7'));
    expect((await outbox.waiting()).map(({ item }) => [idOf(item), item.refused])).toEqual([['reading-7', PROBLEM]]);
  });

  it('stops where nobody is signed in, with everything kept', async () => {
    const server = new Server(() => ({ kind: 'signedOut' }));
    expect(await sendInOrder(outbox, 'p1', server.take)).toBe('signedOut');
    expect(await outbox.waiting()).toHaveLength(50);
  });

  it('sends what is kept meanwhile, and photographs after all readings', async () => {
    outbox = new KeptOutbox();
    for (const item of [reading(1), photo(1), reading(2)]) outbox.add(item);
    const server = new Server((request) => {
      if (request === 1) outbox.add(reading(3));
      return 'answer';
    });
    await sendInOrder(outbox, 'p1', server.take);
    expect(server.stored).toEqual(['reading-1', 'reading-2', 'reading-3', 'photo-1']);
  });
});

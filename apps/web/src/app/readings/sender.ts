import { computed, inject, Injectable, signal } from '@angular/core';
import { SessionStore } from '../session/session-store';
import { DeviceStore } from './device-store';
import type { QueuedItem } from './kept-items';
import { RoundApi } from './round-api';
import { type Halt, sendInOrder } from './send-in-order';

/** The next try when nobody answered, though the browser believes in a connection. */
const AGAIN_MS = 10_000;
/** Only one tab of the browser sends at a time. */
const LOCK = 'riseback-readings-sending';

/** Brings what was kept on the device to the server: at the start, when something is kept, and when the connection is back. */
@Injectable({ providedIn: 'root' })
export class Sender {
  private readonly device = inject(DeviceStore);
  private readonly api = inject(RoundApi);
  private readonly session = inject(SessionStore);

  private readonly queue = signal<readonly QueuedItem[]>([]);
  private readonly halted = signal<Halt>('empty');
  private readonly taken = signal(0);
  private running = false;
  private wanted = false;
  private again: ReturnType<typeof setTimeout> | undefined;

  /** How many readings lie here that the server does not have. */
  readonly waitingReadings = computed(() => this.queue().filter(({ item }) => item.kind === 'reading').length);
  readonly waitingItems = computed(() => this.queue().length);
  readonly refused = computed(() => this.queue().flatMap(({ item }) => (item.refused === undefined ? [] : [item])));
  readonly sending = signal(false);
  readonly unanswered = computed(() => this.halted() === 'noAnswer');
  readonly signedOut = computed(() => this.halted() === 'signedOut');
  /** Counted up with each thing that the server took. */
  readonly takenCount = this.taken.asReadonly();

  constructor() {
    addEventListener('online', () => this.start());
  }

  /** Sends what waits; called again while it does, it looks once more afterwards. */
  start(): void {
    this.wanted = true;
    if (!this.running) void this.run();
  }

  async tryRefusedAgain(): Promise<void> {
    const personId = this.session.person()?.id;
    if (personId !== undefined) await this.device.tryRefusedAgain(personId);
    this.start();
  }

  /** What lies here of a person, whether it can be sent or not. */
  async look(personId: string): Promise<void> {
    this.queue.set(await this.device.waiting(personId));
  }

  private async run(): Promise<void> {
    this.running = true;
    clearTimeout(this.again);
    try {
      while (this.wanted) {
        this.wanted = false;
        await navigator.locks.request(LOCK, () => this.sendAll());
      }
    } finally {
      this.running = false;
      this.sending.set(false);
    }
    if (this.halted() === 'noAnswer') this.again = setTimeout(() => this.start(), AGAIN_MS);
  }

  private async sendAll(): Promise<void> {
    if (!navigator.onLine) {
      this.halted.set('noAnswer');
      return;
    }
    // a page that was opened with no signal does not know yet whose session it has
    const person = await this.session.restore().catch(() => undefined);
    if (person === undefined || person === null) {
      this.halted.set(person === null ? 'signedOut' : 'noAnswer');
      return;
    }
    const personId = person.id;
    await this.look(personId);
    const open = this.queue().some(({ item }) => item.refused === undefined);
    this.sending.set(open);
    const halt = await sendInOrder(this.watched(), personId, (item) => this.api.send(item));
    this.halted.set(halt);
    await this.look(personId);
  }

  /** The device's queue, with what becomes of it shown at once. */
  private watched() {
    return {
      waiting: async (personId: string) => {
        await this.look(personId);
        return this.queue();
      },
      sent: async (queued: QueuedItem) => {
        await this.device.sent(queued);
        this.taken.update((count) => count + 1);
      },
      refused: this.device.refused.bind(this.device),
    };
  }
}

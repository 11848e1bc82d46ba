import type { Problem } from '@riseback/contracts';
import type { OutboxItem, QueuedItem } from './kept-items';

/** Where the items lie. */
export interface Outbox {
  /** All that this person has waiting, in order. */
  waiting(personId: string): Promise<readonly QueuedItem[]>;
  /** The server has it. */
  sent(queued: QueuedItem): Promise<void>;
  refused(queued: QueuedItem, problem: Problem): Promise<void>;
}

/** What became of one request. */
export type Answer =
  | { readonly kind: 'taken' }
  /** Nobody answered, or the server is busy: later. */
  | { readonly kind: 'noAnswer' }
  /** The session has ended: after signing in. */
  | { readonly kind: 'signedOut' }
  | { readonly kind: 'refused'; readonly problem: Problem };

export type Halt = 'empty' | 'noAnswer' | 'signedOut';

/**
 * Sends what waits, one at a time and in order; each goes until the server has said that it has it, so that an answer lost on the way
 * only means that the same is sent again under the same id. What the server refuses is set aside and holds up nothing behind it.
 */
export async function sendInOrder(
  outbox: Outbox,
  personId: string,
  send: (item: OutboxItem) => Promise<Answer>,
): Promise<Halt> {
  for (;;) {
    const next = nextToSend(await outbox.waiting(personId));
    if (next === undefined) return 'empty';
    const answer = await send(next.item);
    switch (answer.kind) {
      case 'taken':
        await outbox.sent(next);
        break;
      case 'refused':
        await outbox.refused(next, answer.problem);
        break;
      case 'noAnswer':
      case 'signedOut':
        return answer.kind;
    }
  }
}

/** Photographs come last: on a weak signal they would keep the readings waiting. */
function nextToSend(waiting: readonly QueuedItem[]): QueuedItem | undefined {
  const open = waiting.filter(({ item }) => item.refused === undefined);
  return open.find(({ item }) => item.kind !== 'photo') ?? open[0];
}

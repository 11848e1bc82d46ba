import { parentPort } from 'node:worker_threads';
import { compareSync, hashSync } from 'bcryptjs';
import type { HashAnswer, HashMessage } from '../src/platform/auth/password-threads';

/** A thread behind PasswordThreads: one password at a time. */
const port = parentPort;
if (port === null) throw new Error('hash-worker runs as a worker thread');

port.on('message', (message: HashMessage) => {
  port.postMessage(answer(message));
});

function answer({ id, order }: HashMessage): HashAnswer {
  try {
    return {
      id,
      value: order.kind === 'hash' ? hashSync(order.text, order.cost) : compareSync(order.text, order.hash),
    };
  } catch (error) {
    // the message alone: a stack could not hold the text, but nothing is gained by risking it
    return { id, broke: error instanceof Error ? error.message : 'unknown' };
  }
}

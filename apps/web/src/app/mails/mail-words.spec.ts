import type { OutboxMail } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { stateWords } from './mail-words';

const mail: OutboxMail = {
  id: 'm1',
  purpose: 'invitation',
  email: 'bo@quay.example',
  state: 'waiting',
  attempts: 0,
  createdAt: '2026-12-01T08:00:00.000Z',
};

describe('stateWords', () => {
  it('say when a mail was sent, by the clocks of the person', () => {
    const sent = stateWords({ ...mail, state: 'sent', attempts: 1, sentAt: '2026-12-01T08:00:05.000Z' }, 'Asia/Tokyo');
    expect(sent).toEqual({ status: 'pass', word: 'Sent', detail: '1 Dec 2026, 17:00' });
  });

  it('say why one waits or was given up, and when it is tried next', () => {
    expect(stateWords(mail, 'UTC').detail).toBe('goes in a moment');
    const tried = { ...mail, attempts: 2, nextTryAt: '2026-12-01T08:04:00.000Z', lastError: 'no answer' };
    expect(stateWords(tried, 'UTC').detail).toBe('next try 1 Dec 2026, 08:04; 2 attempts: no answer');
    expect(stateWords({ ...mail, state: 'givenUp', attempts: 1, lastError: 'no such box' }, 'UTC')).toEqual({
      status: 'fail',
      word: 'Given up',
      detail: 'after 1 attempt: no such box',
    });
  });
});

import { describe, expect, it } from 'vitest';
import { actionWords, detailWords } from './audit-words';

describe('the words of an entry', () => {
  it('say what was done, and keep the name of what is not known here', () => {
    expect(actionWords('session.refuse')).toBe('was refused at sign-in');
    expect(actionWords('moon.land')).toBe('moon.land');
  });

  it('tell the details in one line', () => {
    expect(detailWords({ details: { version: 18, label: 'move TR-104' } })).toBe('version 18, “move TR-104”');
    expect(detailWords({ details: { why: 'wrongPassword', address: '192.0.2.7' } })).toBe(
      'wrong password, address 192.0.2.7',
    );
    expect(detailWords({ details: {} })).toBe('');
  });
});

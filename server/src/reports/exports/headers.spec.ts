import { describe, expect, it } from 'vitest';
import { headersOf } from './headers';

describe('headers', () => {
  it('end where another header meets them; what joins further down belongs to the main', () => {
    // two halls of two traps each, H1 and H2 being their headers, meet at the riser M1; T5 drains into the rack M2
    const headers = headersOf([
      { trapId: 'T1', walk: ['B1', 'H1a', 'H1b', 'M1', 'M2'] },
      { trapId: 'T2', walk: ['B2', 'H1b', 'M1', 'M2'] },
      { trapId: 'T6', walk: ['B6', 'H1a', 'H1b', 'M1', 'M2'] },
      { trapId: 'T3', walk: ['B3', 'H2', 'M1', 'M2'] },
      { trapId: 'T4', walk: ['B4', 'H2', 'M1', 'M2'] },
      { trapId: 'T5', walk: ['B5', 'M2'] },
    ]);
    expect(Object.fromEntries(headers)).toEqual({ T1: 'H1b', T2: 'H1b', T6: 'H1b', T3: 'H2', T4: 'H2', T5: 'M2' });
  });

  it('are one for each trap that shares no pipe', () => {
    const headers = headersOf([
      { trapId: 'T1', walk: ['B1'] },
      { trapId: 'T2', walk: [] },
    ]);
    expect(Object.fromEntries(headers)).toEqual({ T1: 'T1', T2: 'T2' });
  });
});

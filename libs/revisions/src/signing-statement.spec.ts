import { describe, expect, it } from 'vitest';
import { eventText, recordText, statementText } from './signing-statement';

const REVISION = {
  id: 'r1',
  networkId: 'n1',
  letter: 'A',
  title: 'T',
  reason: 'R',
  networkVersion: 3,
  fileHash: 'f',
  solverHash: 's',
  resultsHash: 'e',
  engineVersion: '1',
  createdBy: 'd',
  createdAt: '2026-03-02T08:00:00.000Z',
};
const EVENT = { seq: 1, state: 'draft', personId: 'd', at: '2026-03-02T08:00:00.000Z', note: 'é' } as const;

describe('the text that is signed', () => {
  // written out by hand after RFC 8785: keys in the order of their UTF-16 units, no spaces, nothing escaped that need not be
  it('is the RFC 8785 text of what the signature binds', () => {
    const text = statementText({
      revision: REVISION,
      events: [EVENT],
      person: { id: 'p', name: 'Å', role: 'reviewer' },
      at: '2026-03-03T09:00:00.000Z',
      meaning: 'approved',
      sentences: ['I approve.'],
      audit: { seq: 9, hash: 'h' },
    });
    expect(text).toBe(
      '{"at":"2026-03-03T09:00:00.000Z","audit":{"hash":"h","seq":9},"events":[{"at":"2026-03-02T08:00:00.000Z","note":"é","personId":"d","seq":1,"state":"draft"}],"format":"riseback-signature","meaning":"approved","person":{"id":"p","name":"Å","role":"reviewer"},"revision":{"createdAt":"2026-03-02T08:00:00.000Z","createdBy":"d","engineVersion":"1","fileHash":"f","id":"r1","letter":"A","networkId":"n1","networkVersion":3,"reason":"R","resultsHash":"e","solverHash":"s","title":"T"},"sentences":["I approve."],"version":1}',
    );
  });

  it('holds nothing that a row carries beside', () => {
    expect(recordText({ ...REVISION, ...{ createdByName: 'x', file: '{}' } })).toBe(recordText(REVISION));
    expect(eventText({ ...EVENT, ...{ personName: 'x' } })).toBe(eventText(EVENT));
  });
});

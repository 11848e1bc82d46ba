import { describe, expect, it } from 'vitest';
import { signatureSentences, type SignedMatter } from './signature-meaning';

const MATTER: SignedMatter = {
  personName: 'Greta Lowndes',
  role: 'reviewer',
  networkName: 'Tern Quay',
  networkVersion: 7,
  letter: 'B',
  title: 'Washer bay',
  fileHash: 'f'.repeat(64),
  resultsHash: 'e'.repeat(64),
  engineVersion: '0.1.0+2',
  verdicts: { traps: 30, fail: 4, watch: 1 },
  openComments: 0,
  unsolvedCases: [],
  leftOut: 0,
};

describe('what a signature means', () => {
  it('says first what is declared, by whom and of what', () => {
    const [approved] = signatureSentences('approved', MATTER);
    expect(approved).toBe(
      'I, Greta Lowndes, reviewer at the site, have reviewed and approve revision B, “Washer bay”, of the network “Tern Quay” at its version 7. This ends its review and supersedes any revision approved before it.',
    );
    const [reviewed] = signatureSentences('reviewed', MATTER);
    expect(reviewed).toContain('have reviewed revision B');
    expect(reviewed).toContain('This does not approve it.');
  });

  it('names what it rests on', () => {
    const text = signatureSentences('approved', MATTER).join('\n');
    for (const part of ['f'.repeat(64), 'e'.repeat(64), 'engine 0.1.0+2']) expect(text).toContain(part);
    expect(text).toContain('Of 30 traps, each by its worst case, 4 fail a check and 1 more has to be watched.');
  });

  it('tells what is not there, where something is not', () => {
    const plain = signatureSentences('approved', MATTER);
    const gaps = { unsolvedCases: ['Start-up', 'Turndown'], leftOut: 1, openComments: 2 };
    const told = signatureSentences('approved', { ...MATTER, ...gaps }).filter((sentence) => !plain.includes(sentence));
    expect(told).toEqual([
      'No solution was found for 2 cases: “Start-up”, “Turndown”. The results say nothing of it.',
      '1 element from which no receiver can be reached is in no result.',
      '2 comments on this revision are still open.',
    ]);
  });

  it('ends with the cautions', () => {
    const [steam, codes] = signatureSentences('reviewed', MATTER).slice(-2);
    expect(steam).toContain('Steam and hot condensate burn and kill; water hammer breaks pipes.');
    expect(codes).toContain('does not replace local codes');
    expect(codes).toContain('licensed engineer');
  });
});

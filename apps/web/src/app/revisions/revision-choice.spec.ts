import type { RevisionState, RevisionSummary } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { comparedRevision, newestFirst, shownRevision, WORKING } from './revision-choice';
import { sealWords, workingWords } from './revision-words';

const revision = (letter: string, state: RevisionState, version: number): RevisionSummary => ({
  id: letter.toLowerCase(),
  letter,
  name: letter,
  title: letter,
  reason: '',
  state,
  networkVersion: version,
  fileHash: '',
  resultsHash: '',
  solverHash: '',
  engineVersion: '1',
  createdBy: 'p1',
  createdByName: 'Ines Kallan',
  createdAt: `2026-03-0${String(version)}T08:00:00.000Z`,
  changedAt: `2026-03-0${String(version)}T08:00:00.000Z`,
  openComments: 0,
});

describe('which revisions are looked at', () => {
  const history = newestFirst([
    revision('A', 'approved', 1),
    revision('C', 'underReview', 3),
    revision('B', 'returned', 2),
    revision('D', 'withdrawn', 4),
  ]);

  it('is the newest that was not withdrawn, unless the address names one', () => {
    expect(history.map(({ letter }) => letter)).toEqual(['D', 'C', 'B', 'A']);
    expect(shownRevision(history, undefined)).toBe('c');
    expect(shownRevision(history, 'd')).toBe('d');
    expect(shownRevision(history, 'unknown')).toBe('c');
    expect(shownRevision(history, WORKING)).toBe(WORKING);
    expect(shownRevision([], undefined)).toBeNull();
  });

  it('is beside the last approved one before it, since the plant was built by that', () => {
    expect(comparedRevision(history, 'c', undefined)).toBe('a');
    expect(comparedRevision(history, WORKING, undefined)).toBe('a');
    expect(comparedRevision(history, 'a', undefined)).toBeNull();
  });

  it('is beside the one just before where none was approved, and beside what the address names', () => {
    const unapproved = newestFirst([revision('A', 'returned', 1), revision('B', 'draft', 2)]);
    expect(comparedRevision(unapproved, 'b', undefined)).toBe('a');
    expect(comparedRevision(history, 'c', 'b')).toBe('b');
    expect(comparedRevision(history, 'c', WORKING)).toBe(WORKING);
    // not with itself
    expect(comparedRevision(history, 'c', 'c')).toBe('a');
  });
});

describe('the words of the title block', () => {
  it('say whether what is drawn is the newest revision still', () => {
    const newest = revision('C', 'underReview', 3);
    expect(workingWords(null, 3, true)).toBe('Working, none frozen');
    expect(workingWords(newest, 3, true)).toBe('C, under review');
    expect(workingWords(newest, 4, true)).toBe('Working, after C');
    expect(workingWords(newest, 3, false)).toBe('Working, after C');
    expect(workingWords(revision('C', 'withdrawn', 3), 3, true)).toBe('Working, after C');
  });

  it('cut a seal into groups that can be read out', () => {
    expect(sealWords('7f3a91c02be4ffff')).toBe('7f3a 91c0 2be4');
    expect(sealWords('')).toBe('');
  });
});

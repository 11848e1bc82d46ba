import type { RevisionState, RevisionSummary, SignatureMeaning } from '@riseback/contracts';

/** The words of document control for what becomes of a revision. */
export const STATE_WORDS: Readonly<Record<RevisionState, string>> = {
  draft: 'Draft',
  underReview: 'Under review',
  returned: 'Returned',
  approved: 'Approved',
  superseded: 'Superseded',
  withdrawn: 'Withdrawn',
};

/** What each state means for whoever reads the revision, and what comes next. */
export const STATE_SENTENCES: Readonly<Record<RevisionState, string>> = {
  draft: 'Frozen, and not yet submitted for review.',
  underReview: 'Issued for review: a reviewer compares, comments, and then returns or signs it.',
  returned: 'Returned with comments. What they ask for is mended in the network and frozen as a new revision.',
  approved: 'Approved by signature.',
  superseded: 'A later revision was approved in its place.',
  withdrawn: 'Withdrawn: it is kept, and cannot be signed any more.',
};

/** What was done, as the course of a revision tells it. */
export const EVENT_WORDS: Readonly<Record<RevisionState, string>> = {
  draft: 'Frozen',
  underReview: 'Submitted for review',
  returned: 'Returned',
  approved: 'Approved',
  superseded: 'Superseded',
  withdrawn: 'Withdrawn',
};

export const MEANING_WORDS: Readonly<Record<SignatureMeaning, string>> = {
  reviewed: 'Reviewed',
  approved: 'Approved',
};

const SEAL_DIGITS = 12;

/** The first digits of a hash in groups of four, as they can be read out on the telephone: `7f3a 91c0 2be4`. */
export function sealWords(hash: string): string {
  return (hash.slice(0, SEAL_DIGITS).match(/.{1,4}/g) ?? []).join(' ');
}

/** What a network's own title block calls what is drawn now. */
export function workingWords(newest: RevisionSummary | null, version: number, saved: boolean): string {
  if (newest === null) return 'Working, none frozen';
  const untouched = saved && newest.networkVersion === version && newest.state !== 'withdrawn';
  return untouched ? `${newest.letter}, ${STATE_WORDS[newest.state].toLowerCase()}` : `Working, after ${newest.letter}`;
}

/** `2 open comments`, `1 open comment`, or nothing. */
export function openCommentWords(count: number): string {
  if (count === 0) return '';
  return count === 1 ? '1 open comment' : `${String(count)} open comments`;
}

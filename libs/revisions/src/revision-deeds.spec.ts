import { describe, expect, it } from 'vitest';
import { deedsOf, type Doer, type RevisionDeed, type RevisionFacts } from './revision-deeds';

const DESIGNER: Doer = { personId: 'd', mayDraw: true, maySign: false };
const REVIEWER: Doer = { personId: 'r', mayDraw: false, maySign: true };
const VIEWER: Doer = { personId: 'v', mayDraw: false, maySign: false };
const UNDER_REVIEW: RevisionFacts = {
  letter: 'B',
  state: 'underReview',
  frozenBy: 'd',
  submittedBy: 'd',
  editedBy: ['d'],
  laterApproved: undefined,
  engine: { frozen: '1', present: '1' },
};

function allowed(facts: Partial<RevisionFacts>, doer: Doer): RevisionDeed[] {
  const deeds = deedsOf({ ...UNDER_REVIEW, ...facts }, doer);
  return (Object.keys(deeds) as RevisionDeed[]).filter((deed) => deeds[deed].allowed);
}

function whyNot(deed: RevisionDeed, facts: Partial<RevisionFacts>, doer: Doer): string {
  const allowance = deedsOf({ ...UNDER_REVIEW, ...facts }, doer)[deed];
  return allowance.allowed ? 'allowed' : `${allowance.because}: ${allowance.why}`;
}

describe('what a person may do with a revision', () => {
  it('is by the role: who draws submits and withdraws, who signs returns and signs', () => {
    expect(allowed({ state: 'draft', submittedBy: undefined }, DESIGNER)).toEqual(['submit', 'withdraw']);
    expect(allowed({}, DESIGNER)).toEqual(['withdraw']);
    expect(allowed({}, REVIEWER)).toEqual(['return', 'sign']);
    expect(allowed({}, VIEWER)).toEqual([]);
    expect(whyNot('sign', {}, DESIGNER)).toContain('person: Reviewers sign revisions');
  });

  it('is by the state, and nothing once it has ended', () => {
    expect(allowed({ state: 'draft' }, REVIEWER)).toEqual([]);
    expect(allowed({ state: 'approved' }, DESIGNER)).toEqual(['withdraw']);
    for (const state of ['returned', 'superseded', 'withdrawn'] as const) {
      expect([...allowed({ state }, DESIGNER), ...allowed({ state }, REVIEWER)]).toEqual([]);
    }
    expect(whyNot('sign', { state: 'returned' }, REVIEWER)).toBe(
      'state: Revision B is returned; only one under review can be signed.',
    );
  });

  it.each([
    { what: 'edited', own: { editedBy: ['x', 'r'] }, words: 'your edits are in revision B' },
    { what: 'submitted', own: { submittedBy: 'r' }, words: 'You submitted revision B yourself' },
    { what: 'froze', own: { frozenBy: 'r' }, words: 'You froze revision B yourself' },
  ])('is never to judge what they $what themselves', ({ own, words }) => {
    expect(allowed(own, REVIEWER)).toEqual([]);
    expect(whyNot('sign', own, REVIEWER)).toContain(words);
    expect(whyNot('return', own, REVIEWER)).toContain('person: ');
  });

  it('is not to approve what a later revision has overtaken, though to return it', () => {
    expect(allowed({ laterApproved: 'C' }, REVIEWER)).toEqual(['return']);
    expect(whyNot('sign', { laterApproved: 'C' }, REVIEWER)).toContain('Revision C');
  });

  it('is not to sign results of another engine than the present one', () => {
    const stale = { engine: { frozen: '0.1.0+1', present: '0.1.0+2' } };
    expect(allowed(stale, REVIEWER)).toEqual(['return']);
    expect(whyNot('sign', stale, REVIEWER)).toContain('stale: engine 0.1.0+1');
  });
});

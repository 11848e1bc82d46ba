import { describe, expect, it } from 'vitest';
import { firstImpossibleState, mayMove, REVISION_MOVES, type RevisionMove, type RevisionState } from './revision-state';

const STATES: readonly RevisionState[] = ['draft', 'underReview', 'returned', 'approved', 'superseded', 'withdrawn'];

/** As the design says it, state by state. */
const LEADS_TO: Readonly<Record<RevisionState, Partial<Record<RevisionMove, RevisionState>>>> = {
  draft: { submit: 'underReview', withdraw: 'withdrawn' },
  underReview: { return: 'returned', approve: 'approved', withdraw: 'withdrawn' },
  approved: { supersede: 'superseded', withdraw: 'withdrawn' },
  returned: {},
  superseded: {},
  withdrawn: {},
};
const MOVES = Object.keys(REVISION_MOVES) as RevisionMove[];

describe('a revision', () => {
  it.each(STATES)('that is %s moves on as it may and in no other way', (state) => {
    for (const move of MOVES) {
      expect(mayMove(state, move), move).toBe(LEADS_TO[state][move] !== undefined);
      if (mayMove(state, move)) expect(REVISION_MOVES[move].to).toBe(LEADS_TO[state][move]);
    }
  });

  it('has a history that begins as a draft and goes only where a move leads', () => {
    expect(firstImpossibleState(['draft', 'underReview', 'approved', 'superseded'])).toBeUndefined();
    expect(firstImpossibleState(['draft', 'withdrawn'])).toBeUndefined();
    expect(firstImpossibleState([])).toBeUndefined();
    expect(firstImpossibleState(['approved'])).toBe(0);
    expect(firstImpossibleState(['draft', 'approved'])).toBe(1);
    expect(firstImpossibleState(['draft', 'underReview', 'returned', 'underReview'])).toBe(3);
    expect(firstImpossibleState(['draft', 'draft'])).toBe(1);
  });
});

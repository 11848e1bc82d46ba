/** What becomes of a revision, in the words of document control: `underReview` is issued for review. */
export type RevisionState = 'draft' | 'underReview' | 'returned' | 'approved' | 'superseded' | 'withdrawn';

/** What moves a revision on. `supersede` is the program's own, in the transaction in which a later revision is approved. */
export type RevisionMove = 'submit' | 'return' | 'approve' | 'withdraw' | 'supersede';

interface Move {
  readonly from: readonly RevisionState[];
  readonly to: RevisionState;
}

/** Returned, superseded and withdrawn are final: what is mended is frozen anew, under the next letter. */
export const REVISION_MOVES: Readonly<Record<RevisionMove, Move>> = {
  submit: { from: ['draft'], to: 'underReview' },
  return: { from: ['underReview'], to: 'returned' },
  approve: { from: ['underReview'], to: 'approved' },
  withdraw: { from: ['draft', 'underReview', 'approved'], to: 'withdrawn' },
  supersede: { from: ['approved'], to: 'superseded' },
};

/** As it stands in sentences: "Revision B is …". */
export const STATE_WORDS: Readonly<Record<RevisionState, string>> = {
  draft: 'a draft that was not submitted yet',
  underReview: 'under review',
  returned: 'returned',
  approved: 'approved',
  superseded: 'superseded by a later one',
  withdrawn: 'withdrawn',
};

export function mayMove(state: RevisionState, move: RevisionMove): boolean {
  return REVISION_MOVES[move].from.includes(state);
}

/** The first state of a history, counted from 0, that cannot follow from the one before it; undefined when all can. */
export function firstImpossibleState(states: readonly RevisionState[]): number | undefined {
  const impossible = states.findIndex((state, i) => {
    const before = states[i - 1];
    if (before === undefined) return state !== 'draft';
    return !Object.values(REVISION_MOVES).some(({ from, to }) => to === state && from.includes(before));
  });
  return impossible < 0 ? undefined : impossible;
}

import { mayMove, STATE_WORDS, type RevisionMove, type RevisionState } from './revision-state';

/** What a person may do with a revision that is there. Signing approves it, or says that it was reviewed. */
export type RevisionDeed = 'submit' | 'return' | 'withdraw' | 'sign';
export type Allowance =
  | { readonly allowed: true }
  /** `person`: whatever becomes of the revision, this one may not; `state`: nobody may now. */
  | { readonly allowed: false; readonly because: 'person' | 'state'; readonly why: string };

/** What the rules need to know of a revision. People by their ids. */
export interface RevisionFacts {
  readonly letter: string;
  readonly state: RevisionState;
  readonly frozenBy: string;
  readonly submittedBy: string | undefined;
  /** Everyone with an accepted edit after the last approved revision, up to this one's version. */
  readonly editedBy: readonly string[];
  /** The letter of a later revision that is approved. */
  readonly laterApproved: string | undefined;
  /** The engine that computed its results, and the present one: results of an older engine are stale. */
  readonly engine: { readonly frozen: string; readonly present: string };
}

export interface Doer {
  readonly personId: string;
  readonly mayDraw: boolean;
  readonly maySign: boolean;
}

const ALLOWED: Allowance = { allowed: true };

/** Which move of the revision's state a deed stands on. */
const MOVE_OF: Readonly<Record<RevisionDeed, RevisionMove>> = {
  submit: 'submit',
  return: 'return',
  withdraw: 'withdraw',
  sign: 'approve',
};

const DONE_BY: Readonly<Record<RevisionDeed, string>> = {
  submit: 'Designers and administrators submit revisions',
  return: 'Reviewers return revisions',
  withdraw: 'Designers and administrators withdraw revisions',
  sign: 'Reviewers sign revisions',
};

/** What each deed asks of the state, to be shown where the state is another. */
const ASKS_FOR: Readonly<Record<RevisionDeed, string>> = {
  submit: 'only a draft can be submitted',
  return: 'only one under review can be returned',
  withdraw: 'only a draft, one under review or an approved one can be withdrawn',
  sign: 'only one under review can be signed',
};

/** What a person may do with a revision now, and if not, why. */
export function deedsOf(revision: RevisionFacts, doer: Doer): Record<RevisionDeed, Allowance> {
  return {
    submit: allowanceOf('submit', revision, doer),
    return: allowanceOf('return', revision, doer),
    withdraw: allowanceOf('withdraw', revision, doer),
    sign: allowanceOf('sign', revision, doer),
  };
}

function allowanceOf(deed: RevisionDeed, revision: RevisionFacts, doer: Doer): Allowance {
  const isReviewers = deed === 'return' || deed === 'sign';
  if (!(isReviewers ? doer.maySign : doer.mayDraw)) {
    return refused('person', `${DONE_BY[deed]}; your role here does not.`);
  }
  if (!mayMove(revision.state, MOVE_OF[deed])) {
    return refused('state', `Revision ${revision.letter} is ${STATE_WORDS[revision.state]}; ${ASKS_FOR[deed]}.`);
  }
  const own = isReviewers ? ownWork(revision, doer.personId) : undefined;
  if (own !== undefined) return refused('person', `${own} Another reviewer has to ${deed} it.`);
  if (deed === 'sign' && revision.laterApproved !== undefined) {
    return refused('state', `Revision ${revision.laterApproved}, which is later, is approved already.`);
  }
  const { frozen, present } = revision.engine;
  if (deed === 'sign' && frozen !== present) {
    return refused(
      'state',
      `Its results are stale: engine ${frozen} computed them, and the present one is ${present}. Freeze that version anew.`,
    );
  }
  return ALLOWED;
}

/** Why this person does not judge this revision: it is their own work. */
function ownWork({ letter, frozenBy, submittedBy, editedBy }: RevisionFacts, personId: string): string | undefined {
  if (editedBy.includes(personId)) {
    return `You edited the network after the last approved revision, and your edits are in revision ${letter}.`;
  }
  if (submittedBy === personId) return `You submitted revision ${letter} yourself.`;
  if (frozenBy === personId) return `You froze revision ${letter} yourself.`;
  return undefined;
}

function refused(because: 'person' | 'state', why: string): Allowance {
  return { allowed: false, because, why };
}

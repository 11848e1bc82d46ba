import type { CaseOutcome, RevisionSummary } from '@riseback/contracts';
import type { SaveState } from '../networks/edit-queue';
import type { SolveState } from '../networks/network-store';
import type { Status } from '../shared/status-mark/status-mark';

/** How what would be reported stands, and what to do before one hands it on. */
export interface Standing {
  readonly status: Status;
  readonly word: string;
  readonly sentence: string;
  /** A report made now would not say what is on the screen, or could not be made. */
  readonly prevents: boolean;
}

/** Of the network as it stands: always a draft, and only as good as what is saved and solved. */
export function workingStanding(
  solve: SolveState,
  save: SaveState,
  outcomes: readonly CaseOutcome[],
  mayFreeze: boolean,
): Standing[] {
  return [
    {
      status: 'watch',
      word: 'Draft',
      sentence: `Every part of it says so. ${mayFreeze ? 'Freeze' : 'Ask a designer to freeze'} a revision and have it reviewed when others are to build on the figures.`,
      prevents: false,
    },
    ...savedStanding(solve, save),
    ...solvedStanding(solve),
    ...unsolvedStanding(outcomes),
  ];
}

/** Of a revision, by its state in document control. */
export function revisionStanding({ letter, state }: Pick<RevisionSummary, 'letter' | 'state'>): Standing[] {
  switch (state) {
    case 'approved':
      return [standing('pass', 'Approved', `Revision ${letter} with its signatures.`)];
    case 'draft':
      return [
        standing('watch', 'Draft', `Revision ${letter} is frozen and not yet issued for review: every part says so.`),
      ];
    case 'underReview':
      return [
        standing('watch', 'Not approved', `Revision ${letter} is under review: every part of the report says so.`),
      ];
    case 'returned':
      return [standing('watch', 'Not approved', `Revision ${letter} was returned: every part of the report says so.`)];
    case 'superseded':
      return [
        standing(
          'watch',
          'Superseded',
          `A later revision was approved in its place. Report that one, unless the history is asked for.`,
        ),
      ];
    case 'withdrawn':
      return [standing('fail', 'Withdrawn', `Revision ${letter} was withdrawn: nobody should build on it.`)];
  }
}

function savedStanding(solve: SolveState, save: SaveState): Standing[] {
  if (save !== 'notSaved' && solve.kind !== 'stale') return [];
  return [
    {
      ...standing(
        'fail',
        'Not saved',
        'Your last edits are only on this device, so a report would not have them. Save them first.',
      ),
      prevents: true,
    },
  ];
}

function solvedStanding(solve: SolveState): Standing[] {
  switch (solve.kind) {
    case 'solving':
      return [standing('none', 'Solving', 'New pressures are being computed; the report waits for them.')];
    case 'failed':
      return [
        {
          ...standing(
            'fail',
            'No results',
            `${solve.problem.detail ?? solve.problem.title} A report cannot be made until the network is solved.`,
          ),
          prevents: true,
        },
      ];
    case 'solved':
    case 'stale':
      return [];
  }
}

function unsolvedStanding(outcomes: readonly CaseOutcome[]): Standing[] {
  const unsolved = outcomes.filter((outcome) => outcome.status === 'refused' || !outcome.result.converged).length;
  if (unsolved === 0) return [];
  const what = outcomes.length === 1 ? 'The network' : `${String(unsolved)} of ${String(outcomes.length)} cases`;
  return [
    standing(
      'fail',
      'Not solved',
      `${what} ${outcomes.length === 1 || unsolved === 1 ? 'has' : 'have'} no solution: the report says why in place of results. The findings on the drawing say what would mend it.`,
    ),
  ];
}

function standing(status: Status, word: string, sentence: string): Standing {
  return { status, word, sentence, prevents: false };
}

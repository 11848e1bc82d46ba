import type { RevisionState } from '@riseback/contracts';
import type { FrozenState, ReportContent } from '../report-content';
import { unsolvedWords } from './solved-cases';

/** What a report may be taken for, said in each file and on each of its parts. */
export interface ReportStanding {
  /** Whether nobody may build on it yet, or any more. */
  readonly provisional: boolean;
  /** In one line. */
  readonly words: string;
}

const STATE_WORDS: Readonly<Record<RevisionState, (letter: string) => string>> = {
  draft: (letter) => `DRAFT: revision ${letter}, not issued for review`,
  underReview: (letter) => `NOT APPROVED: revision ${letter}, issued for review`,
  returned: (letter) => `NOT APPROVED: revision ${letter}, returned`,
  approved: (letter) => `Revision ${letter}, approved`,
  superseded: (letter) => `SUPERSEDED: revision ${letter}`,
  withdrawn: (letter) => `WITHDRAWN: revision ${letter}`,
};

export function reportStanding({ state, outcomes, engineVersion }: ReportContent): ReportStanding {
  const unsolved = outcomes.filter((outcome) => unsolvedWords(outcome) !== undefined).length;
  const parts = [
    state.kind === 'working'
      ? `DRAFT: the network as it stands at version ${String(state.version)}`
      : STATE_WORDS[state.state](state.letter),
    ...(state.kind === 'revision' ? staleWords(state, engineVersion) : []),
    ...(unsolved === 0 ? [] : [`NOT SOLVED: ${String(unsolved)} of ${String(outcomes.length)} cases`]),
  ];
  return { provisional: state.kind === 'working' || state.state !== 'approved', words: parts.join('. ') };
}

function staleWords({ presentEngineVersion, editsSince }: FrozenState, engineVersion: string): string[] {
  return [
    ...(presentEngineVersion === engineVersion
      ? []
      : [`STALE: computed by engine ${engineVersion}, the present one is ${presentEngineVersion}`]),
    ...(editsSince === 0 ? [] : [`${String(editsSince)} edits of the network since it was frozen are not in it`]),
  ];
}

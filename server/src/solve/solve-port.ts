import type { CaseOutcome } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';
import type { TextAnswer, TextJob } from './solve-text';

/** Which cases to solve; `caseIds` '' is the plain network. */
export interface SolveJob {
  readonly file: NetworkFile;
  readonly caseIds: readonly string[];
  /** Whether to leave out what no receiver can be reached from (live solves) or to refuse it. */
  readonly partial: boolean;
  /** Whether each trap is to have its bands, which take some ten times as long as the pressures. */
  readonly bands: boolean;
}

export type SolveEnd =
  | { readonly end: 'finished'; readonly outcomes: readonly CaseOutcome[]; readonly solveMs: number }
  /** Longer than the limit allows, or the solver broke; `detail` is fit to be shown. */
  | { readonly end: 'failed'; readonly detail: string }
  /** A newer job under the same key took its place before it was begun or, of one with bands, before it had ended. */
  | { readonly end: 'superseded' };

/** Where solves are done: worker threads in the server, in the same thread in tests. */
export interface SolvePort {
  /** @param key jobs of one key supersede each other: a network's id for its live solves */
  solve(key: string, job: SolveJob): Promise<SolveEnd>;
}

export type TextEnd =
  { readonly end: 'answered'; readonly answer: TextAnswer } | Exclude<SolveEnd, { readonly end: 'finished' }>;

/** Where files are solved that were not even read yet. */
export interface FileSolver {
  solveText(key: string, job: TextJob): Promise<TextEnd>;
}

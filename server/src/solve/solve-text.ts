import type { Problem, SolveResult } from '@riseback/contracts';
import { readNetworkFile } from '@riseback/network';
import { parseJsonText } from '../platform/http/json-text';
import { badRequest, ProblemError } from '../platform/problem';
import { bandsInTime, caseIdsOf, solveCases, withoutBands } from './solve-cases';

/** A network file as it came, and which of its cases to solve: the given one, else its first, else the plain network. */
export interface TextJob {
  readonly fileText: Uint8Array;
  readonly caseId: string | undefined;
}

/** The JSON text of a `SolveResult`, or why there is none: all that can be seen in the file without computing. */
export type TextAnswer = { readonly json: Uint8Array } | { readonly refused: Problem };

/** A file with thousands of mistakes is answered with the first of them. */
const MOST_MISTAKES = 100;

/** Reads, checks and solves, and writes the answer: what takes long with a large file, and is done where no request waits for it. */
export function solveText(job: TextJob): TextAnswer {
  try {
    return { json: new TextEncoder().encode(JSON.stringify(solveFile(job))) };
  } catch (error) {
    if (error instanceof ProblemError) return { refused: error.problem };
    throw error;
  }
}

function solveFile({ fileText, caseId }: TextJob): SolveResult {
  const read = readNetworkFile(parseJsonText(fileText));
  if (!read.ok) throw badRequest('The network file has mistakes.', read.errors.slice(0, MOST_MISTAKES));
  const [first = ''] = caseIdsOf(read.file);
  const job = { file: read.file, caseIds: [caseId ?? first], partial: false };
  const bands = bandsInTime(job);
  const outcomes = solveCases({ ...job, bands });
  const [outcome] = bands ? outcomes : withoutBands(outcomes);
  if (outcome === undefined) throw new Error('one case was asked for, and none was solved');
  if (outcome.status === 'refused') throw new ProblemError({ ...outcome.problem, status: 400 });
  return outcome.result;
}

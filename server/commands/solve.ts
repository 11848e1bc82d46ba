import { readFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { readNetworkFile } from '@riseback/network';
import { isRefusal, solveNetwork, type ProblemError, type SolveProblem, type SolveResult } from '@riseback/solver';

/** What the command does: `output` goes to standard output, `error`, an RFC 9457 problem, to standard error. */
export interface SolveCommandOutcome {
  /** 0 solved; 2 for all that can be seen in the file without computing; 3 when computing finds no solution. */
  readonly exitCode: 0 | 2 | 3;
  readonly output?: SolveResult;
  readonly error?: SolveProblem;
}

const USAGE = 'npm run --silent solve -- FILE [--case ID]';

/** Reads a network file and solves one case of it: the one named, else the first, else the plain network. */
export function solveCommand(args: readonly string[]): SolveCommandOutcome {
  const asked = readArguments(args);
  if ('error' in asked) return asked;
  const json = readJson(asked.path);
  if ('error' in json) return json;
  const read = readNetworkFile(json.value);
  if (!read.ok) return refused('The network file has mistakes', summary(read.errors), read.errors);
  const { caseId } = asked;
  const solved = solveNetwork(read.file, { partial: false, bands: true, ...(caseId === undefined ? {} : { caseId }) });
  if (isRefusal(solved)) return { exitCode: 2, error: solved.problem };
  if (solved.problem !== undefined) return { exitCode: 3, error: solved.problem };
  return { exitCode: 0, output: solved };
}

function readArguments(
  args: readonly string[],
): { path: string; caseId: string | undefined } | (SolveCommandOutcome & { error: SolveProblem }) {
  try {
    const { values, positionals } = parseArgs({
      args: [...args],
      options: { case: { type: 'string' } },
      allowPositionals: true,
    });
    const [path, ...more] = positionals;
    if (path !== undefined && more.length === 0) return { path, caseId: values.case };
    return refused('The command needs one network file', `Usage: ${USAGE}`);
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
    return refused('The command does not know this option', `${error.message}. Usage: ${USAGE}`);
  }
}

function readJson(path: string): { value: unknown } | (SolveCommandOutcome & { error: SolveProblem }) {
  let text: string;
  try {
    text = readFileSync(path, 'utf8');
  } catch (error) {
    return refused('The network file cannot be read', error instanceof Error ? error.message : String(error));
  }
  try {
    return { value: JSON.parse(text) as unknown };
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
    return refused('The network file is not JSON', error.message);
  }
}

function refused(
  title: string,
  detail: string,
  errors: readonly ProblemError[] = [{ pointer: '', detail }],
): SolveCommandOutcome & { error: SolveProblem } {
  return { exitCode: 2, error: { type: '/problems/bad-network-file', title, status: 400, detail, errors } };
}

function summary(errors: readonly ProblemError[]): string {
  const [first] = errors;
  const more = errors.length > 1 ? ` (and ${errors.length - 1} more)` : '';
  return first === undefined ? '' : `${first.pointer === '' ? 'the file' : first.pointer}: ${first.detail}${more}`;
}

import type { Problem } from '@riseback/contracts';
import { firstValueFrom, type Observable } from 'rxjs';
import { toProblem } from './problem';

/** What came of a command: its value, or why it was refused. */
export type Outcome<T> = { readonly value: T } | { readonly problem: Problem };

export async function outcomeOf<T>(command: Observable<T>): Promise<Outcome<T>> {
  try {
    return { value: await firstValueFrom(command) };
  } catch (error) {
    return { problem: toProblem(error) };
  }
}

/** What is wrong with one field of a refused command, and what is wrong with none in particular. */
export function refusalsOf(problem: Problem): { readonly fields: ReadonlyMap<string, string>; readonly rest: string } {
  const fields = new Map((problem.errors ?? []).map(({ pointer, detail }) => [pointer, detail]));
  return { fields, rest: fields.size > 0 ? '' : (problem.detail ?? problem.title) };
}

import { mistakesOf } from '@riseback/network';
import * as z from 'zod';
import { badRequest } from '../problem';

type RequestPart = 'path' | 'query' | 'body';

const DETAIL: Readonly<Record<RequestPart, string>> = {
  path: 'The address is not of the right form.',
  query: 'The query of the address is not of the right form.',
  body: 'The body is not of the right form.',
};

/** A body with thousands of mistakes is answered with the first of them. */
const MOST_MISTAKES = 100;

/**
 * What a route's schema makes of a part of the request. The only place that turns a schema's complaint into a 400; a
 * ZodError from anywhere else is our own mistake.
 * @throws ProblemError 400 with a pointer for each mistake; of a parameter the pointer is its name
 */
export function parseRequest<Schema extends z.ZodType>(
  schema: Schema,
  value: unknown,
  part: RequestPart,
): z.output<Schema> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const issues = parsed.error.issues.slice(0, MOST_MISTAKES).flatMap((issue) => issuesOfNearestBranch(issue));
  const mistakes = mistakesOf(new z.ZodError(issues), value).slice(0, MOST_MISTAKES);
  const pointer = (text: string) => (part === 'body' ? text : text.replace(/^\//, ''));
  throw badRequest(
    DETAIL[part],
    mistakes.map((mistake) => ({ pointer: pointer(mistake.pointer), detail: mistake.detail })),
  );
}

/** "Invalid input" for a whole union helps nobody: the branch with the fewest complaints is what the sender meant. */
function issuesOfNearestBranch(issue: z.core.$ZodIssue): z.core.$ZodIssue[] {
  if (issue.code !== 'invalid_union') return [issue];
  const branches = issue.errors.filter((branch) => branch.length > 0);
  const nearest = branches.sort((a, b) => a.length - b.length)[0];
  if (nearest === undefined) return [issue];
  return nearest.flatMap((inner) => issuesOfNearestBranch({ ...inner, path: [...issue.path, ...inner.path] }));
}

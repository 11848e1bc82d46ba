import type * as z from 'zod';
import { isObject } from './json-value';

/** One mistake in what was handed in: where (RFC 6901), and what is wrong there and would mend it. */
export interface FileMistake {
  readonly pointer: string;
  readonly detail: string;
}

/** RFC 6901: `~` becomes `~0`, `/` becomes `~1`. The empty pointer is the whole value. */
export function jsonPointer(path: readonly PropertyKey[]): string {
  return path.map((key) => `/${String(key).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');
}

/**
 * What zod found, as mistakes with pointers: each unknown key has its own, and a missing key is told from one of the wrong type.
 * @param value what was parsed
 * @param base the path of `value` in the whole
 */
export function mistakesOf(error: z.ZodError, value: unknown, base: readonly PropertyKey[] = []): FileMistake[] {
  return error.issues.flatMap((issue) => mistakesOfIssue(issue, value, base));
}

function mistakesOfIssue(issue: z.core.$ZodIssue, value: unknown, base: readonly PropertyKey[]): FileMistake[] {
  const pointer = jsonPointer([...base, ...issue.path]);
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({
      pointer: jsonPointer([...base, ...issue.path, key]),
      detail: `The key ${quoted(key)} is not known here`,
    }));
  }
  const name = String(issue.path.at(-1) ?? 'This');
  const present = valueAt(value, issue.path);
  if (issue.code !== 'custom' && present === undefined) return [{ pointer, detail: missing(issue, name) }];
  // our own rules are whole sentences
  if (issue.code === 'custom') return [{ pointer, detail: issue.message }];
  return [{ pointer, detail: `${name} ${requirement(issue, present)}` }];
}

function missing(issue: z.core.$ZodIssue, name: string): string {
  const choices = choicesOf(issue);
  return choices === undefined ? `${name} is missing` : `${name} is missing; it is one of ${choices}`;
}

function requirement(issue: z.core.$ZodIssue, present: unknown): string {
  const choices = choicesOf(issue);
  if (choices !== undefined) return `must be one of ${choices}, not ${described(present)}`;
  switch (issue.code) {
    case 'invalid_type':
      return `must be ${TYPE_NAMES[issue.expected] ?? issue.expected}, not ${described(present)}`;
    case 'too_small':
      return bound(issue.origin, issue.inclusive === false ? 'more than' : 'at least', issue.minimum);
    case 'too_big':
      return bound(issue.origin, issue.inclusive === false ? 'less than' : 'at most', issue.maximum);
    default:
      return `is not right: ${issue.message}`;
  }
}

const TYPE_NAMES: Record<string, string> = {
  number: 'a number',
  int: 'a whole number',
  string: 'a text',
  boolean: 'true or false',
  array: 'a list',
  object: 'an object',
  record: 'an object',
};

function bound(origin: string, relation: string, limit: number | bigint): string {
  if (origin === 'string' && relation === 'at least' && Number(limit) === 1) return 'must not be empty';
  if (origin === 'string') return `must have ${relation} ${limit} characters`;
  if (origin === 'array') return `must have ${relation} ${limit} items`;
  return `must be ${relation} ${limit}`;
}

function choicesOf(issue: z.core.$ZodIssue): string | undefined {
  if (issue.code === 'invalid_value') return issue.values.map(described).join(', ');
  if (issue.code !== 'invalid_union') return undefined;
  // zod names the choices of a discriminator in `options`
  return 'options' in issue && Array.isArray(issue.options) ? issue.options.map(described).join(', ') : undefined;
}

/** Short enough to print whatever was handed in. */
function described(value: unknown): string {
  if (value === null) return 'null';
  if (Array.isArray(value)) return 'a list';
  if (typeof value === 'object') return 'an object';
  return typeof value === 'string' ? quoted(value) : String(value);
}

/** A text between quotes, cut where a reader has seen enough. */
export function quoted(text: string): string {
  return JSON.stringify(text.length > 60 ? `${text.slice(0, 60)}…` : text);
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  let present = value;
  for (const key of path) {
    if (Array.isArray(present) && typeof key === 'number') present = present[key];
    else if (isObject(present) && Object.hasOwn(present, key)) present = present[String(key)];
    else return undefined;
  }
  return present;
}

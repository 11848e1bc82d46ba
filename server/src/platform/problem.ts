import type { Problem } from '@riseback/contracts';

/** One mistake in a request: where (RFC 6901 into the body, or a parameter's name) and what would mend it. */
export interface Mistake {
  readonly pointer: string;
  readonly detail: string;
}

/** A refused request. Its problem object is the whole answer; nothing else of the error leaves the server. */
export class ProblemError extends Error {
  override readonly name = 'ProblemError';

  constructor(
    readonly problem: Problem,
    readonly headers: Readonly<Record<string, string>> = {},
  ) {
    super(problem.detail ?? problem.title);
  }
}

/** Every problem type the server can answer, with its title and status; docs/problems.md explains each. */
export const PROBLEM_TYPES = {
  'bad-request': { status: 400, title: 'The request cannot be understood' },
  'not-signed-in': { status: 401, title: 'Not signed in' },
  'wrong-credentials': { status: 401, title: 'Signing in failed' },
  'code-needed': { status: 401, title: 'A code is needed too' },
  'wrong-code': { status: 401, title: 'Signing in failed' },
  forbidden: { status: 403, title: 'Not allowed' },
  'forged-request': { status: 403, title: 'The request does not prove where it comes from' },
  'not-found': { status: 404, title: 'Not found' },
  'method-not-allowed': { status: 405, title: 'Method not allowed' },
  'request-timeout': { status: 408, title: 'The request took too long to arrive' },
  conflict: { status: 409, title: 'In conflict with what is stored' },
  'stale-version': { status: 412, title: 'Changed by someone else meanwhile' },
  'payload-too-large': { status: 413, title: 'The request is too large' },
  'unsupported-media-type': { status: 415, title: 'This kind of content is not accepted' },
  unprocessable: { status: 422, title: 'Understood, but cannot be done' },
  'precondition-required': { status: 428, title: 'The version is missing' },
  'too-many-requests': { status: 429, title: 'Too many requests' },
  'headers-too-large': { status: 431, title: 'The headers are too large' },
  internal: { status: 500, title: 'Something went wrong in the server' },
  unavailable: { status: 503, title: 'Not available at the moment' },
} as const satisfies Record<string, { status: number; title: string }>;
export type ProblemType = keyof typeof PROBLEM_TYPES;

export function problemOf(type: ProblemType, detail: string, more: Readonly<Record<string, unknown>> = {}): Problem {
  return { type: `/problems/${type}`, ...PROBLEM_TYPES[type], detail, ...more };
}

/** For rules that a service finds broken in a well-formed request; shape is parseRequest()'s business. */
export function badRequest(detail: string, errors?: readonly Mistake[]): ProblemError {
  return new ProblemError(problemOf('bad-request', detail, errors === undefined ? {} : { errors: [...errors] }));
}

export function notSignedIn(): ProblemError {
  return new ProblemError(problemOf('not-signed-in', 'Sign in to use this.'));
}

/** The same words for an unknown account, a wrong password and a disabled person. */
export function wrongCredentials(): ProblemError {
  return new ProblemError(problemOf('wrong-credentials', 'The e-mail address or the password is wrong.'));
}

/** Said only when the password was right. */
export function codeNeeded(): ProblemError {
  return new ProblemError(
    problemOf('code-needed', 'Give the code of your authenticator, or one of your recovery codes.'),
  );
}

export function wrongCode(): ProblemError {
  return new ProblemError(problemOf('wrong-code', WRONG_CODE));
}

export const WRONG_CODE = 'This code is not right, or was used already. Wait for the next one.';

export function forbidden(detail: string): ProblemError {
  return new ProblemError(problemOf('forbidden', detail));
}

export function forgedRequest(detail: string): ProblemError {
  return new ProblemError(problemOf('forged-request', detail));
}

export function notFound(detail: string): ProblemError {
  return new ProblemError(problemOf('not-found', detail));
}

export function methodNotAllowed(allowed: readonly string[]): ProblemError {
  const allow = allowed.join(', ');
  return new ProblemError(problemOf('method-not-allowed', `This address answers ${allow} only.`), { Allow: allow });
}

export function conflict(detail: string, more: Readonly<Record<string, unknown>> = {}): ProblemError {
  return new ProblemError(problemOf('conflict', detail, more));
}

/** @param more members that contracts' `StaleVersion` describes */
export function staleVersion(detail: string, more: Readonly<Record<string, unknown>>): ProblemError {
  return new ProblemError(problemOf('stale-version', detail, more));
}

export function preconditionRequired(detail: string): ProblemError {
  return new ProblemError(problemOf('precondition-required', detail));
}

export function payloadTooLarge(detail: string): ProblemError {
  return new ProblemError(problemOf('payload-too-large', detail));
}

export function unsupportedMediaType(detail: string): ProblemError {
  return new ProblemError(problemOf('unsupported-media-type', detail));
}

export function unprocessable(detail: string, errors?: readonly Mistake[]): ProblemError {
  return new ProblemError(problemOf('unprocessable', detail, errors === undefined ? {} : { errors: [...errors] }));
}

export function tooManyRequests(detail: string, retryAfterS: number): ProblemError {
  const seconds = String(Math.max(1, Math.ceil(retryAfterS)));
  return new ProblemError(problemOf('too-many-requests', detail), { 'Retry-After': seconds });
}

export function unavailable(detail: string): ProblemError {
  return new ProblemError(problemOf('unavailable', detail), { 'Retry-After': '5' });
}

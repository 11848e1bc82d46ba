import type { Request } from 'express';
import { badRequest, preconditionRequired } from '../problem';

/**
 * The version that a change was made on, from `If-Match: "17"`.
 * @throws ProblemError 428 when missing, 400 when it is not one quoted version number
 */
export function versionFromIfMatch(req: Request): number {
  const header = req.get('if-match');
  if (header === undefined) {
    throw preconditionRequired(
      'Send the version this change was made on, as in If-Match: "17" (the ETag of the last answer).',
    );
  }
  const match = /^\s*"(\d{1,15})"\s*$/.exec(header);
  if (match === null) {
    throw badRequest('If-Match must hold one version number in double quotes, as in If-Match: "17".', [
      { pointer: 'If-Match', detail: 'write the ETag of the last answer, for instance "17"' },
    ]);
  }
  return Number(match[1]);
}

/** The ETag of a version, the counterpart of `versionFromIfMatch`. */
export function versionETag(version: number): string {
  return `"${String(version)}"`;
}

import { badRequest, type ProblemError } from '../problem';
import { findSyntaxError } from './json-syntax';

/** Looking for the place takes longer than reading: what is larger is told without it. */
const LARGEST_SEARCHED_BYTES = 2 * 1024 * 1024;

/** @throws ProblemError 400 with the place of the mistake */
export function parseJsonText(bytes: Uint8Array): unknown {
  const text = new TextDecoder().decode(bytes);
  try {
    return JSON.parse(text);
  } catch {
    throw notJson(text);
  }
}

export function notJson(text: string): ProblemError {
  const place = text.length > LARGEST_SEARCHED_BYTES ? undefined : findSyntaxError(text);
  const where =
    place === undefined ? '' : `: the mistake is at line ${String(place.line)}, column ${String(place.column)}`;
  return badRequest(`The body is not JSON${where}.`, [{ pointer: '', detail: `not JSON${where}` }]);
}

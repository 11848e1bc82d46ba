/**
 * Spreadsheets take a text that begins with one of these for a formula (common practice; OWASP, "CSV Injection"). Such texts go out
 * behind an apostrophe, which spreadsheets read as "this is text", and come in without it again.
 */
const DANGEROUS = /^'*[=+\-@\t\r]/;
const GUARDED = /^''*[=+\-@\t\r]/;

/** Only for texts: a number keeps its sign and stays a number. */
export function guarded(text: string): string {
  return DANGEROUS.test(text) ? `'${text}` : text;
}

/** The inverse: `unguarded(guarded(text))` is `text`, whatever it is. */
export function unguarded(text: string): string {
  return GUARDED.test(text) ? text.slice(1) : text;
}

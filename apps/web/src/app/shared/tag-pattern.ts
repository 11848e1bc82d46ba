/** Longest that the letters before a number are taken over: a tag has 64 characters at most. */
const MOST_LETTERS = 24;
const NUMBER = /^\d{1,9}$/;

/**
 * A tag after a site's pattern: `#` stands for the number, with at least so many digits, and `*` for the letters of the tag before. The number
 * is one above the highest of that form, so that a gap left by something removed is not filled again.
 * @param before the tag that is copied, or the last of its kind
 * @param taken tags of every element that there will be
 */
export function patternedTag(pattern: string, before: string, taken: ReadonlySet<string>): string {
  const [, opening = '', digits = '', closing = ''] = /^([^#]*)(#+)([^#]*)$/.exec(pattern) ?? [];
  const start = opening.replace('*', lettersOf(before));
  let highest = 0;
  for (const tag of taken) {
    if (!tag.startsWith(start) || !tag.endsWith(closing) || tag.length <= start.length + closing.length) continue;
    const number = tag.slice(start.length, tag.length - closing.length);
    if (NUMBER.test(number)) highest = Math.max(highest, Number(number));
  }
  return start + String(highest + 1).padStart(digits.length, '0') + closing;
}

/** `RT-05` and `RT 5` have the letters RT. */
function lettersOf(tag: string): string {
  return tag.replace(/[\s._/-]*\d*$/, '').slice(0, MOST_LETTERS);
}

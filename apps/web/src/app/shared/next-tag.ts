import type { TaggedKind } from '@riseback/contracts';
import { patternedTag } from './tag-pattern';

const FIRST_TAGS: Readonly<Record<TaggedKind, string>> = {
  trap: 'TR-101',
  junction: '',
  receiver: 'R-1',
  flashVessel: 'V-1',
  pumpedInlet: 'P-1',
  pipe: 'CR-1',
  gauge: 'PI-1',
};

/**
 * A tag to offer for the next element: the last one's, counted up past all that share its letters. Junctions get none until one has a
 * tag, since most stay nameless. A pattern of the site goes before all of that.
 * @param tags tags of the kind in the file's order
 * @param taken tags of every element, which the offer must not repeat
 */
export function nextTag(
  kind: TaggedKind,
  tags: readonly string[],
  taken: ReadonlySet<string>,
  pattern?: string,
): string {
  if (pattern !== undefined) return patternedTag(pattern, tags.at(-1) ?? (FIRST_TAGS[kind] || 'J'), taken);
  const last = tags.findLast((tag) => NUMBERED.test(tag));
  const start = NUMBERED.exec(last ?? FIRST_TAGS[kind]);
  if (start === null) return '';
  const [, letters = '', digits = ''] = start;
  let number = last === undefined ? Number(digits) : Number(digits) + 1;
  while (taken.has(tagged(letters, number, digits.length))) number++;
  return tagged(letters, number, digits.length);
}

const NUMBERED = /^(.*?)(\d{1,9})$/;

function tagged(letters: string, number: number, width: number): string {
  return letters + String(number).padStart(width, '0');
}

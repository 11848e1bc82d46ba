import { nextTag } from '../../shared/next-tag';
import { patternedTag } from '../../shared/tag-pattern';

const LONGEST_TAG = 64;
const NUMBERED = /\d{1,9}$/;

/**
 * The tag of a copy: the letters of the original and the next free number behind them, so that a copy follows whatever pattern the plant's
 * tags follow. A tag without a number gets one. Where the site has a pattern for the kind, that goes before the original's own.
 * @param taken tags of every element that there will be
 */
export function copiedTag(tag: string, taken: ReadonlySet<string>, pattern?: string): string {
  if (pattern !== undefined) return patternedTag(pattern, tag, taken);
  const numbered = NUMBERED.test(tag) ? tag : `${tag.slice(0, LONGEST_TAG - 4)}-1`;
  // only the letters and digits of the one tag count here, whichever kind it is of
  return nextTag('junction', [numbered], taken);
}

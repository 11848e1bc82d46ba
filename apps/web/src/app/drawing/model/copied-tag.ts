import { nextTag } from '../../shared/next-tag';

const LONGEST_TAG = 64;
const NUMBERED = /\d{1,9}$/;

/**
 * The tag of a copy: the letters of the original and the next free number behind them, so that a copy follows whatever pattern the plant's
 * tags follow. A tag without a number gets one.
 * @param taken tags of every element that there will be
 */
export function copiedTag(tag: string, taken: ReadonlySet<string>): string {
  const numbered = NUMBERED.test(tag) ? tag : `${tag.slice(0, LONGEST_TAG - 4)}-1`;
  // only the letters and digits of the one tag count here, whichever kind it is of
  return nextTag('junction', [numbered], taken);
}

/**
 * The letters of revisions, without I, O, Q, S, X and Z, which are taken for figures or for a gap to be filled in.
 * Source: ASME Y14.35M-1997, Revision of Engineering Drawings and Associated Documents, which leaves these six out. Two letters
 * after the last one, in the same order (AA, AB, … AY, BA): common practice.
 */
export const REVISION_LETTERS = 'ABCDEFGHJKLMNPRTUVWY';

/**
 * The letter after one, or the first when there is none yet.
 * @throws RangeError for what is no letter of a revision
 */
export function nextLetter(last: string | undefined): string {
  if (last === undefined) return REVISION_LETTERS.slice(0, 1);
  const place = placeOfLetter(last);
  if (place === undefined) throw new RangeError(`nextLetter: ${JSON.stringify(last)} is no letter of a revision`);
  return letterAt(place + 1);
}

/** Where a letter stands in the order of all, from 1; undefined for what is none. Later revisions stand later. */
export function placeOfLetter(letter: string): number | undefined {
  const digits = Array.from(letter, (character) => REVISION_LETTERS.indexOf(character) + 1);
  if (digits.length === 0 || digits.includes(0)) return undefined;
  return digits.reduce((place, digit) => place * REVISION_LETTERS.length + digit, 0);
}

/** As the columns of a sheet are counted: there is no letter for nought. */
function letterAt(place: number): string {
  const count = REVISION_LETTERS.length;
  const last = (place - 1) % count;
  const before = (place - 1 - last) / count;
  return `${before === 0 ? '' : letterAt(before)}${REVISION_LETTERS.charAt(last)}`;
}

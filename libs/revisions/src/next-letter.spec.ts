import { describe, expect, it } from 'vitest';
import { nextLetter, placeOfLetter, REVISION_LETTERS } from './next-letter';

/** So many letters from the first one on. */
function letters(count: number): string[] {
  const all: string[] = [];
  while (all.length < count) all.push(nextLetter(all.at(-1)));
  return all;
}

describe('the letters of revisions', () => {
  // ASME Y14.35M-1997: I, O, Q, S, X and Z are not used
  it('begin at A and leave out I, O, Q, S, X and Z', () => {
    expect(letters(20).join('')).toBe('ABCDEFGHJKLMNPRTUVWY');
    expect(letters(2_000).join('')).not.toMatch(/[IOQSXZ]/);
  });

  it('go on with two after Y, the last of them, and with three after YY', () => {
    expect(nextLetter('Y')).toBe('AA');
    expect(nextLetter('AA')).toBe('AB');
    expect(nextLetter('AH')).toBe('AJ');
    expect(nextLetter('AY')).toBe('BA');
    expect(nextLetter('YY')).toBe('AAA');
  });

  it('are never the same twice, and stand in the order of their places', () => {
    const all = letters(1_000);
    expect(new Set(all).size).toBe(1_000);
    expect(all.map(placeOfLetter)).toEqual(all.map((_, i) => i + 1));
    // as SQL sorts them: by length, then by letter
    expect(all.toSorted((a, b) => a.length - b.length || (a < b ? -1 : 1))).toEqual(all);
  });

  it('are refused where they are none', () => {
    for (const none of ['', 'a', 'I', 'AO', '1', 'A1']) {
      expect(placeOfLetter(none)).toBeUndefined();
      expect(() => nextLetter(none)).toThrow(RangeError);
    }
    expect(REVISION_LETTERS).toHaveLength(26 - 6);
  });
});

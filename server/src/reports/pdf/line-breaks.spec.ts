import { describe, expect, it } from 'vitest';
import { linesOf, shortened } from './line-breaks';

/** Every character as wide as any other. */
const measure = (text: string) => Array.from(text).length;

describe('linesOf', () => {
  it('breaks between words, and keeps the line breaks of the text', () => {
    expect(linesOf('one two three\nfour', 7, measure)).toEqual(['one two', 'three', 'four']);
    expect(linesOf('', 7, measure)).toEqual(['']);
  });

  it('breaks a word that is wider than the line, and loses nothing of it', () => {
    const lines = linesOf('a 123456789012 b', 5, measure);
    expect(lines.join('').replaceAll(' ', '')).toBe('a123456789012b');
    expect(lines.every((line) => measure(line) <= 5)).toBe(true);
  });

  it('does not come apart where not even one character fits', () => {
    expect(linesOf('abc', 0, measure)).toEqual(['a', 'b', 'c']);
  });
});

describe('shortened', () => {
  it('leaves a text that fits, and else as much as fits before an ellipsis', () => {
    expect(shortened('twelve', 6, measure)).toBe('twelve');
    expect(shortened('thirteen', 6, measure)).toBe('thirt…');
  });

  it('never cuts a character in two', () => {
    expect(shortened('🔥🔥🔥🔥', 3, measure)).toBe('🔥🔥…');
  });
});

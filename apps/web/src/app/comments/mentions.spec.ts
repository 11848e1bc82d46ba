import type { NamedPerson } from '@riseback/contracts';
import { describe, expect, it } from 'vitest';
import { mentionAt, mentioned, namesFor, partsOf, withMention } from './mentions';

const PEOPLE: readonly NamedPerson[] = [
  { id: 'p1', name: 'Ana Reyes', role: 'reviewer' },
  { id: 'p2', name: 'Ana Reyes Soto', role: 'designer' },
  { id: 'p3', name: 'Ines Kallan', role: 'designer' },
];

describe('mentionAt', () => {
  it('begins at an @ that stands at the beginning of a word', () => {
    expect(mentionAt('@an', 3)).toEqual({ from: 0, typed: 'an' });
    expect(mentionAt('see (@in', 8)).toEqual({ from: 5, typed: 'in' });
  });

  it('is none within an address, behind the line, or before the caret gets there', () => {
    expect(mentionAt('a@b', 3)).toBeNull();
    expect(mentionAt('@an\nx', 5)).toBeNull();
    expect(mentionAt('no name', 4)).toBeNull();
    expect(mentionAt('x @an', 1)).toBeNull();
  });
});

describe('namesFor', () => {
  it('finds names by the beginning of any of their words, whatever the case of the letters', () => {
    expect(namesFor('kal', PEOPLE).map(({ id }) => id)).toEqual(['p3']);
    expect(namesFor('ANA', PEOPLE).map(({ id }) => id)).toEqual(['p1', 'p2']);
    expect(namesFor('', PEOPLE)).toHaveLength(3);
    expect(namesFor('zz', PEOPLE)).toEqual([]);
  });

  it('leaves out the one that stands there already', () => {
    expect(namesFor('Ana Reyes', PEOPLE).map(({ id }) => id)).toEqual(['p2']);
  });
});

describe('withMention', () => {
  it('puts the name in place of what was typed of it, the caret behind it', () => {
    const put = withMention('ask @an please', 7, { from: 4, typed: 'an' }, 'Ana Reyes');
    expect(put.text).toBe('ask @Ana Reyes please');
    expect(put.text.slice(0, put.caret)).toBe('ask @Ana Reyes ');
    expect(withMention('@', 1, { from: 0, typed: '' }, 'Ana Reyes')).toEqual({ text: '@Ana Reyes ', caret: 11 });
  });
});

describe('mentioned', () => {
  it('takes the longest name that stands there, each person once', () => {
    expect(mentioned('@Ana Reyes Soto and @Ana Reyes Soto', PEOPLE).map(({ id }) => id)).toEqual(['p2']);
    expect(mentioned('@Ana Reyes, please', PEOPLE).map(({ id }) => id)).toEqual(['p1']);
  });

  it('takes none from a longer word, from within a word, or without the @', () => {
    expect(mentioned('@Ana Reyesson, x@Ines Kallan, Ines Kallan', PEOPLE)).toEqual([]);
  });
});

describe('partsOf', () => {
  it('cuts a text at its mentions and loses nothing of it', () => {
    const text = 'To @Ines Kallan:\n2 in @nobody';
    const parts = partsOf(text, ['Ines Kallan']);
    expect(parts.map((part) => part.text).join('')).toBe(text);
    expect(parts.filter(({ name }) => name !== null)).toEqual([{ text: '@Ines Kallan', name: 'Ines Kallan' }]);
  });
});

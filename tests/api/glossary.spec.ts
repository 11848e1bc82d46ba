import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { TERMS, type TermText } from '../../apps/web/src/app/shared/term/terms';

/** Rows of the table under "What the screens explain", as word and meaning. */
const written = (readFileSync('docs/glossary.md', 'utf8').split(/^## /m)[1] ?? '')
  .split('\n')
  .filter((line) => line.startsWith('|') && !/^\| (word|-+) /.test(line))
  .map((line) => line.split('|').map((cell) => cell.trim()))
  .map(([, word, meaning]) => ({ word, meaning }));

const explained = Object.values<TermText>(TERMS);

describe('the words that screens explain', () => {
  it('stand in the glossary, each once and word for word', () => {
    expect(written).toEqual(explained.map(({ word, meaning }) => ({ word, meaning })));
  });

  it('are told in two or three sentences that fit a tip', () => {
    expect(explained.filter(({ meaning }) => meaning.length > 200 || !meaning.endsWith('.'))).toEqual([]);
  });
});

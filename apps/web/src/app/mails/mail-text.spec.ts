import { describe, expect, it } from 'vitest';
import { textPieces } from './mail-text';

const HERE = 'http://localhost:4310';

describe('textPieces', () => {
  it('makes links of addresses of this application, without the full stop behind them', () => {
    const text = `Open ${HERE}/invitation#abc_-1.\nNot ${HERE}0/x.`;
    const pieces = textPieces(text, HERE);
    expect(pieces.filter(({ href }) => href !== undefined)).toEqual([
      { text: `${HERE}/invitation#abc_-1`, href: `${HERE}/invitation#abc_-1` },
    ]);
    expect(pieces.map((piece) => piece.text).join('')).toBe(text);
  });

  it('leaves addresses of others as text, also those that dress up as ours', () => {
    const text = `https://elsewhere.example/a ${HERE}@elsewhere.example/b ${HERE}.elsewhere.example/ javascript:alert(1)`;
    expect(textPieces(text, HERE).every(({ href }) => href === undefined)).toBe(true);
  });
});

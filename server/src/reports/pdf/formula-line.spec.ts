import { METHOD_SECTIONS } from '@riseback/methods';
import { describe, expect, it } from 'vitest';
import { formulaPieces } from './formula-line';

describe('formulaPieces', () => {
  it('sets what follows the signs below and above the line', () => {
    expect(formulaPieces('ρ_l v^0.5')).toEqual([
      { text: 'ρ', place: 'line' },
      { text: 'l', place: 'below' },
      { text: ' v', place: 'line' },
      { text: '0.5', place: 'above' },
    ]);
  });

  it('takes what stands in brackets together, without them', () => {
    expect(formulaPieces('(1 − x)^(1/3)')).toEqual([
      { text: '(1 − x)', place: 'line' },
      { text: '1/3', place: 'above' },
    ]);
  });

  it('finds the bracket that closes another', () => {
    expect(formulaPieces('r^((n + 1)/n) x').map(({ text }) => text)).toEqual(['r', '(n + 1)/n', ' x']);
  });

  it('loses no sign of any formula of the Method view but the marks themselves', () => {
    for (const equation of METHOD_SECTIONS.flatMap(({ equations = [] }) => equations)) {
      const set = formulaPieces(equation).map(({ text }) => text);
      const bare = (text: string) => text.replaceAll(/["_^()\s]/g, '');
      expect(bare(set.join(''))).toBe(bare(equation));
    }
  });
});

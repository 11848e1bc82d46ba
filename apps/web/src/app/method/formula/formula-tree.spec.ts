import { describe, expect, it } from 'vitest';
import { type FormulaNode, formulaTree, linePieces } from './formula-tree';

/** A tree in brackets, so that its shape can be read. */
function shape(node: FormulaNode): string {
  switch (node.kind) {
    case 'gap':
      return ' ';
    case 'row':
      return node.items.map(shape).join('');
    case 'bracket':
      return `${node.open}${shape(node.inside)}${node.close}`;
    case 'fraction':
      return `<${shape(node.over)} over ${shape(node.under)}>`;
    case 'root':
      return `<root ${shape(node.of)}>`;
    case 'script':
      return `${shape(node.base)}${node.below === null ? '' : `_{${shape(node.below)}}`}${node.above === null ? '' : `^{${shape(node.above)}}`}`;
    default:
      return node.text;
  }
}

describe('formulaTree', () => {
  it.each([
    ['x = (h − h_l)/h_lg', 'x = <h − h_{l} over h_{lg}>'],
    ['a/b/c', '<<a over b> over c>'],
    ['K ρv²/2', 'K <ρv^{2} over 2>'],
    ['φ_l² g_l', 'φ_{l}^{2} g_{l}'],
    ['−2 log₁₀[ k/3.7 ]', '−2 log_{10}[<k over 3.7>]'],
    ['1/√f', '<1 over <root f>>'],
    ['√(g_l g_g) + 1', '<root g_{l} g_{g}> + 1'],
    ['ρ^(1/3)', 'ρ^{1/3}'],
    ['Re^−0.2', 'Re^{−0.2}'],
    ['11,310.297 Pa', '11,310.297 Pa'],
    ['f(a, 5)', 'f(a, 5)'],
    ['f(a)/f(b)', '<f(a) over f(b)>'],
    ['ln(2 r)/ln 4', '<ln(2 r) over ln 4>'],
    ['g cos β + 1', 'g cos β + 1'],
    ['V (d + 1)/2', 'V <d + 1 over 2>'],
    ['3.33/C0 − v_g′', '<3.33 over C0> − v_{g}^{′}'],
    ['"sizing factor" · m', 'sizing factor · m'],
  ])('reads %s', (text, expected) => {
    expect(shape(formulaTree(text))).toBe(expected);
  });

  it('refuses what does not close', () => {
    expect(() => formulaTree('(a + b')).toThrow('no )');
    expect(() => formulaTree('a + b)')).toThrow(') opens nowhere');
    expect(() => formulaTree('a/')).toThrow('ends too early');
  });

  it('may end a line before a sum or a relation, but in no bracket', () => {
    expect(linePieces(formulaTree('y = (a + b) + c, d')).map(shape)).toEqual(['y', '= (a + b)', '+ c,', 'd']);
    expect(linePieces(formulaTree('[a] (b/c)² d')).map(shape)).toEqual(['[a]', '(<b over c>)^{2} d']);
  });
});

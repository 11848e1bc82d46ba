/** An equation taken apart, ready to be drawn. */
export type FormulaNode =
  | { readonly kind: 'name' | 'number' | 'sign' | 'words'; readonly text: string }
  | { readonly kind: 'gap' }
  | { readonly kind: 'row'; readonly items: readonly FormulaNode[] }
  /** Items in brackets; a fraction or a root that says the same takes them off. */
  | { readonly kind: 'bracket'; readonly open: string; readonly close: string; readonly inside: FormulaNode }
  | { readonly kind: 'fraction'; readonly over: FormulaNode; readonly under: FormulaNode }
  | { readonly kind: 'root'; readonly of: FormulaNode }
  | {
      readonly kind: 'script';
      readonly base: FormulaNode;
      readonly below: FormulaNode | null;
      readonly above: FormulaNode | null;
    };

const PAIRS: Readonly<Record<string, string>> = { '(': ')', '[': ']', '{': '}' };
const RAISED: Readonly<Record<string, string>> = { '²': '2', '³': '3', '⁴': '4', '′': '′' };
const LOWERED: Readonly<Record<string, string>> = Object.fromEntries(
  [...'₀₁₂₃₄₅₆₇₈₉'].map((digit, i) => [digit, String(i)]),
);
/** Functions that take the next factor without brackets. */
const WORDED: ReadonlySet<string> = new Set(['ln', 'log', 'sin', 'cos']);
const TOKEN =
  /\s+|"[^"]*"|\d{1,3}(?:,\d{3})+(?:\.\d+)?|\d+(?:\.\d+)?(?:e[−-]?\d+)?|[A-Za-zÀ-ɏͰ-Ͽ][A-Za-zÀ-ɏͰ-Ͽ\d]*|./gu;

/**
 * Takes apart an equation as the pages in docs/methods write it: `_` and `^` for what stands below and above, `√`, `/` for a
 * fraction of its two neighbours, brackets to group, quotation marks around plain words.
 * @throws Error for a bracket without its partner or a sign without what it belongs to: a mistake in the page's data
 */
export function formulaTree(text: string): FormulaNode {
  return new FormulaReader(text).row(null);
}

/** Where a line may end: before a relation or a sum, after a comma, before a factor in brackets; each outside all brackets. */
export function linePieces(tree: FormulaNode): FormulaNode[] {
  if (tree.kind !== 'row') return [tree];
  const pieces: FormulaNode[][] = [[]];
  tree.items.forEach((item, i) => {
    const [before, after] = [tree.items[i - 1], tree.items[i + 1]];
    const atFactor = before?.kind !== 'sign' && isBracketed(after);
    if (item.kind === 'gap' && (isSign(after, '=+−≥<>') || isSign(before, ',;') || atFactor)) pieces.push([]);
    else pieces.at(-1)?.push(item);
  });
  return pieces.map((items) => ({ kind: 'row', items }));
}

function isSign(node: FormulaNode | undefined, among: string): boolean {
  return node?.kind === 'sign' && among.includes(node.text);
}

function isBracketed(node: FormulaNode | undefined): boolean {
  return node?.kind === 'bracket' || (node?.kind === 'script' && node.base.kind === 'bracket');
}

class FormulaReader {
  private readonly tokens: readonly string[];
  private at = 0;

  constructor(private readonly source: string) {
    this.tokens = source.match(TOKEN) ?? [];
  }

  /** Everything up to a closing bracket, or to the end. */
  row(close: string | null, flat = false): FormulaNode {
    const items: FormulaNode[] = [];
    for (let token = this.tokens[this.at]; token !== (close ?? undefined); token = this.tokens[this.at]) {
      if (token === undefined) throw this.mistake(`no ${String(close)}`);
      if (Object.values(PAIRS).includes(token)) throw this.mistake(`${token} opens nowhere`);
      if (token.trim() === '') {
        this.at += 1;
        items.push({ kind: 'gap' });
      } else items.push(this.term(flat));
    }
    if (close !== null) this.at += 1;
    return { kind: 'row', items: withoutEdgeGaps(items) };
  }

  /** A factor, or a fraction of two. A flat one keeps its slash: in an exponent a bar has no room. */
  private term(flat: boolean): FormulaNode {
    let node = this.factor();
    while (!flat && this.tokens[this.at] === '/') {
      this.at += 1;
      node = { kind: 'fraction', over: bare(node), under: bare(this.factor()) };
    }
    return node;
  }

  private factor(): FormulaNode {
    const base = this.atom();
    let [below, above]: [FormulaNode | null, FormulaNode | null] = [null, null];
    for (let token = this.tokens[this.at]; token !== undefined; token = this.tokens[this.at]) {
      const [raised, lowered] = [RAISED[token], LOWERED[token]];
      if (!['_', '^'].includes(token) && raised === undefined && lowered === undefined) break;
      this.at += 1;
      if (token === '_') below = bare(this.script());
      else if (token === '^') above = bare(this.script());
      else if (raised !== undefined) above = { kind: 'number', text: raised };
      else if (lowered !== undefined) below = lowerDigit(below, lowered);
    }
    const factor: FormulaNode = below === null && above === null ? base : { kind: 'script', base, below, above };
    return base.kind === 'name' ? this.applied(factor, base.text) : factor;
  }

  /** A name with what it is applied to: brackets close behind it, or, for `ln` and its like, the next factor. */
  private applied(name: FormulaNode, text: string): FormulaNode {
    const next = this.tokens[this.at] ?? '';
    if (next === '(' || next === '[') return { kind: 'row', items: [name, this.atom()] };
    if (!WORDED.has(text) || next.trim() !== '' || this.tokens[this.at + 1] === undefined) return name;
    this.at += 1;
    return { kind: 'row', items: [name, { kind: 'gap' }, this.factor()] };
  }

  /** What stands above or below: an atom, or a minus and an atom. */
  private script(): FormulaNode {
    const token = this.tokens[this.at];
    if (token !== '−') return this.atom(true);
    this.at += 1;
    return { kind: 'row', items: [{ kind: 'sign', text: '−' }, this.atom(true)] };
  }

  private atom(flat = false): FormulaNode {
    const token = this.tokens[this.at];
    if (token === undefined) throw this.mistake('ends too early');
    this.at += 1;
    const close = PAIRS[token];
    if (close !== undefined) return { kind: 'bracket', open: token, close, inside: this.row(close, flat) };
    if (token === '√') return { kind: 'root', of: bare(this.factor()) };
    if (token.startsWith('"')) return { kind: 'words', text: token.slice(1, -1) };
    if (/^\d/.test(token)) return { kind: 'number', text: token };
    return { kind: /^\p{L}/u.test(token) ? 'name' : 'sign', text: token };
  }

  private mistake(what: string): Error {
    return new Error(`The equation "${this.source}": ${what}`);
  }
}

/** The digits of ₁₀ are tokens of their own. */
function lowerDigit(before: FormulaNode | null, digit: string): FormulaNode {
  return { kind: 'number', text: (before?.kind === 'number' ? before.text : '') + digit };
}

/** Without brackets that the drawing makes needless. */
function bare(node: FormulaNode): FormulaNode {
  return node.kind === 'bracket' ? node.inside : node;
}

function withoutEdgeGaps(items: readonly FormulaNode[]): FormulaNode[] {
  const first = items.findIndex(({ kind }) => kind !== 'gap');
  const last = items.findLastIndex(({ kind }) => kind !== 'gap');
  return first === -1 ? [] : items.slice(first, last + 1);
}

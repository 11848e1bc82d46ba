import {
  ChangeDetectionStrategy,
  Component,
  DOCUMENT,
  effect,
  ElementRef,
  inject,
  input,
  ViewEncapsulation,
} from '@angular/core';
import { type FormulaNode, formulaTree, linePieces } from './formula-tree';

const MATHML = 'http://www.w3.org/1998/Math/MathML';

/**
 * An equation as MathML, which the browser draws and a screen reader reads. Built node by node: a template could not recurse
 * without wrappers that break a fraction. Browsers do not break MathML into lines, so a long one comes in pieces.
 */
@Component({
  selector: 'app-formula',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: '',
  styleUrl: './formula.scss',
  // what is built node by node carries none of the attributes that encapsulated styles look for
  encapsulation: ViewEncapsulation.None,
  host: { '[class.block]': 'block()' },
})
export class Formula {
  private readonly document = inject(DOCUMENT);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  /** As docs/methods writes it; see `formulaTree`. */
  readonly text = input.required<string>();
  /** On a line of its own. */
  readonly block = input(false);

  constructor() {
    effect(() => {
      const tree = formulaTree(this.text());
      const pieces = this.block() ? linePieces(tree) : [tree];
      this.host.nativeElement.replaceChildren(
        ...pieces.flatMap((piece, i) => (i === 0 ? [this.math(piece)] : [' ', this.math(piece)])),
      );
    });
  }

  private math(node: FormulaNode): Element {
    const math = this.element('math', this.drawn(node));
    if (this.block()) math.setAttribute('displaystyle', 'true');
    return math;
  }

  private drawn(node: FormulaNode): Element {
    switch (node.kind) {
      case 'name':
        return this.element('mi', node.text);
      case 'number':
        return this.element('mn', node.text);
      case 'sign':
        return this.element('mo', node.text);
      case 'words':
        return this.element('mtext', ` ${node.text} `);
      case 'gap': {
        const gap = this.element('mspace');
        gap.setAttribute('width', '0.2em');
        return gap;
      }
      case 'row':
        return this.element('mrow', ...node.items.map((item) => this.drawn(item)));
      case 'bracket':
        return this.element(
          'mrow',
          this.element('mo', node.open),
          this.drawn(node.inside),
          this.element('mo', node.close),
        );
      case 'fraction':
        return this.element('mfrac', this.drawn(node.over), this.drawn(node.under));
      case 'root':
        return this.element('msqrt', this.drawn(node.of));
      case 'script':
        return this.script(node);
    }
  }

  private script({ base, below, above }: Extract<FormulaNode, { kind: 'script' }>): Element {
    const name = below === null ? 'msup' : above === null ? 'msub' : 'msubsup';
    const scripts = [below, above].flatMap((node) => (node === null ? [] : [this.drawn(node)]));
    return this.element(name, this.drawn(base), ...scripts);
  }

  private element(name: string, ...children: (Element | string)[]): Element {
    const element = this.document.createElementNS(MATHML, name);
    element.append(...children);
    return element;
  }
}

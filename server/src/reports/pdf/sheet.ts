import type { Ink, Shape } from '@riseback/figures';
import PDFDocument from 'pdfkit';
import { paintShapes } from './figure-painter';
import { INKS } from './inks';
import { linesOf, shortened } from './line-breaks';
import { PLAIN, TABULAR, Typeface, type Weight } from './typeface';

export interface TextStyle {
  readonly size: number;
  readonly weight?: Weight;
  readonly ink?: Ink;
  /** Digits of one width. */
  readonly tabular?: boolean;
}

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

export interface SheetOptions {
  readonly paper: 'a4' | 'letter';
  readonly title: string;
  readonly author: string;
  readonly madeAt: Date;
}

type StructureElement = ReturnType<PDFKit.PDFDocument['struct']>;

/** Margins and bands of every page, pt. */
const MARGIN = { left: 38, right: 38, head: 30, body: 62, foot: 44 } as const;
export const BODY: TextStyle = { size: 8.6 };
const LEADING = 1.42;
const GUTTER = 26;

/**
 * The pages of a report, landscape: text, lines and figures at places, each with its part in the document's structure, and a cursor
 * that runs down the page.
 */
export class Sheet {
  readonly doc: PDFKit.PDFDocument;
  readonly typeface: Typeface;
  readonly pageLeft = MARGIN.left;
  readonly pageRight: number;
  readonly bottom: number;
  /** Where the next thing begins. */
  y: number = MARGIN.body;
  /** The section that each page belongs to. */
  readonly sections: string[] = [];
  private section = '';
  /** Of how many the page has, which is being filled, and where they begin. */
  private columns = { count: 1, at: 0, top: MARGIN.body as number };
  private readonly parents: StructureElement[] = [];
  private readonly chunks: Buffer[] = [];
  private readonly whole: Promise<Buffer>;

  constructor({ paper, title, author, madeAt }: SheetOptions) {
    const size = paper === 'a4' ? 'A4' : 'LETTER';
    const info = { Title: title, Author: author, Creator: 'Riseback', CreationDate: madeAt };
    this.doc = new PDFDocument({
      ...{ size, layout: 'landscape', margin: 0, autoFirstPage: false, bufferPages: true },
      ...{ pdfVersion: '1.7', tagged: true, lang: 'en', displayTitle: true, info },
    });
    this.typeface = new Typeface(this.doc);
    this.whole = new Promise((resolve, reject) => {
      this.doc.on('data', (chunk: Buffer) => this.chunks.push(chunk));
      this.doc.on('end', () => resolve(Buffer.concat(this.chunks)));
      this.doc.on('error', reject);
    });
    const root = this.doc.struct('Document');
    this.doc.addStructure(root);
    this.parents.push(root);
    const [long, short] = paper === 'a4' ? [841.89, 595.28] : [792, 612];
    this.pageRight = long - MARGIN.right;
    this.bottom = short - MARGIN.foot;
  }

  get left(): number {
    const { count, at } = this.columns;
    return this.pageLeft + at * ((this.pageRight - this.pageLeft + GUTTER) / count);
  }

  get right(): number {
    return this.left + this.width;
  }

  get width(): number {
    const { count } = this.columns;
    return (this.pageRight - this.pageLeft + GUTTER) / count - GUTTER;
  }

  get room(): number {
    return this.bottom - this.y;
  }

  get pageCount(): number {
    return this.sections.length;
  }

  /** Begins a section on a page of its own. */
  begin(section: string, title = section): void {
    this.section = section;
    this.newPage();
    this.doc.outline.addItem(title);
    this.tagged('H1', () => this.print(title, this.left, this.y + 13, { size: 15, weight: 600 }));
    this.y += 26;
  }

  newPage(): void {
    this.doc.addPage();
    this.sections.push(this.section);
    this.y = MARGIN.body;
    this.columns = { ...this.columns, at: 0, top: MARGIN.body };
  }

  /** Sets what `fill` prints in so many columns, from here to the end of its last page. */
  inColumns(count: number, fill: () => void): void {
    this.columns = { count, at: 0, top: this.y };
    fill();
    this.columns = { count: 1, at: 0, top: MARGIN.body };
    this.y = this.bottom;
  }

  /** @returns whether a new page or column was begun */
  ensure(height: number): boolean {
    if (height <= this.room) return false;
    const { count, at, top } = this.columns;
    if (at + 1 < count) {
      this.columns = { count, at: at + 1, top };
      this.y = top;
    } else this.newPage();
    return true;
  }

  heading(text: string, keep = 60): void {
    this.ensure(keep + 20);
    if (this.y > this.columns.top) this.y += 10;
    this.tagged('H2', () => this.print(text, this.left, this.y + 9, { size: 10.5, weight: 600 }));
    this.y += 17;
  }

  /** Wrapped text at the cursor; one that is longer than the page goes on on the next. */
  paragraph(text: string, style: TextStyle = BODY, box: { indent?: number; width?: number; gap?: number } = {}): void {
    const { indent = 0, width = this.width - indent, gap = 5 } = box;
    const step = style.size * LEADING;
    for (const line of this.lines(text, width, style)) {
      this.ensure(step);
      this.tagged('P', () => this.print(line, this.left + indent, this.y + style.size, style));
      this.y += step;
    }
    this.y += gap;
  }

  lines(text: string, width: number, { size, weight = 400, tabular = false }: TextStyle): string[] {
    return linesOf(text, width, (part) => this.typeface.width(part, weight, size, tabular));
  }

  measure(text: string, { size, weight = 400, tabular = false }: TextStyle): number {
    return this.typeface.width(text, weight, size, tabular);
  }

  /** As much of the text as fits, with an ellipsis where something is left out. */
  fitted(text: string, width: number, style: TextStyle): string {
    return shortened(text, width, (part) => this.measure(part, style));
  }

  /** One line on its baseline. */
  print(
    text: string,
    x: number,
    baseline: number,
    style: TextStyle,
    align: 'left' | 'right' | 'center' = 'left',
  ): void {
    const { size, weight = 400, ink = 'ink', tabular = false } = style;
    const { doc, typeface } = this;
    const width = align === 'left' ? 0 : this.measure(text, style);
    let at = align === 'left' ? x : align === 'right' ? x - width : x - width / 2;
    const features = (tabular ? TABULAR : PLAIN) as PDFKit.Mixins.OpenTypeFeatures[];
    for (const run of typeface.runs(text, weight)) {
      doc.font(run.font).fontSize(size).fillColor(INKS[ink]);
      doc.text(run.text, at, baseline, { lineBreak: false, baseline: 'alphabetic', features });
      at += this.typeface.width(run.text, weight, size, tabular);
    }
  }

  /** Lines and grounds that say nothing to who listens to the page. */
  decoration(draw: () => void): void {
    this.doc.markContent('Artifact', { type: 'Layout' });
    draw();
    this.doc.endMarkedContent();
  }

  rule(x1: number, y: number, x2: number, ink: Ink = 'rule', width = 0.5): void {
    this.decoration(() => this.stroke(`M${x1} ${y}H${x2}`, ink, width));
  }

  stroke(d: string, ink: Ink, width: number): void {
    this.doc.path(d).lineWidth(width).stroke(INKS[ink]);
  }

  fill(d: string, ink: Ink): void {
    this.doc.path(d).fill(INKS[ink]);
  }

  /** A picture with the words that stand for it. */
  figure(shapes: readonly Shape[], at: { x: number; y: number; scale?: number }, words: string, bounds: Box): void {
    const { x, y, width, height } = bounds;
    const options = { alt: words, bbox: [x, y, x + width, y + height] as [number, number, number, number] };
    this.tagged('Figure', () => paintShapes(this, shapes, at.x, at.y, at.scale ?? 1), options);
  }

  /** What `draw` prints, as one element of the structure; it may not leave its page. */
  tagged(
    type: string,
    draw: () => void,
    options: { alt?: string; bbox?: [number, number, number, number] } = {},
  ): void {
    const element = this.doc.struct(type, options, draw);
    this.parents.at(-1)?.add(element);
    element.end();
  }

  /** What `fill` tags, together; it may run over pages. */
  within(type: string, fill: () => void): void {
    const element = this.doc.struct(type);
    this.parents.at(-1)?.add(element);
    this.parents.push(element);
    fill();
    this.parents.pop();
    element.end();
  }

  /** Goes over every page once more for what only the last one makes known, then ends. */
  finish(furnish: (page: { index: number; count: number; section: string }) => void): Promise<Buffer> {
    const count = this.sections.length;
    this.sections.forEach((section, index) => {
      this.doc.switchToPage(index);
      this.doc.markContent('Artifact', { type: 'Pagination' });
      furnish({ index, count, section });
      this.doc.endMarkedContent();
    });
    this.parents[0]?.end();
    this.doc.end();
    return this.whole;
  }
}

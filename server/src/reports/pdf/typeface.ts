import { createRequire } from 'node:module';
import { unpackedFont } from './woff-font';

/** Inter's weights as files; a text takes each character from the first subset that has it. */
export type Weight = 400 | 500 | 600;

/** One stretch of a text in one font file. */
export interface Run {
  readonly font: string;
  readonly text: string;
}

/** What pdfkit does with fonts, as far as it is used here. */
export interface FontDocument {
  registerFont(name: string, src: Buffer): unknown;
  font(name: string): unknown;
}

/** The opened font behind a document's present one; pdfkit's types leave it out. */
interface OpenedFont {
  readonly _font: { readonly font: FontkitFont };
}
interface FontkitFont {
  readonly unitsPerEm: number;
  hasGlyphForCodePoint(codePoint: number): boolean;
  layout(text: string, features: object): { readonly advanceWidth: number };
}

const SUBSETS = ['latin', 'latin-ext', 'greek', 'cyrillic', 'vietnamese'] as const;
/** Stands for what no subset has; the report says so where it is made of such names. */
export const MISSING = '?';

/** Written another way, since no subset has them. */
const WORDED: Readonly<Record<string, string>> = { '√': 'sqrt', '≥': '>=', '≤': '<=', '→': 'to', '∝': '~', '′': "'" };
const SMALL_DIGITS = /[₀-₉]/gu;

/**
 * Digits of one width, and neither kerning nor contextual forms: in a table they cost five times what setting it takes, and a width is
 * then the sum of its characters'.
 */
export const TABULAR = features(true);
export const PLAIN = features(false);

const require = createRequire(import.meta.url);

/** Opens the font files when they are needed, and knows which has a character and how wide it is. */
export class Typeface {
  private readonly files = new Map<string, FontkitFont>();
  private readonly fontOf = new Map<string, string>();
  private readonly advances = new Map<string, number>();

  constructor(private readonly doc: FontDocument) {}

  /** The text as it can be printed, in stretches of one font each. */
  runs(text: string, weight: Weight): Run[] {
    const runs: { font: string; text: string }[] = [];
    for (const character of printable(text)) {
      const font = this.fontFor(character, weight);
      const shown = font === undefined ? MISSING : character;
      const name = font ?? fontName('latin', weight);
      const last = runs.at(-1);
      if (last?.font === name) last.text += shown;
      else runs.push({ font: name, text: shown });
    }
    return runs;
  }

  /** In points at a size. */
  width(text: string, weight: Weight, size: number, tabular = false): number {
    let em = 0;
    for (const character of printable(text)) em += this.advance(character, weight, tabular);
    return em * size;
  }

  private advance(character: string, weight: Weight, tabular: boolean): number {
    const key = `${String(weight)}${tabular ? 't' : 'p'}${character}`;
    const known = this.advances.get(key);
    if (known !== undefined) return known;
    const font = this.fontFor(character, weight);
    const shown = font === undefined ? MISSING : character;
    const opened = this.open(font ?? fontName('latin', weight));
    const advance = opened.layout(shown, tabular ? TABULAR : PLAIN).advanceWidth / opened.unitsPerEm;
    this.advances.set(key, advance);
    return advance;
  }

  private fontFor(character: string, weight: Weight): string | undefined {
    const key = `${String(weight)}${character}`;
    const known = this.fontOf.get(key);
    if (known !== undefined) return known;
    const codePoint = character.codePointAt(0) ?? 0;
    const subset = SUBSETS.find((name) => this.open(fontName(name, weight)).hasGlyphForCodePoint(codePoint));
    if (subset === undefined) return undefined;
    this.fontOf.set(key, fontName(subset, weight));
    return fontName(subset, weight);
  }

  private open(name: string): FontkitFont {
    const known = this.files.get(name);
    if (known !== undefined) return known;
    const path = require.resolve(`@fontsource/inter/files/inter-${name}-normal.woff`);
    this.doc.registerFont(name, unpackedFont(path));
    this.doc.font(name);
    const { font } = (this.doc as unknown as OpenedFont)._font;
    this.files.set(name, font);
    return font;
  }
}

function fontName(subset: (typeof SUBSETS)[number], weight: Weight): string {
  return `${subset}-${String(weight)}`;
}

/** Neither control characters nor those that turn the order of a line or stay unseen. */
function printable(text: string): string {
  if (/^[ -~]*$/.test(text)) return text;
  return text
    .normalize('NFC')
    .replaceAll(/\s+/gu, ' ')
    .replaceAll(/[\p{Cc}\p{Cf}\p{Co}\p{Cn}\p{Cs}]/gu, '')
    .replaceAll(SMALL_DIGITS, (digit) => String((digit.codePointAt(0) ?? 0x2080) - 0x2080))
    .replaceAll(/√(?!\()/gu, 'sqrt ')
    .replaceAll(/[√≥≤→∝′]/gu, (sign) => WORDED[sign] ?? sign);
}

function features(tabular: boolean): object {
  const off = {
    calt: false,
    kern: false,
    liga: false,
    clig: false,
    ccmp: false,
    rlig: false,
    mark: false,
    mkmk: false,
  };
  return { ...off, tnum: tabular };
}

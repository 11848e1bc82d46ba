import PDFDocument from 'pdfkit';
import { describe, expect, it } from 'vitest';
import { MISSING, Typeface } from './typeface';

const typeface = () => new Typeface(new PDFDocument({ autoFirstPage: false }));
const textOf = (face: Typeface, text: string) =>
  face
    .runs(text, 400)
    .map((run) => run.text)
    .join('');

describe('Typeface', () => {
  it('takes each character from the first of its files that has it', () => {
    const fonts = typeface()
      .runs('Łρж', 600)
      .map(({ font }) => font);
    expect(fonts).toEqual(['latin-ext-600', 'greek-600', 'cyrillic-600']);
  });

  it('prints nothing that hides, turns the line or ends it', () => {
    expect(textOf(typeface(), 'a\u202Eb\u2066c\u200Bd\u0000e\nf')).toBe('abcde f');
  });

  it('prints a sign for what no file has', () => {
    expect(textOf(typeface(), 'x水🔥')).toBe(`x${MISSING}${MISSING}`);
  });

  it('gives digits one width in columns, and not elsewhere', () => {
    const face = typeface();
    const width = (text: string, tabular: boolean) => face.width(text, 400, 10, tabular);
    expect(Math.abs(width('111', true) - width('000', true))).toBeLessThan(1e-9);
    expect(width('111', false)).toBeLessThan(width('000', false));
  });
});

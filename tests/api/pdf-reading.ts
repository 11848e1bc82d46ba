import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';

/** What a reader of a PDF finds in it: of each page its lines, from the top, each from the left. */
export interface ReadPdf {
  readonly pages: readonly (readonly string[])[];
  readonly language: string | undefined;
  readonly tagged: boolean;
  /** The kinds of elements in its structure, each once. */
  readonly structure: ReadonlySet<string>;
}

interface Placed {
  readonly text: string;
  readonly x: number;
  readonly y: number;
  readonly width: number;
}

/** Baselines nearer than this are of one line, pt. */
const SAME_LINE = 1.5;
/** Parts nearer than this are of one word: a word may be of several fonts. */
const SAME_WORD = 0.8;

/** Reads a PDF by another program's eyes than made it. */
export async function readPdf(bytes: Uint8Array): Promise<ReadPdf> {
  const document = await getDocument({ data: new Uint8Array(bytes), verbosity: 0 }).promise;
  const pages: string[][] = [];
  const structure = new Set<string>();
  for (let number = 1; number <= document.numPages; number += 1) {
    const page = await document.getPage(number);
    const { items } = await page.getTextContent();
    const placed = items.flatMap((item): Placed[] => {
      if (!('str' in item) || item.str.trim() === '') return [];
      const [, , , , x, y] = item.transform as number[];
      return [{ text: item.str, x: x ?? 0, y: y ?? 0, width: item.width }];
    });
    pages.push(linesOf(placed));
    collect((await page.getStructTree()) as StructureNode | null, structure);
  }
  const marks = (await document.getMarkInfo()) as { Marked?: boolean } | null;
  const { info } = (await document.getMetadata()) as { info: { Language?: string } };
  await document.destroy();
  return { pages, language: info.Language, tagged: marks?.Marked === true, structure };
}

function linesOf(placed: readonly Placed[]): string[] {
  const lines: Placed[][] = [];
  for (const part of [...placed].sort((a, b) => b.y - a.y)) {
    const last = lines.at(-1);
    if (last?.[0] !== undefined && Math.abs(last[0].y - part.y) < SAME_LINE) last.push(part);
    else lines.push([part]);
  }
  return lines.map((line) => {
    let [text, end] = ['', 0];
    for (const part of line.sort((a, b) => a.x - b.x)) {
      text += (text === '' || part.x - end < SAME_WORD ? '' : ' ') + part.text;
      end = part.x + part.width;
    }
    return text.replaceAll(/\s+/g, ' ').trim();
  });
}

interface StructureNode {
  readonly role?: string;
  readonly children?: readonly StructureNode[];
}

function collect(node: StructureNode | null, found: Set<string>): void {
  if (node?.role !== undefined) found.add(node.role);
  for (const child of node?.children ?? []) collect(child, found);
}

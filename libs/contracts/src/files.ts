/** Kinds of image that are stored; what a file is, its content says, never its name. */
export const IMAGE_TYPES = ['image/png', 'image/jpeg'] as const;
export type ImageType = (typeof IMAGE_TYPES)[number];

export const IMAGE_WORDS: Readonly<Record<ImageType, string>> = { 'image/png': 'PNG', 'image/jpeg': 'JPEG' };

export interface ImageFacts {
  readonly mediaType: ImageType;
  /** As stored: a JPEG may tell viewers to turn it. */
  readonly widthPx: number;
  readonly heightPx: number;
  /** Where the image ends; bytes after it belong to no image. */
  readonly endByte: number;
}

export type ImageReading =
  | { readonly ok: true; readonly image: ImageFacts }
  /** `kind`: another kind of file; `broken`: of the right kind, but not whole or not to be read. */
  | { readonly ok: false; readonly wrong: 'kind' | 'broken'; readonly reason: string };

const PNG_SIGNATURE = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];
const PNG_HEADER_BYTES = 13;
/** Bits a sample that each colour type may have (PNG, third edition, table 11.1). */
const PNG_DEPTHS: Readonly<Record<number, readonly number[]>> = {
  0: [1, 2, 4, 8, 16],
  2: [8, 16],
  3: [1, 2, 4, 8],
  4: [8, 16],
  6: [8, 16],
};

/** Of ITU-T T.81, table B.1: baseline, extended and progressive, which is what browsers show. */
const JPEG_SHOWN_FRAMES = [0xc0, 0xc1, 0xc2];
const JPEG_OTHER_FRAMES = [0xc3, 0xc5, 0xc6, 0xc7, 0xc9, 0xca, 0xcb, 0xcd, 0xce, 0xcf];
const JPEG_END = 0xd9;
const JPEG_SCAN = 0xda;

/** What else people try, by how it begins. */
const OTHER_KINDS: readonly { readonly begins: string; readonly words: string }[] = [
  { begins: '%PDF-', words: 'a PDF' },
  { begins: 'GIF8', words: 'a GIF' },
  { begins: 'RIFF', words: 'a WebP or another RIFF file' },
  { begins: 'BM', words: 'a bitmap' },
  { begins: 'II*\0', words: 'a TIFF' },
  { begins: 'MM\0*', words: 'a TIFF' },
  { begins: 'PK', words: 'an archive or an office document' },
  { begins: 'AC10', words: 'a CAD drawing' },
];

/**
 * What an image is and how large, from its own bytes; it is not decoded. It must be whole: begin with its signature, hold a picture and
 * reach its own end mark.
 */
export function readImage(bytes: Uint8Array): ImageReading {
  if (PNG_SIGNATURE.every((byte, at) => bytes[at] === byte)) return readPng(bytes);
  if (bytes[0] === 0xff && bytes[1] === 0xd8) return readJpeg(bytes);
  return { ok: false, wrong: 'kind', reason: `It is ${otherKind(bytes)}, neither a PNG nor a JPEG.` };
}

/** How a file that is no PNG and no JPEG would be called. */
export function otherKind(bytes: Uint8Array): string {
  if (bytes.length === 0) return 'empty';
  const head = String.fromCharCode(...bytes.subarray(0, 512));
  const known = OTHER_KINDS.find(({ begins }) => head.startsWith(begins));
  if (known !== undefined) return known.words;
  if (/^\W*<[\s\S]*<?svg\b/i.test(head)) return 'an SVG';
  return /^\W*</.test(head) ? 'a page or an XML file' : 'a file of another kind';
}

function readPng(bytes: Uint8Array): ImageReading {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let size: { widthPx: number; heightPx: number } | undefined;
  let hasData = false;
  let at = PNG_SIGNATURE.length;
  while (at + 12 <= bytes.length) {
    const length = view.getUint32(at);
    const type = String.fromCharCode(...bytes.subarray(at + 4, at + 8));
    const next = at + 12 + length;
    if (next > bytes.length) break;
    if (size === undefined) {
      const header = type === 'IHDR' && length === PNG_HEADER_BYTES ? pngSize(view, at + 8) : undefined;
      if (header === undefined) return broken('The head of this PNG cannot be read.');
      size = header;
    } else if (type === 'IDAT') hasData = true;
    else if (type === 'IEND') {
      if (!hasData) return broken('There is no picture in this PNG.');
      return { ok: true, image: { mediaType: 'image/png', ...size, endByte: next } };
    }
    at = next;
  }
  return broken('This PNG ends before its picture does: the file is not whole.');
}

function pngSize(view: DataView, at: number): { widthPx: number; heightPx: number } | undefined {
  const [widthPx, heightPx] = [view.getUint32(at), view.getUint32(at + 4)];
  const [depth, colour] = [view.getUint8(at + 8), view.getUint8(at + 9)];
  const [compression, filter, interlace] = [view.getUint8(at + 10), view.getUint8(at + 11), view.getUint8(at + 12)];
  const known = PNG_DEPTHS[colour]?.includes(depth) === true && compression === 0 && filter === 0 && interlace <= 1;
  return known && widthPx > 0 && heightPx > 0 ? { widthPx, heightPx } : undefined;
}

function readJpeg(bytes: Uint8Array): ImageReading {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  let size: { widthPx: number; heightPx: number } | undefined;
  let scanned = false;
  let at = 2;
  while (at + 2 <= bytes.length) {
    if (bytes[at] !== 0xff) return broken('This JPEG cannot be read: a part of it does not begin where it should.');
    const marker = bytes[at + 1] ?? 0;
    if (marker === 0xff) {
      at += 1;
      continue;
    }
    if (marker === JPEG_END) {
      if (size === undefined || !scanned) return broken('There is no picture in this JPEG.');
      return { ok: true, image: { mediaType: 'image/jpeg', ...size, endByte: at + 2 } };
    }
    if (at + 4 > bytes.length) break;
    const next = at + 2 + view.getUint16(at + 2);
    if (JPEG_OTHER_FRAMES.includes(marker)) return broken('This kind of JPEG is not one that browsers show.');
    if (JPEG_SHOWN_FRAMES.includes(marker)) {
      if (at + 9 > bytes.length) break;
      size = { heightPx: view.getUint16(at + 5), widthPx: view.getUint16(at + 7) };
      if (size.heightPx === 0 || size.widthPx === 0) return broken('The head of this JPEG cannot be read.');
    }
    scanned ||= marker === JPEG_SCAN;
    at = marker === JPEG_SCAN ? endOfScan(bytes, next) : next;
  }
  return broken('This JPEG ends before its picture does: the file is not whole.');
}

/** The next marker after the coded data of a scan, in which FF is followed by 0 or a restart mark. */
function endOfScan(bytes: Uint8Array, from: number): number {
  for (let at = bytes.indexOf(0xff, from); at !== -1; at = bytes.indexOf(0xff, at + 1)) {
    const after = bytes[at + 1];
    const isData = after === undefined || after === 0 || (after >= 0xd0 && after <= 0xd7);
    if (!isData) return at;
  }
  return bytes.length;
}

function broken(reason: string): ImageReading {
  return { ok: false, wrong: 'broken', reason };
}

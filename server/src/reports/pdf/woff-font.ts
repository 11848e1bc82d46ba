import { readFileSync } from 'node:fs';
import { inflateSync } from 'node:zlib';

/**
 * A font as pdfkit takes it fastest. Our font files are WOFF 1.0 (W3C 2012): the tables of a TrueType file, each deflated. They are unpacked here,
 * because the library does it in JavaScript, half a second a report.
 */
export function unpackedFont(path: string): Buffer {
  const known = unpacked.get(path);
  if (known !== undefined) return known;
  const font = unpack(readFileSync(path));
  unpacked.set(path, font);
  return font;
}

const unpacked = new Map<string, Buffer>();

const HEADER = { signature: 0x774f4646, bytes: 44, flavor: 4, tables: 12 } as const;
const WOFF_ENTRY_BYTES = 20;
const SFNT_HEADER_BYTES = 12;
const SFNT_ENTRY_BYTES = 16;

function unpack(woff: Buffer): Buffer {
  if (woff.readUInt32BE(0) !== HEADER.signature) throw new Error('a font file is no WOFF 1.0');
  const count = woff.readUInt16BE(HEADER.tables);
  const directory = Buffer.alloc(SFNT_HEADER_BYTES + count * SFNT_ENTRY_BYTES);
  const power = 2 ** Math.floor(Math.log2(count));
  directory.writeUInt32BE(woff.readUInt32BE(HEADER.flavor), 0);
  directory.writeUInt16BE(count, 4);
  directory.writeUInt16BE(power * SFNT_ENTRY_BYTES, 6);
  directory.writeUInt16BE(Math.log2(power), 8);
  directory.writeUInt16BE((count - power) * SFNT_ENTRY_BYTES, 10);
  const parts: Buffer[] = [directory];
  let offset = directory.length;
  for (let i = 0; i < count; i += 1) {
    const entry = HEADER.bytes + i * WOFF_ENTRY_BYTES;
    const [from, packed, length] = [4, 8, 12].map((at) => woff.readUInt32BE(entry + at));
    const raw = woff.subarray(from, (from ?? 0) + (packed ?? 0));
    const table = packed === length ? raw : inflateSync(raw);
    const to = SFNT_HEADER_BYTES + i * SFNT_ENTRY_BYTES;
    woff.copy(directory, to, entry, entry + 4);
    woff.copy(directory, to + 4, entry + 16, entry + 20);
    directory.writeUInt32BE(offset, to + 8);
    directory.writeUInt32BE(table.length, to + 12);
    // tables begin at whole words
    parts.push(table, Buffer.alloc((4 - (table.length % 4)) % 4));
    offset += table.length + ((4 - (table.length % 4)) % 4);
  }
  return Buffer.concat(parts);
}

/** What a spreadsheet file may unpack to. A workbook of 5,000 rows stays far below; a file made to exhaust memory does not. */
export const ZIP_LIMITS = { entries: 1_000, unpackedBytes: 40_000_000 } as const;

/** Why an archive is refused, in words for the person who chose it. */
export class ZipRefused extends Error {}

export interface ZipEntry {
  readonly name: string;
  readonly bytes: Uint8Array<ArrayBuffer>;
}

interface Listed {
  readonly name: string;
  readonly method: number;
  readonly packedBytes: number;
  readonly unpackedBytes: number;
  readonly offset: number;
}

// APPNOTE.TXT (PKWARE), sections 4.3.7, 4.3.12 and 4.3.16
const LOCAL_HEADER = 0x04034b50;
const CENTRAL_HEADER = 0x02014b50;
const END_OF_DIRECTORY = 0x06054b50;
const END_BYTES = 22;
const LONGEST_COMMENT = 0xffff;
const STORED = 0;
const DEFLATED = 8;
const ENCRYPTED = 1;

const DAMAGED = 'The file is damaged: it ends early or was changed on the way. Save it once more.';

/**
 * Unpacks the wanted entries of a zip archive. What the directory declares is held against the limits before anything is unpacked, and
 * what unpacks to more than it declared is refused while it does.
 * @throws ZipRefused
 */
export async function readZip(archive: ArrayBuffer, wanted: (name: string) => boolean): Promise<ZipEntry[]> {
  const listed = directoryOf(new DataView(archive));
  const total = listed.reduce((sum, { unpackedBytes }) => sum + unpackedBytes, 0);
  if (listed.length > ZIP_LIMITS.entries || total > ZIP_LIMITS.unpackedBytes)
    throw new ZipRefused(
      `It unpacks to more than ${String(ZIP_LIMITS.unpackedBytes / 1e6)} MB. Save only the sheet with the rows, or as CSV.`,
    );
  const entries: ZipEntry[] = [];
  for (const entry of listed.filter(({ name }) => wanted(name)))
    entries.push({ name: entry.name, bytes: await unpacked(archive, entry) });
  return entries;
}

/** An archive whose entries are not compressed. */
export function storeZip(entries: readonly ZipEntry[]): Uint8Array<ArrayBuffer> {
  const encoder = new TextEncoder();
  const parts: Uint8Array[] = [];
  const directory: Uint8Array[] = [];
  let offset = 0;
  for (const { name, bytes } of entries) {
    const nameBytes = encoder.encode(name);
    const facts = [
      20,
      0x0800,
      STORED,
      0,
      FIRST_DATE,
      crc32(bytes),
      bytes.length,
      bytes.length,
      nameBytes.length,
      0,
    ] as const;
    const local = record(LOCAL_HEADER, facts, []);
    directory.push(record(CENTRAL_HEADER, [20, ...facts], [0, 0, 0, 0, offset]), nameBytes);
    parts.push(local, nameBytes, bytes);
    offset += local.length + nameBytes.length + bytes.length;
  }
  const directoryBytes = lengthOf(directory);
  const end = new DataView(new ArrayBuffer(END_BYTES));
  end.setUint32(0, END_OF_DIRECTORY, true);
  end.setUint16(8, entries.length, true);
  end.setUint16(10, entries.length, true);
  end.setUint32(12, directoryBytes, true);
  end.setUint32(16, offset, true);
  return joined([...parts, ...directory, new Uint8Array(end.buffer)]);
}

/** The first of January 1980, so that the same rows give the same file. */
const FIRST_DATE = 0x0021;

function directoryOf(view: DataView): Listed[] {
  const end = endOfDirectory(view);
  const count = view.getUint16(end + 10, true);
  const listed: Listed[] = [];
  try {
    let at = view.getUint32(end + 16, true);
    for (let i = 0; i < count; i += 1) {
      if (view.getUint32(at, true) !== CENTRAL_HEADER) throw new ZipRefused(DAMAGED);
      if ((view.getUint16(at + 8, true) & ENCRYPTED) !== 0)
        throw new ZipRefused('It is protected by a password. Save it without one.');
      const nameBytes = view.getUint16(at + 28, true);
      listed.push({
        name: new TextDecoder().decode(new Uint8Array(view.buffer, at + 46, nameBytes)),
        method: view.getUint16(at + 10, true),
        packedBytes: view.getUint32(at + 20, true),
        unpackedBytes: view.getUint32(at + 24, true),
        offset: view.getUint32(at + 42, true),
      });
      at += 46 + nameBytes + view.getUint16(at + 30, true) + view.getUint16(at + 32, true);
    }
  } catch (error) {
    if (error instanceof RangeError) throw new ZipRefused(DAMAGED);
    throw error;
  }
  return listed;
}

function endOfDirectory(view: DataView): number {
  const first = Math.max(0, view.byteLength - END_BYTES - LONGEST_COMMENT);
  for (let at = view.byteLength - END_BYTES; at >= first; at -= 1)
    if (view.getUint32(at, true) === END_OF_DIRECTORY) return at;
  throw new ZipRefused(DAMAGED);
}

async function unpacked(archive: ArrayBuffer, entry: Listed): Promise<Uint8Array<ArrayBuffer>> {
  const view = new DataView(archive);
  if (entry.offset + 30 > archive.byteLength || view.getUint32(entry.offset, true) !== LOCAL_HEADER)
    throw new ZipRefused(DAMAGED);
  const start = entry.offset + 30 + view.getUint16(entry.offset + 26, true) + view.getUint16(entry.offset + 28, true);
  if (start + entry.packedBytes > archive.byteLength) throw new ZipRefused(DAMAGED);
  const packed = new Uint8Array(archive, start, entry.packedBytes);
  if (entry.method === STORED) return packed.slice();
  if (entry.method !== DEFLATED)
    throw new ZipRefused('It is packed in a way that spreadsheets do not use. Save it once more.');
  return inflated(packed, entry.unpackedBytes);
}

async function inflated(packed: Uint8Array<ArrayBuffer>, declaredBytes: number): Promise<Uint8Array<ArrayBuffer>> {
  const stream = new DecompressionStream('deflate-raw');
  const writer = stream.writable.getWriter();
  // its failure shows at the reading end
  const written = writer
    .write(packed)
    .then(() => writer.close())
    .catch(() => undefined);
  const reader = stream.readable.getReader();
  const parts: Uint8Array[] = [];
  let total = 0;
  try {
    for (let chunk = await reader.read(); !chunk.done; chunk = await reader.read()) {
      total += chunk.value.length;
      if (total > declaredBytes) break;
      parts.push(chunk.value);
    }
  } catch {
    throw new ZipRefused(DAMAGED);
  }
  if (total !== declaredBytes) {
    await reader.cancel().catch(() => undefined);
    throw new ZipRefused(DAMAGED);
  }
  await written;
  return joined(parts);
}

/** Fields of two bytes, but for the check sum, the two sizes and an offset at the end, which have four. */
function record(signature: number, facts: readonly number[], more: readonly number[]): Uint8Array {
  const wide = (index: number, length: number): boolean => index >= length - 5 && index < length - 2;
  const fields = [
    ...facts.map((value, index) => ({ value, bytes: wide(index, facts.length) ? 4 : 2 })),
    ...more.map((value, index) => ({ value, bytes: index >= 3 ? 4 : 2 })),
  ];
  const view = new DataView(new ArrayBuffer(4 + fields.reduce((sum, { bytes }) => sum + bytes, 0)));
  view.setUint32(0, signature, true);
  let at = 4;
  for (const { value, bytes } of fields) {
    if (bytes === 4) view.setUint32(at, value, true);
    else view.setUint16(at, value, true);
    at += bytes;
  }
  return new Uint8Array(view.buffer);
}

function joined(parts: readonly Uint8Array[]): Uint8Array<ArrayBuffer> {
  const whole = new Uint8Array(lengthOf(parts));
  let at = 0;
  for (const part of parts) {
    whole.set(part, at);
    at += part.length;
  }
  return whole;
}

function lengthOf(parts: readonly Uint8Array[]): number {
  return parts.reduce((sum, { length }) => sum + length, 0);
}

/** CRC-32 of ISO 3309 with the reversed polynomial, bit by bit over a table of bytes. */
function crc32(bytes: Uint8Array): number {
  let crc = 0xffffffff;
  for (const byte of bytes) crc = (crc >>> 8) ^ (CRC_OF_BYTE[(crc ^ byte) & 0xff] ?? 0);
  return (crc ^ 0xffffffff) >>> 0;
}

const CRC_OF_BYTE = Uint32Array.from({ length: 256 }, (_, byte) => {
  let crc = byte;
  for (let bit = 0; bit < 8; bit += 1) crc = (crc & 1) === 1 ? (crc >>> 1) ^ 0xedb88320 : crc >>> 1;
  return crc;
});

import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readBlockFile } from './block-file';
import type { SheetCell } from './block-text';
import { readXlsx, writeXlsx } from './xlsx-file';
import { readZip, storeZip, ZIP_LIMITS } from './zip-archive';

const encoder = new TextEncoder();

/** A chosen file as far as reading goes. */
function chosen(bytes: Uint8Array<ArrayBuffer>): Blob {
  return { size: bytes.length, arrayBuffer: () => Promise.resolve(bytes.buffer) } as Partial<Blob> as Blob;
}

async function deflated(bytes: Uint8Array<ArrayBuffer>): Promise<Uint8Array<ArrayBuffer>> {
  const stream = new CompressionStream('deflate-raw');
  const writer = stream.writable.getWriter();
  const written = writer.write(bytes).then(() => writer.close());
  const parts: number[] = [];
  const reader = stream.readable.getReader();
  for (let chunk = await reader.read(); !chunk.done; chunk = await reader.read()) parts.push(...chunk.value);
  await written;
  return Uint8Array.from(parts);
}

/** An archive with one entry that is compressed, as spreadsheets write it, and says of its size what it is told to. */
async function compressedZip(name: string, bytes: Uint8Array<ArrayBuffer>, declared = bytes.length) {
  const packed = await deflated(bytes);
  const zip = storeZip([{ name, bytes: packed }]);
  const view = new DataView(zip.buffer);
  const central = 30 + name.length + packed.length;
  view.setUint16(8, 8, true);
  view.setUint32(22, declared, true);
  view.setUint16(central + 10, 8, true);
  view.setUint32(central + 24, declared, true);
  return zip;
}

describe('a workbook', () => {
  it('comes back as it was written', async () => {
    const cell = fc.oneof(
      fc.string({ unit: 'grapheme' }).map((text) => text.trim()),
      fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e9, max: 1e9 }),
    );
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.array(cell, { minLength: 2, maxLength: 30 }), { minLength: 1, maxLength: 5 }),
        async (rows) => {
          const read = await readXlsx(writeXlsx('Traps', [['Tag', 'x'], ...rows]).buffer);
          if (!read.ok) throw new Error(read.detail);
          const back = read.block.rows.slice(1).map(({ cells }) => cells.map((text) => text.trim()));
          const sent = rows.map((cells) => cells.map(shown)).filter((cells) => cells.some((text) => text !== ''));
          expect(back.map(trimmedRight)).toEqual(sent.map(trimmedRight));
        },
      ),
      { numRuns: 50 },
    );
  });

  it('holds no formula, whatever a text begins with', async () => {
    const [sheet] = await readZip(writeXlsx('x', [['=1+1', '@x', -3]]).buffer, (name) => name.includes('sheet1'));
    const xml = new TextDecoder().decode(sheet?.bytes);
    expect(xml).not.toContain('<f');
    expect(xml).toContain("'=1+1");
    expect(xml).toContain('<v>-3</v>');
  });
});

const shown = (cell: SheetCell): string => (cell === 0 ? '0' : String(cell).replace(/\r\n?/g, '\r'));

function trimmedRight(cells: readonly string[]): string[] {
  const last = cells.findLastIndex((cell) => cell !== '');
  return cells.slice(0, last + 1);
}

describe('an archive', () => {
  it('is unpacked when compressed', async () => {
    const text = 'ab'.repeat(50_000);
    const [entry] = await readZip((await compressedZip('a.xml', encoder.encode(text))).buffer, () => true);
    expect(new TextDecoder().decode(entry?.bytes)).toBe(text);
  });

  it('is refused when it would unpack to too much, by what it declares and by what it does', async () => {
    const honest = await compressedZip('a.xml', encoder.encode('a'), ZIP_LIMITS.unpackedBytes + 1);
    await expect(readZip(honest.buffer, () => true)).rejects.toThrow('unpacks to more than 40 MB');
    const lying = await compressedZip('a.xml', encoder.encode('a'.repeat(1_000_000)), 1_000);
    await expect(readZip(lying.buffer, () => true)).rejects.toThrow('damaged');
  });

  it('is refused wherever it is cut off', async () => {
    const whole = await compressedZip('a.xml', encoder.encode('some text'));
    for (let length = 0; length < whole.length; length += 1)
      await expect(readZip(whole.slice(0, length).buffer, () => true)).rejects.toThrow('damaged');
  });
});

describe('a chosen file', () => {
  it('is read by its content', async () => {
    const csv = await readBlockFile(chosen(encoder.encode('Tag;Load\nTR-1;5')));
    expect(csv.ok && csv.block.rows.length).toBe(2);
    const xlsx = await readBlockFile(chosen(writeXlsx('x', [['Tag'], ['TR-1']])));
    expect(xlsx.ok && xlsx.block.rows.length).toBe(2);
    // 0xE9 is é in windows-1252 and no UTF-8
    const western = await readBlockFile(chosen(Uint8Array.of(0x54, 0x61, 0x67, 0x0a, 0xe9)));
    expect(western.ok && western.block.rows[1]?.cells).toEqual(['é']);
  });

  it.each([
    ['an old workbook', Uint8Array.of(0xd0, 0xcf, 0x11, 0xe0, 0xa1), '.xls'],
    ['a picture', Uint8Array.of(0x89, 0x50, 0x4e, 0x47, 0x00), 'neither a text nor a spreadsheet'],
    ['too large a file', new Uint8Array(5_000_001).fill(65), '5 MB are the most'],
    ['another archive', storeZip([{ name: 'a.txt', bytes: encoder.encode('a') }]), 'no spreadsheet is in it'],
    ['a broken workbook', storeZip([{ name: 'xl/workbook.xml', bytes: encoder.encode('<a') }]), 'cannot be read'],
  ])('is refused in words: %s', async (_, bytes, words) => {
    const read = await readBlockFile(chosen(bytes));
    expect(read.ok ? '' : `${read.title} ${read.detail}`).toContain(words);
  });
});

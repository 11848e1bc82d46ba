import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readBlockFile } from './block-file';
import type { SheetCell } from './block-text';
import { readXlsx, writeXlsx } from './xlsx-file';
import { readZip, writeZip, ZIP_LIMITS } from './zip-archive';

const encoder = new TextEncoder();

/** A chosen file as far as reading goes. */
function chosen(bytes: Uint8Array<ArrayBuffer>): Blob {
  return { size: bytes.length, arrayBuffer: () => Promise.resolve(bytes.buffer) } as Partial<Blob> as Blob;
}

/** An archive of one entry that says of its size what it is told to. */
function zipDeclaring(name: string, bytes: Uint8Array, declared: number): Uint8Array<ArrayBuffer> {
  const zip = writeZip({ [name]: bytes });
  const view = new DataView(zip.buffer);
  // APPNOTE.TXT (PKWARE), 4.3.16: the directory's offset stands 16 bytes into the 22 at the end; 4.3.12: the size 24 into its entry
  view.setUint32(view.getUint32(zip.length - 6, true) + 24, declared, true);
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

  it('holds no formula, whatever a text begins with', () => {
    const entries = readZip(writeXlsx('x', [['=1+1', '@x', -3]]), (name) => name.includes('sheet1'));
    const xml = new TextDecoder().decode(entries['xl/worksheets/sheet1.xml']);
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
  it('is unpacked when compressed', () => {
    const text = 'ab'.repeat(50_000);
    const zip = writeZip({ 'a.xml': encoder.encode(text) });
    expect(zip.length).toBeLessThan(2_000);
    expect(new TextDecoder().decode(readZip(zip, () => true)['a.xml'])).toBe(text);
  });

  it('is refused when it declares too much, and gives no more than it declares', () => {
    const honest = zipDeclaring('a.xml', encoder.encode('a'), ZIP_LIMITS.unpackedBytes + 1);
    expect(() => readZip(honest, () => true)).toThrow('unpacks to more than 40 MB');
    const lying = zipDeclaring('a.xml', encoder.encode('a'.repeat(1_000_000)), 1_000);
    expect(readZip(lying, () => true)['a.xml']?.length).toBe(1_000);
    const many = Object.fromEntries(
      Array.from({ length: ZIP_LIMITS.entries + 1 }, (_, i) => [`${String(i)}.xml`, encoder.encode('a')]),
    );
    expect(() => readZip(writeZip(many), () => true)).toThrow('unpacks to more than');
  });

  it('is refused wherever it is cut off', () => {
    const whole = writeZip({ 'a.xml': encoder.encode('some text') });
    for (let length = 0; length < whole.length; length += 1)
      expect(() => readZip(whole.slice(0, length), () => true)).toThrow('damaged');
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
    ['another archive', writeZip({ 'a.txt': encoder.encode('a') }), 'no spreadsheet is in it'],
    ['a broken workbook', writeZip({ 'xl/workbook.xml': encoder.encode('<a') }), 'cannot be read'],
  ])('is refused in words: %s', async (_, bytes, words) => {
    const read = await readBlockFile(chosen(bytes));
    expect(read.ok ? '' : `${read.title} ${read.detail}`).toContain(words);
  });
});

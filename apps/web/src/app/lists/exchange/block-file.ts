import { type ReadBlock, readCsv } from './block-text';

/** More than a list of 5,000 rows takes. */
export const LARGEST_FILE_BYTES = 5_000_000;

const ZIP_START = [0x50, 0x4b, 0x03, 0x04] as const;
/** Of the compound files that spreadsheets wrote before 2007, and of password-protected ones since. */
const COMPOUND_START = [0xd0, 0xcf, 0x11, 0xe0] as const;

/** What a chosen file is, by its content whatever its name says, and the rows in it. */
export async function readBlockFile(file: Blob): Promise<ReadBlock> {
  if (file.size > LARGEST_FILE_BYTES)
    return refused(
      `It has ${(file.size / 1e6).toFixed(1)} MB; ${String(LARGEST_FILE_BYTES / 1e6)} MB are the most. Save only the sheet with the rows.`,
    );
  const buffer = await file.arrayBuffer();
  const bytes = new Uint8Array(buffer);
  if (beginsWith(bytes, COMPOUND_START))
    return refused(
      'It is of the older kind (.xls) or protected by a password. Save it as .xlsx without a password, or as CSV.',
    );
  if (beginsWith(bytes, ZIP_START)) {
    const { readXlsx } = await import('./xlsx-file');
    return readXlsx(buffer);
  }
  if (bytes.includes(0)) return refused('It is neither a text nor a spreadsheet. Choose a .xlsx or a CSV file.');
  return readCsv(decoded(bytes));
}

/** UTF-8, or what spreadsheets on western machines write when they are not asked for it. */
function decoded(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return new TextDecoder('windows-1252').decode(bytes);
  }
}

function beginsWith(bytes: Uint8Array, start: readonly number[]): boolean {
  return start.every((byte, index) => bytes[index] === byte);
}

function refused(detail: string): ReadBlock {
  return { ok: false, title: 'The file cannot be read', detail };
}

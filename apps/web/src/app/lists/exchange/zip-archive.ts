import { FlateErrorCode, type FlateError, unzipSync, type Unzipped, zipSync, type Zippable } from 'fflate';

/** What a spreadsheet file may unpack to. A workbook of 5,000 rows stays far below; a file made to exhaust memory does not. */
export const ZIP_LIMITS = { entries: 1_000, unpackedBytes: 40_000_000 } as const;

/** Why an archive is refused, in words for the person who chose it. */
export class ZipRefused extends Error {}

/** The first of January 1980, the earliest that an archive can say, so that the same rows give the same file. */
const FIRST_DATE = new Date(1980, 0, 1);

/**
 * Unpacks the wanted entries of a zip archive on this thread. What the directory declares is held against the limits before an entry is
 * unpacked; one that holds more than it declared is cut there.
 * @throws ZipRefused
 */
export function readZip(archive: Uint8Array, wanted: (name: string) => boolean): Unzipped {
  let entries = 0;
  let unpackedBytes = 0;
  try {
    return unzipSync(archive, {
      filter: ({ name, originalSize }) => {
        entries += 1;
        unpackedBytes += originalSize;
        if (entries > ZIP_LIMITS.entries || unpackedBytes > ZIP_LIMITS.unpackedBytes)
          throw new ZipRefused(
            `It unpacks to more than ${String(ZIP_LIMITS.unpackedBytes / 1e6)} MB. Save only the sheet with the rows, or as CSV.`,
          );
        return wanted(name);
      },
    });
  } catch (error) {
    if (error instanceof ZipRefused) throw error;
    throw new ZipRefused(
      isOf(error, FlateErrorCode.UnknownCompressionMethod)
        ? 'It is packed in a way that spreadsheets do not use. Save it once more.'
        : 'The file is damaged: it ends early or was changed on the way. Save it once more.',
    );
  }
}

/** Packs entries on this thread, compressed unless `level` is 0. */
export function writeZip(entries: Zippable, level: 0 | 6 = 6): Uint8Array<ArrayBuffer> {
  return zipSync(entries, { level, mtime: FIRST_DATE });
}

function isOf(error: unknown, code: number): boolean {
  return error instanceof Error && (error as Partial<FlateError>).code === code;
}

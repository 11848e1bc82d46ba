import { readFileSync } from 'node:fs';
import { parse } from 'csv-parse/sync';

/** Rows of a fixture below tests/fixtures/steam, by column name; the lines that begin with # name its source. */
export function readSteamFixture(name: string): Record<string, string>[] {
  const text = readFileSync(new URL(`../fixtures/steam/${name}`, import.meta.url), 'utf8');
  return parse<Record<string, string>>(text, {
    columns: true,
    comment: '#',
    comment_no_infix: true,
    // the source line ends in LF, the rows in CRLF
    record_delimiter: ['\r\n', '\n'],
  });
}

/** The same where every column is a number. */
export function readSteamNumbers(name: string): Record<string, number>[] {
  return readSteamFixture(name).map((row) =>
    Object.fromEntries(Object.entries(row).map(([column, text]) => [column, Number(text)])),
  );
}

/** A column that must be there: NaN otherwise, which no comparison lets pass. */
export function column(row: Record<string, number>, name: string): number {
  return row[name] ?? NaN;
}

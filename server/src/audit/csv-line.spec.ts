import { parse } from 'csv-parse/sync';
import { expect, it } from 'vitest';
import { csvLine } from './csv-line';

it('is read back by another reader as it was', () => {
  const cells = ['plain', 'with, comma', 'with "quotes"', 'two\nlines', '', '1.5', 'Ågren'];
  expect(parse(csvLine(cells))).toEqual([cells]);
});

// the characters that OWASP's page on CSV injection names (from memory)
it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\tx', '\rx', '=HYPERLINK("http://a.example","b")'])(
  'lets no spreadsheet run %j',
  (cell) => {
    expect(parse(csvLine([cell, 'x']))).toEqual([[`'${cell}`, 'x']]);
  },
);

import { FILE_PARTS, findings, emptyDocument, keysOf, type ElementKey, type FilePart } from '@riseback/network';
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const page = readFileSync(new URL('../../docs/network-file.md', import.meta.url), 'utf8');

/** The rows of the first table under a heading, as cells. */
function tableUnder(heading: string): string[][] {
  const section = page.split(/^## /m).find((text) => text.startsWith(`${heading}\n`)) ?? '';
  const rows = section.split('\n').filter((line) => line.startsWith('|'));
  return rows.slice(2).map((row) =>
    row
      .split('|')
      .slice(1, -1)
      .map((cell) => cell.trim()),
  );
}

function row({ key, presence, default: value }: ElementKey): string[] {
  // a default that is more than one plain value is told in words
  const hasWords = presence === 'defaulted' && (value === undefined || key === 'site' || key === 'method');
  return [`\`${key}\``, presence, ...(hasWords ? [] : [value === undefined ? '' : `\`${JSON.stringify(value)}\``])];
}

describe('docs/network-file.md', () => {
  it.each(Object.keys(FILE_PARTS) as FilePart[])('tells the keys of %s as its schema has them', (part) => {
    const expected = keysOf(part).map(row);
    const told = tableUnder(part).map((cells, i) => cells.slice(0, expected[i]?.length ?? 4));
    expect(told).toEqual(expected);
  });

  it('lists the finding of an empty network', () => {
    const codes = new Set(tableUnder('Findings').map((cells) => cells[0]));
    for (const { code } of findings(emptyDocument('Empty'))) expect(codes).toContain(`\`${code}\``);
  });
});

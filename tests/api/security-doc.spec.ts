import { existsSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const page = readFileSync('docs/security.md', 'utf8');

/** How many requirements of levels 1 and 2 each section of ASVS 5.0.0 has; in every section those of level 3 come after them. */
const SECTIONS: Readonly<Record<string, readonly number[]>> = {
  V1: [2, 9, 11, 3, 2],
  V2: [3, 3, 4, 1],
  V3: [0, 2, 4, 6, 5, 0, 2],
  V4: [3, 1, 2, 4],
  V5: [1, 3, 2, 3],
  V6: [3, 12, 4, 4, 5, 3, 0, 4],
  V7: [3, 4, 2, 5, 2, 2],
  V8: [2, 3, 1, 1],
  V9: [3, 4],
  V10: [2, 2, 4, 11, 5, 2, 3],
  V11: [2, 3, 3, 4, 1, 1],
  V12: [3, 2, 4],
  V13: [1, 5, 2, 5],
  V14: [2, 4, 3],
  V15: [3, 3, 7],
  V16: [1, 5, 4, 3, 3],
  V17: [1, 4, 2],
};
const requirements = Object.entries(SECTIONS).flatMap(([chapter, sections]) =>
  sections.flatMap((count, section) =>
    Array.from({ length: count }, (_, i) => `${chapter}.${String(section + 1)}.${String(i + 1)}`),
  ),
);

const rows = page
  .split('\n')
  .filter((line) => line.startsWith('|'))
  .map((line) =>
    line
      .split('|')
      .slice(1, -1)
      .map((cell) => cell.trim()),
  );
/** Rows of the list, each with the numbers that stand first in it. */
const asvs = rows
  .map(([first = '', second = '']) => ({
    numbers: first.match(/^V\d+(?:\.\d+)*(?:, V\d+(?:\.\d+)*)*/)?.[0].split(', ') ?? [],
    second,
  }))
  .filter(({ numbers }) => numbers.length > 0);

const references = [...page.matchAll(/`([\w./-]+)` › “([^”]+)”/g)].map(([, file = '', title = '']) => ({
  file,
  title,
}));

function pathOf(file: string): string {
  const inTests = ['api', 'faults', 'browser', 'properties', 'validation'].includes(file.split('/', 1)[0] ?? '');
  return `${inTests ? 'tests/' : ''}${file}.spec.ts`;
}

/** The titles of a spec as they are written, parameters and all. */
function titlesOf(path: string): string[] {
  const text = readFileSync(path, 'utf8');
  // it('…', or the second call of it.each(…)('…',
  const found = text.matchAll(/(?:\b(?:it|test)|\))\(\s*(['"`])((?:\\.|(?!\1).)+)\1\s*,/g);
  return [...found].map(([, , title = '']) => title);
}

describe('docs/security.md', () => {
  it('names many tests', () => {
    expect(references.length).toBeGreaterThan(150);
    expect(page.match(/›/g)).toHaveLength(references.length);
  });

  it.each([...new Set(references.map(({ file }) => file))])('names only tests that %s has', (file) => {
    const path = pathOf(file);
    expect(existsSync(path), path).toBe(true);
    const titles = titlesOf(path);
    for (const { title } of references.filter((each) => each.file === file)) expect(titles).toContain(title);
  });

  it('has every requirement of levels 1 and 2 once, by itself or in a group that does not apply', () => {
    // 345 requirements in release 5.0.0, 92 of them of level 3 alone
    expect(requirements).toHaveLength(253);
    const named = asvs.flatMap(({ numbers }) => numbers);
    const lines = (number: string) => named.filter((one) => number === one || number.startsWith(`${one}.`));
    expect(requirements.filter((number) => lines(number).length !== 1)).toEqual([]);
    expect(
      named.filter((one) => !requirements.some((number) => number === one || number.startsWith(`${one}.`))),
    ).toEqual([]);
  });

  it('says of each what holds it: a test, a document, a dated deviation, or why it does not apply', () => {
    for (const { numbers, second } of asvs) {
      expect(second, numbers.join()).toMatch(
        /^(?:As V|`[\w./-]+` › “|Written: `|Deviation \d{4}-\d\d-\d\d: .{9}|Not applicable: .{9})/,
      );
    }
    for (const [, path = ''] of page.matchAll(/Written: `([^`]+)`/g)) expect(existsSync(path), path).toBe(true);
    for (const [, name = ''] of page.matchAll(/Written: `docs\/security\.md`, ([^|]+)/g))
      expect(page.toLowerCase()).toMatch(new RegExp(`(\\*\\*|## )${name.trim().toLowerCase()}`));
  });
});

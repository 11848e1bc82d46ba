import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { METHOD_SECTIONS } from '@riseback/methods';

const docs = new URL('../../docs/methods/', import.meta.url);
const page = (name: string): string => readFileSync(new URL(`${name}.md`, docs), 'utf8');
/** Spaces and the quotation marks around words are the view's own; a dash at a letter is typed either way. */
const bare = (text: string): string => text.replace(/[\s"]/g, '').replaceAll("'", '′');

// The Method view and docs/methods say the same thing twice; here neither can drift from the other.
describe('the Method view and docs/methods', () => {
  const equations = METHOD_SECTIONS.flatMap(({ id, page: name, equations: all = [] }) =>
    all.map((equation) => ({ id, name, equation })),
  );

  it.each(equations)('$id: $equation', ({ name, equation }) => {
    expect(bare(page(name))).toContain(bare(equation));
  });

  it.each(METHOD_SECTIONS)('names a page for $id that there is', ({ page: name }) => {
    expect(page(name)).toMatch(/^# /);
  });

  it('explains every check that docs/methods/checks.md lists', () => {
    const codes = [...page('checks').matchAll(/^\| `([a-zA-Z]+)` /gm)].map(([, code]) => `check-${code ?? ''}`);
    const ids = METHOD_SECTIONS.map(({ id }) => id);
    expect(codes.length).toBeGreaterThan(10);
    expect(codes.filter((id) => !ids.includes(id))).toEqual([]);
  });
});

import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { demandSmallStart, initialJavaScript, MOST_INITIAL_KB } from '../../server/initial-javascript.mjs';

/** Hexadecimal digits of chance: two to a byte of information, so that gzip halves them at best. */
const incompressible = (kB: number) => `const x="${randomBytes(kB * 1000).toString('hex')}";`;

describe('the size of the first page', () => {
  let folder = '';
  const put = (name: string, content: string) => writeFileSync(join(folder, name), content);

  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), 'riseback-size-'));
    put(
      'index.html',
      '<link rel="modulepreload" href="chunk-A.js"><script src="main-1.js" type="module"></script><link href="styles.css">',
    );
    put('main-1.js', 'import{a as t}from"./chunk-A.js";import"./chunk-B.js";const p=()=>import("./chunk-LATER.js");');
    put('chunk-A.js', 'export{b}from"./chunk-B.js";');
    put('chunk-B.js', 'export const b=1;');
    put('chunk-LATER.js', incompressible(400));
  });
  afterEach(() => rmSync(folder, { recursive: true }));

  it('counts what is imported before anything runs, each file once, and nothing that comes later', () => {
    expect([...initialJavaScript(folder).files].sort()).toEqual(['chunk-A.js', 'chunk-B.js', 'main-1.js']);
  });

  it('lets a small start pass and says its size', () => {
    const lines: string[] = [];
    demandSmallStart(folder, (line: string) => lines.push(line));
    expect(lines.join()).toMatch(/^Initial JavaScript: 0\.\d kB gzip in 3 files, of 300 kB at most$/);
  });

  it('refuses one that is too large, also where the weight is imported by an import', () => {
    expect(MOST_INITIAL_KB).toBe(300);
    put('chunk-B.js', incompressible(310));
    expect(() => demandSmallStart(folder, () => undefined)).toThrow(
      /Initial JavaScript: 3\d\d\.\d kB gzip .* of 300 kB/,
    );
  });
});

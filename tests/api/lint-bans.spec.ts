import { readFileSync } from 'node:fs';
import { ESLint, type Linter } from 'eslint';
import tseslint from 'typescript-eslint';
import { beforeAll, describe, expect, it } from 'vitest';

const SERVER = 'server/src/sites/site-repository.ts';
const SERVICE = 'server/src/sites/site-service.ts';
const LIBRARY = 'libs/network/src/layout.ts';
const PAGES = 'apps/web/src/app/shared/problem.ts';
const TESTS = 'tests/api/test-server.ts';

let eslint: ESLint;
beforeAll(() => {
  // Without the rules that need types: none of these does, and they take most of the time.
  const untyped = tseslint.configs.disableTypeChecked as Linter.Config;
  const angular: Linter.Config = {
    files: ['apps/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: { '@angular-eslint/no-uncalled-signals': 'off', '@angular-eslint/no-experimental': 'off' },
  };
  eslint = new ESLint({ overrideConfig: [untyped, angular] });
});

async function complaints(text: string, filePath: string): Promise<string[]> {
  const [result] = await eslint.lintText(text, { filePath });
  return (result?.messages ?? []).map(({ ruleId, message }) => `${String(ruleId)}: ${message}`);
}

const banned = [
  'xlsx',
  'exceljs',
  'bcrypt',
  'moment',
  'moment-timezone',
  'lodash',
  'lodash/merge',
  'lodash.merge',
  'request',
  'node-fetch',
  'axios',
  'uuid',
  'crypto-js',
  'body-parser',
  'csurf',
  'passport-local',
  'vm2',
];

describe('a package that must not come in', () => {
  const imports = banned.map((name, i) => `import * as it${String(i)} from '${name}';`);
  const uses = banned.map((_name, i) => `it${String(i)}`);
  const text = `${imports.join('\n')}\nexport const used: unknown[] = [${uses.join(', ')}];\n`;

  it.each([SERVER, SERVICE, LIBRARY, PAGES, TESTS])('is refused in %s, with what to take instead', async (file) => {
    const found = await complaints(text, file);
    for (const name of banned) {
      const refusal = found.find((line) => line.startsWith(`no-restricted-imports: '${name}' import is restricted`));
      expect(refusal, name).toMatch(/[Tt]ake |Bodies are read by|have fetch|the language has|are those of/);
    }
  });

  it('stands in no package file either', () => {
    const packageFile = JSON.parse(readFileSync('package.json', 'utf8')) as Record<string, Record<string, string>>;
    const names = Object.keys({ ...packageFile['dependencies'], ...packageFile['devDependencies'] });
    expect(names.filter((name) => banned.includes(name))).toEqual([]);
  });

  it('does not take a file of ours along that is called alike', async () => {
    expect(await complaints(`export * from './uuid';\n`, LIBRARY)).toEqual([]);
    expect(await complaints(`import { z } from 'zod';\nexport const used = z;\n`, LIBRARY)).toEqual([]);
  });
});

describe('what must not be done', () => {
  it.each([
    {
      what: 'a program started',
      file: SERVER,
      text: `import { exec } from 'node:child_process';\nexport const a = exec;`,
    },
    { what: 'a program started', file: SERVICE, text: `import { exec } from 'child_process';\nexport const a = exec;` },
    {
      what: 'a text run',
      file: SERVER,
      text: `import { runInNewContext } from 'node:vm';\nexport const a = runInNewContext;`,
    },
    { what: 'a text run', file: PAGES, text: `export const a = new Function('return 1') as unknown;` },
    { what: 'a text run', file: LIBRARY, text: `export const a = eval('1') as unknown;` },
    { what: 'a guessable value', file: SERVER, text: `export const id = Math.random().toString(36);` },
    {
      what: 'raw SQL',
      file: SERVER,
      text: `import { sql } from 'drizzle-orm';\nexport const a = (b: string) => sql.raw(b);`,
    },
    {
      what: 'SQL from pieces',
      file: SERVER,
      text: 'export const a = (db: { exec(s: string): void }, b: string) => { db.exec(`delete from ${b}`); };',
    },
    {
      what: 'markup from data',
      file: PAGES,
      text: `export const a = (e: Element, t: string) => { e.innerHTML = t; };`,
    },
    {
      what: 'markup from data',
      file: PAGES,
      text: `export const a = (e: Element, t: string) => { e.insertAdjacentHTML('beforeend', t); };`,
    },
    {
      what: 'trust by hand',
      file: PAGES,
      text: `import { DomSanitizer } from '@angular/platform-browser';\nexport const a = (s: DomSanitizer, t: string) => s.bypassSecurityTrustHtml(t);`,
    },
    { what: 'a written document', file: PAGES, text: `export const a = (t: string) => { document.write(t); };` },
    { what: 'an address that runs', file: PAGES, text: `export const a = 'javascript:alert(1)';` },
    {
      what: 'a weak hash',
      file: SERVER,
      text: `import { createHash } from 'node:crypto';\nexport const a = createHash('md5');`,
    },
    {
      what: 'a hash by a name that comes in',
      file: SERVER,
      text: `import { createHmac } from 'node:crypto';\nexport const a = (n: string) => createHmac(n, 'k');`,
    },
    { what: 'an expression from a text', file: SERVER, text: `export const a = (t: string) => new RegExp(t);` },
    { what: 'a request of its own', file: SERVER, text: `export const a = (u: string) => fetch(u);` },
    { what: 'settings read anywhere', file: SERVER, text: `export const a = process.env['HOME'];` },
    {
      what: 'a route without its rule',
      file: SERVER,
      text: `import { Router } from 'express';\nconst router = Router();\nrouter.get('/x', (_req, res) => { res.end(); });\nexport const a = router;`,
    },
  ])('$what, in $file: $text', async ({ file, text }) => {
    const found = await complaints(`${text}\n`, file);
    expect(found.join('\n')).toMatch(
      /no-restricted-(imports|syntax|properties|globals)|no-eval|no-new-func|no-script-url/,
    );
  });

  it('markup from data in a template, in a file of its own or inline', async () => {
    const inFile = await complaints('<p [innerHTML]="text()"></p>\n', 'apps/web/src/app/app.html');
    expect(inFile.join('\n')).toContain('Text is shown as text');
    const inline = `import { ChangeDetectionStrategy, Component, signal } from '@angular/core';
@Component({ selector: 'app-a', changeDetection: ChangeDetectionStrategy.OnPush, template: '<p [innerHTML]="text()"></p>' })
export class A { protected readonly text = signal(''); }
`;
    expect((await complaints(inline, PAGES)).join('\n')).toContain('Text is shown as text');
  });
});

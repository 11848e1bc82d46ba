import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

interface Component {
  readonly 'bom-ref': string;
  readonly version: string;
  readonly purl: string;
  readonly licenses?: readonly object[];
  readonly hashes?: readonly { readonly alg: string }[];
  readonly properties: readonly { readonly name: string; readonly value: string }[];
}
interface Bill {
  readonly bomFormat: string;
  readonly metadata: { readonly component: { readonly name: string; readonly version: string } };
  readonly components: readonly Component[];
  readonly dependencies: readonly { readonly ref: string; readonly dependsOn: readonly string[] }[];
}
interface PackageFile {
  readonly version: string;
  readonly dependencies: Readonly<Record<string, string>>;
  readonly devDependencies: Readonly<Record<string, string>>;
}

const packageFile = JSON.parse(readFileSync('package.json', 'utf8')) as PackageFile;
let folder = '';
let bill: Bill;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'riseback-sbom-'));
  const file = join(folder, 'sbom.json');
  execFileSync(process.execPath, ['server/sbom.mjs', file]);
  bill = JSON.parse(readFileSync(file, 'utf8')) as Bill;
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

const find = (name: string) => bill.components.find((component) => component['bom-ref'].startsWith(`${name}@`));
/** Of a package that another brings along in a version of its own, ours. */
const findOurs = (name: string, version: string) =>
  bill.components.find((component) => component['bom-ref'] === `${name}@${version}`);
const shippedIn = (component: Component | undefined) =>
  component?.properties.find(({ name }) => name === 'riseback:shippedIn')?.value.split(' ') ?? [];
const isOurs = (component: Component) => component['bom-ref'].startsWith('@riseback/');

describe('the bill of materials', () => {
  it('is CycloneDX of this version of the program', () => {
    expect(bill.bomFormat).toBe('CycloneDX');
    expect(bill.metadata.component).toMatchObject({ name: 'riseback', version: packageFile.version });
  });

  it('names everything that the server loads, with its version, licence and hash', () => {
    for (const [name, version] of Object.entries(packageFile.dependencies)) {
      const component = findOurs(name, version);
      expect(component, name).toMatchObject({ version, purl: `pkg:npm/${name.replace('@', '%40')}@${version}` });
      expect(shippedIn(component), name).toContain('server');
    }
    // Two that a development tool needs too, which npm's own --omit=dev leaves out, and one that only they bring.
    for (const name of ['express', 'zod', 'qs']) expect(find(name), name).toBeDefined();
    for (const component of bill.components.filter((each) => !isOurs(each))) {
      expect(component.licenses?.length, component['bom-ref']).toBeGreaterThan(0);
      expect(component.hashes?.[0]?.alg, component['bom-ref']).toBe('SHA-512');
    }
  });

  it('names what is built into the pages, and no tool', () => {
    const inPages = [
      '@angular/core',
      '@angular/material',
      'rxjs',
      'idb',
      '@swimlane/ngx-graph',
      '@fontsource/inter',
      'dagre',
    ];
    for (const name of inPages) expect(shippedIn(find(name)), name).toContain('pages');
    for (const name of ['@angular/core', 'rxjs']) expect(find(name)?.version).toBe(packageFile.devDependencies[name]);
    for (const name of ['@angular/cli', 'vitest', 'eslint', 'typescript', 'fast-check', '@types/node'])
      expect(find(name), name).toBeUndefined();
  });

  it('says which component needs which, naming none that it does not hold', () => {
    const held = new Set(bill.components.map((component) => component['bom-ref']));
    expect(held.size).toBe(bill.components.length);
    for (const { dependsOn } of bill.dependencies) for (const ref of dependsOn) expect(held).toContain(ref);
  });
});

// npm run sbom [-- FILE]: the bill of materials of what is shipped, as CycloneDX JSON; out/sbom.json unless told otherwise.
// `npm sbom --omit=dev` leaves out every package that a development tool needs too (Express and zod among them) and all that is
// built into the pages, so the whole list is taken and cut down here to what the server loads and what the pages hold.
import { execFileSync } from 'node:child_process';
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { root } from './install.mjs';

/** A package's name in an import, in `@use`, or as the place of a file in angular.json. */
const NAMED = /(?:\bfrom|\bimport|@use|@import|"node_modules\/)[\s(]*['"]?((?:@[\w.-]+\/)?[\w][\w.-]*)/g;
/** Packages whose licence stands in their LICENSE file and not in their package.json. */
const TOLD_BY_ITS_FILE = new Map([['png-js', { id: 'MIT' }]]);
const NOT_SHIPPED = /\.spec\.ts$|\/test-setup\.ts$|\/(node_modules|testing)\//;

const json = (path) => JSON.parse(readFileSync(join(root, path), 'utf8'));
const { name, version, license, dependencies } = json('package.json');
const target = resolve(process.argv[2] ?? join(root, 'out', 'sbom.json'));
const whole = everything();
const needs = needsByRef();

const inServer = reachable(Object.keys(dependencies));
const inPages = reachable(namedByPages());
const components = whole.components.filter(isShipped).map(described);
const kept = new Set([`${name}@${version}`, ...components.map((component) => component['bom-ref'])]);
const bill = {
  ...whole,
  metadata: { ...whole.metadata, component: licensed({ ...whole.metadata.component, name }, { name: license }) },
  components,
  dependencies: whole.dependencies
    .filter(({ ref }) => kept.has(ref))
    .map(({ ref, dependsOn = [] }) => ({ ref, dependsOn: dependsOn.filter((to) => kept.has(to)) })),
};
mkdirSync(dirname(target), { recursive: true });
writeFileSync(target, `${JSON.stringify(bill, null, 2)}\n`);
process.stdout.write(`${components.length} components in ${target}\n`);

/** npm's own list of all that the lock file holds. It asks no registry. */
function everything() {
  const args = ['sbom', '--sbom-format', 'cyclonedx', '--sbom-type', 'application', '--package-lock-only'];
  const options = { cwd: root, encoding: 'utf8', maxBuffer: 2 ** 28, stdio: ['ignore', 'pipe', 'inherit'] };
  return JSON.parse(execFileSync('npm', args, options));
}

/** What each package brings along. Not what it expects to find (peers): a library that goes with a build tool does not ship it. */
function needsByRef() {
  const brought = new Map();
  for (const [path, entry] of Object.entries(json('package-lock.json').packages)) {
    const ref = `${entry.name ?? path.replace(/^.*node_modules\//, '')}@${entry.version}`;
    const names = Object.keys({ ...entry.dependencies, ...entry.devDependencies, ...entry.optionalDependencies });
    brought.set(ref, [...(brought.get(ref) ?? []), ...names]);
  }
  // Our own libraries are of the root, which lists them without a dependency.
  const own = (to) => to.startsWith(`@${name}/`);
  return new Map(
    whole.dependencies.map(({ ref, dependsOn = [] }) => {
      const names = new Set(brought.get(ref));
      return [ref, dependsOn.filter((to) => own(to) || names.has(nameOf(to)))];
    }),
  );
}

function reachable(names) {
  const wanted = new Set(names);
  const waiting = needs.get(`${name}@${version}`).filter((ref) => wanted.has(nameOf(ref)));
  const found = new Set();
  for (let ref = waiting.pop(); ref !== undefined; ref = waiting.pop()) {
    if (found.has(ref)) continue;
    found.add(ref);
    waiting.push(...(needs.get(ref) ?? []));
  }
  return found;
}

function namedByPages() {
  const sources = ['apps/web/src', 'libs'].flatMap((folder) =>
    readdirSync(join(root, folder), { recursive: true })
      .map((path) => `${folder}/${String(path).replaceAll('\\', '/')}`)
      .filter((path) => /\.(ts|scss|css)$/.test(path) && !NOT_SHIPPED.test(path)),
  );
  return ['angular.json', ...sources].flatMap((path) => {
    const text = readFileSync(join(root, path), 'utf8');
    return [...text.matchAll(NAMED)].map(([, named]) => named);
  });
}

function isShipped(component) {
  return inServer.has(component['bom-ref']) || inPages.has(component['bom-ref']);
}

function described(component) {
  const ref = component['bom-ref'];
  const parts = [...(inServer.has(ref) ? ['server'] : []), ...(inPages.has(ref) ? ['pages'] : [])];
  const properties = [...(component.properties ?? []), { name: 'riseback:shippedIn', value: parts.join(' ') }];
  // ours come under the licence of the whole
  const told = ref.startsWith(`@${name}/`) ? { name: license } : TOLD_BY_ITS_FILE.get(nameOf(ref));
  return { ...(told === undefined ? component : licensed(component, told)), properties };
}

function licensed(component, told) {
  return { ...component, licenses: [{ license: told }] };
}

function nameOf(ref) {
  return ref.slice(0, ref.lastIndexOf('@'));
}

// Makes node_modules match the package files and this Node.js, with built-ins only: it runs before anything is installed.
import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { withLock } from './work-lock.mjs';

export const root = fileURLToPath(new URL('..', import.meta.url));
const modules = join(root, 'node_modules');
const stamp = join(modules, '.riseback-install');
// not in node_modules, which npm ci empties
const lock = join(root, 'out', 'installing');

/** Stops with advice when this Node.js is not one that the packages run on. */
export function demandNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major === 20 && minor >= 19) return;
  process.stderr.write(
    `Riseback needs Node.js 20.19 or a later 20; this is ${process.version}. Install that and start again.\n`,
  );
  process.exit(1);
}

/** What node_modules must have been made from: the package files and the ABI that native packages were compiled for. */
function wantedStamp() {
  const hash = createHash('sha256').update(process.versions.modules);
  const libraries = readdirSync(join(root, 'libs')).map((name) => `libs/${name}/package.json`);
  for (const file of ['package.json', 'package-lock.json', '.npmrc', ...libraries.sort()]) {
    if (existsSync(join(root, file))) hash.update(file).update(readFileSync(join(root, file)));
  }
  return hash.digest('hex');
}

function isInstalled(wanted) {
  return existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted;
}

/** Installs when needed. `log` takes one line; npm's own output goes to standard error. */
export async function ensureInstalled(log) {
  const wanted = wantedStamp();
  if (isInstalled(wanted)) return;
  await withLock(lock, log, async () => {
    if (isInstalled(wanted)) return;
    log('Installing packages (a few minutes the first time) …');
    const { code, output } = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund']);
    if (code !== 0) {
      if (/node-gyp|gyp ERR|not found: make|g\+\+|python/i.test(output)) {
        process.stderr.write(
          '\nThe database driver could not be compiled. On Debian or Ubuntu install its tools and start again:\n  apt-get install -y python3 make g++\n',
        );
      }
      throw new Error('npm ci failed; its messages stand above.');
    }
    writeFileSync(stamp, wanted);
  });
}

/** Runs a command with all its output on standard error; keeps the output to tell why it failed. */
function run(command, args) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd: root, stdio: ['ignore', 'pipe', 'pipe'] });
    let output = '';
    const take = (chunk) => {
      output += chunk;
      process.stderr.write(chunk);
    };
    child.stdout.on('data', take);
    child.stderr.on('data', take);
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, output }));
  });
}

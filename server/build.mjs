// Builds the pages (ng build) and the server (esbuild) into `dist`, when their sources have changed.
import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { brotliCompressSync, gzipSync } from 'node:zlib';
import { demandSmallStart } from './initial-javascript.mjs';
import { ensureInstalled, root } from './install.mjs';
import { withLock } from './work-lock.mjs';

const dist = join(root, 'dist');
const stamp = join(dist, '.riseback-build');

/** Whatever can change what is built. */
const SOURCES = ['apps', 'libs', 'server', 'angular.json', 'package.json', 'package-lock.json', 'tsconfig.json'];
const NO_SOURCE = /(^|\/)(node_modules|\.angular)(\/|$)|\.spec\.ts$|\.md$/;

/** Builds when the sources are not those that `dist` was built from. `log` takes one line. */
export async function ensureBuilt(log) {
  const wanted = hashOfSources();
  if (isBuilt(wanted)) return;
  await withLock(join(root, 'out', 'building'), log, async () => {
    // another process may have built meanwhile
    if (!isBuilt(wanted)) await build(wanted, log);
  });
}

async function build(wanted, log) {
  log('Building the pages and the server …');
  // Into a folder of its own, renamed when whole: a build that is stopped half-way leaves the last one as it was.
  const target = join(root, 'out', 'build');
  rmSync(target, { recursive: true, force: true });
  mkdirSync(target, { recursive: true });
  try {
    await bothOrNeither(buildPages(join(target, 'web')), buildServer(join(target, 'server')));
    demandSmallStart(join(target, 'web', 'browser'), log);
    compressPages(join(target, 'web', 'browser'));
    writeFileSync(join(target, '.riseback-build'), wanted);
    replaceDist(target);
  } finally {
    rmSync(target, { recursive: true, force: true });
  }
}

/** Waits for the second even if the first fails: it would go on writing into a folder that is being removed. */
async function bothOrNeither(...builds) {
  const failed = (await Promise.allSettled(builds)).find(({ status }) => status === 'rejected');
  if (failed !== undefined) throw failed.reason;
}

function isBuilt(wanted) {
  return existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted;
}

function hashOfSources() {
  const hash = createHash('sha256').update(process.versions.node);
  for (const file of SOURCES.flatMap((path) => filesOf(join(root, path))).sort()) {
    hash.update(relative(root, file)).update('\0').update(readFileSync(file)).update('\0');
  }
  return hash.digest('hex');
}

function filesOf(path) {
  if (NO_SOURCE.test(relative(root, path)) || !existsSync(path)) return [];
  const entries = readdirOrUndefined(path);
  return entries === undefined ? [path] : entries.flatMap((name) => filesOf(join(path, name)));
}

function readdirOrUndefined(path) {
  try {
    return readdirSync(path);
  } catch (error) {
    if (error.code === 'ENOTDIR') return undefined;
    throw error;
  }
}

function replaceDist(target) {
  const old = join(root, 'out', 'build-before');
  rmSync(old, { recursive: true, force: true });
  if (existsSync(dist)) renameSync(dist, old);
  renameSync(target, dist);
  rmSync(old, { recursive: true, force: true });
}

async function buildPages(outputPath) {
  const ng = join(root, 'node_modules', '@angular', 'cli', 'bin', 'ng.js');
  const args = [ng, 'build', 'web', '--output-path', relative(root, outputPath), '--progress=false'];
  const { code, output } = await run(process.execPath, args);
  if (code !== 0) {
    process.stderr.write(output);
    throw new Error('The pages cannot be built; the messages stand above.');
  }
}

/** Once here, as small as can be, rather than at each request. index.html is filled in at each request and stays as it is. */
function compressPages(folder) {
  const worthwhile = filesOf(folder).filter(
    (file) => /\.(m?js|css|svg|json)$/.test(file) && statSync(file).size > 1024,
  );
  for (const file of worthwhile) {
    const content = readFileSync(file);
    writeFileSync(`${file}.br`, brotliCompressSync(content));
    writeFileSync(`${file}.gz`, gzipSync(content, { level: 9 }));
  }
}

async function buildServer(outdir) {
  const esbuild = await import('esbuild');
  const { dependencies } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
  await esbuild.build({
    absWorkingDir: root,
    entryPoints: {
      main: 'server/src/main.ts',
      'solve-worker': 'server/workers/solve-worker.ts',
      'hash-worker': 'server/workers/hash-worker.ts',
      'seal-copy-worker': 'server/workers/seal-copy-worker.ts',
      'report-worker': 'server/workers/report-worker.ts',
    },
    outdir,
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    sourcemap: true,
    // Not `packages: 'external'`: that would leave our own libraries, which are TypeScript, to be imported at run time.
    external: Object.keys(dependencies).flatMap((name) => [name, `${name}/*`]),
    logLevel: 'warning',
  });
}

function run(command, args) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, {
      cwd: root,
      stdio: ['ignore', 'pipe', 'pipe'],
      env: { ...process.env, CI: '1' },
    });
    let output = '';
    const take = (chunk) => {
      output += chunk;
    };
    child.stdout.on('data', take);
    child.stderr.on('data', take);
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, output }));
  });
}

if (process.argv[1] === join(root, 'server', 'build.mjs')) {
  const log = (line) => process.stderr.write(`${line}\n`);
  await ensureInstalled(log);
  await ensureBuilt(log);
}

// `npm start`: from a fresh clone to a served application, with Node's built-ins only until the packages are there.
import { mkdirSync, rmdirSync, statSync } from 'node:fs';
import { createServer } from 'node:net';
import { join } from 'node:path';
import { demandNode, ensureInstalled, root } from './install.mjs';

const BUILD_LOCK_STALE_MS = 10 * 60_000;

const startedAt = Date.now();
function progress(line) {
  process.stdout.write(`[${((Date.now() - startedAt) / 1000).toFixed(1).padStart(5)} s] ${line}\n`);
}

demandNode();
process.chdir(root);
await demandFreePort();
await stage('Packages', () => ensureInstalled(progress));
await stage('Build', () => withLock(() => import('./build.mjs').then(({ ensureBuilt }) => ensureBuilt(progress))));
// Into this very process, so that signals reach the server and not a parent of it.
await import('../dist/server/main.js');

async function stage(name, work) {
  progress(`${name}: checking …`);
  try {
    await work();
  } catch (error) {
    process.stderr.write(`Riseback cannot start. ${error.message}\n`);
    process.exit(1);
  }
  progress(`${name}: ready`);
}

/** Before minutes of installing, not after. What is wrong with PORT or HOST itself, the server says better. */
async function demandFreePort() {
  const port = Number(process.env.PORT || 4310);
  const host = process.env.HOST || '127.0.0.1';
  if (!Number.isInteger(port) || port < 0 || port > 65_535) return;
  const failure = await new Promise((resolve) => {
    const trial = createServer();
    trial.once('error', resolve);
    trial.listen(port, host, () => trial.close(() => resolve(undefined)));
  });
  if (failure?.code !== 'EADDRINUSE' && failure?.code !== 'EACCES') return;
  const why = failure.code === 'EACCES' ? 'may not be used by this account' : 'is in use, perhaps by another Riseback';
  process.stderr.write(
    `Riseback cannot start. Port ${port} ${why}; choose another with PORT, as in: PORT=4320 npm start\n`,
  );
  process.exit(1);
}

/** Two starts at once must not build into each other. A lock left by one that was killed is taken over. */
async function withLock(work) {
  const lock = join(root, 'out', 'building');
  mkdirSync(join(root, 'out'), { recursive: true });
  for (let waited = false; ; waited = true) {
    try {
      mkdirSync(lock);
      break;
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
      if (isStale(lock)) {
        rmdirSync(lock);
        continue;
      }
      if (!waited) progress(`Waiting for another build to end (${lock}) …`);
      await new Promise((resolve) => setTimeout(resolve, 500));
    }
  }
  try {
    await work();
  } finally {
    rmdirSync(lock);
  }
}

function isStale(lock) {
  try {
    return Date.now() - statSync(lock).mtimeMs > BUILD_LOCK_STALE_MS;
  } catch {
    return false;
  }
}

// `npm start`: from a fresh clone to a served application, with Node's built-ins only until the packages are there.
import { createServer } from 'node:net';
import { demandNode, ensureInstalled, root } from './install.mjs';

const startedAt = Date.now();
function progress(line) {
  process.stdout.write(`[${((Date.now() - startedAt) / 1000).toFixed(1).padStart(5)} s] ${line}\n`);
}

demandNode();
process.chdir(root);
await demandFreePort();
await stage('Packages', () => ensureInstalled(progress));
// Imported only now: it needs the packages.
await stage('Build', async () => (await import('./build.mjs')).ensureBuilt(progress));
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

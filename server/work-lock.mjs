// Keeps two processes from doing the same work on the same files, with Node's built-ins only.
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname } from 'node:path';

const LOOK_AGAIN_MS = 500;

/**
 * Does `work` while no other process holds the lock. The lock names its process, so that one left by a process that was
 * stopped half-way counts for nothing.
 * @param path the lock's file
 * @param log takes one line: that somebody else is waited for
 */
export async function withLock(path, log, work) {
  mkdirSync(dirname(path), { recursive: true });
  for (let waited = false; !take(path); waited = true) {
    if (!waited) log(`Waiting for another Riseback to finish the same (${path}) …`);
    await new Promise((resolve) => setTimeout(resolve, LOOK_AGAIN_MS));
  }
  try {
    return await work();
  } finally {
    rmSync(path, { force: true });
  }
}

function take(path) {
  try {
    writeFileSync(path, String(process.pid), { flag: 'wx' });
    return true;
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
  }
  if (isHeld(path)) return false;
  rmSync(path, { recursive: true, force: true });
  return take(path);
}

function isHeld(path) {
  try {
    const pid = Number(readFileSync(path, 'utf8'));
    // Its own number: a container restarted with the same one. No number: the holder is writing it this very moment.
    if (pid === process.pid) return false;
    if (pid === 0) return true;
    process.kill(pid, 0);
    return true;
  } catch (error) {
    // EPERM: it lives, under another account
    return error.code === 'EPERM';
  }
}

import { startWorker } from '../start-worker';
import type { BackupFacts } from './sealed-copy';

export interface SealOrder {
  readonly path: string;
  readonly madeAt: string;
}

/** `sealCopy` in a thread of its own: reading a large copy from end to end must not hold up requests. */
export function sealAside(path: string, madeAt: string): Promise<BackupFacts> {
  return new Promise((resolve, reject) => {
    const worker = startWorker(workerUrl(), { workerData: { path, madeAt } satisfies SealOrder });
    worker.once('message', (facts: BackupFacts) => resolve(facts));
    worker.once('error', reject);
    worker.once('exit', (code) => reject(new Error(`the check of the copy ended with ${code}`)));
  });
}

/** TypeScript through tsx while developing; beside the server's bundle once built. */
function workerUrl(): URL {
  return import.meta.url.endsWith('.ts')
    ? new URL('../../../workers/seal-copy-worker.ts', import.meta.url)
    : new URL('./seal-copy-worker.js', import.meta.url);
}

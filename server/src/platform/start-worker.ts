import { Worker, type WorkerOptions } from 'node:worker_threads';

/**
 * A worker thread from a module beside the bundle, or from its TypeScript while developing. A worker does not inherit
 * tsx's loader, nor take it from `--import`, so one in TypeScript registers it first.
 */
export function startWorker(url: URL, options: WorkerOptions = {}): Worker {
  if (!url.pathname.endsWith('.ts')) return new Worker(url, options);
  const script = `import('tsx/esm/api').then(({ register }) => { register(); return import(${JSON.stringify(url.href)}); })`;
  return new Worker(script, { ...options, eval: true });
}

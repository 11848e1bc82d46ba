// The solver's bench where the server solves: in one file made by the same tool, in a thread with as much room for what is dropped.
// From TypeScript module by module, a solve takes a tenth longer against its parts than anybody's solve does.
import { on } from 'node:events';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { Worker } from 'node:worker_threads';
import { build } from 'esbuild';
import { root } from '../../server/install.mjs';

/** @returns the bench's lines, each as soon as it is measured */
export async function* solverBenchLines() {
  const { YOUNG_MEMORY_MB } = await import('../../server/src/solve/solve-thread.ts');
  const outfile = join(root, 'out', 'bench', 'solver-bench.mjs');
  await build({
    absWorkingDir: root,
    entryPoints: ['tests/bench/solver-bench-thread.ts'],
    outfile,
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    logLevel: 'warning',
  });
  yield `Bundled as the server is, in a thread with its ${YOUNG_MEMORY_MB} MB of young memory`;
  const worker = new Worker(pathToFileURL(outfile), { resourceLimits: { maxYoungGenerationSizeMb: YOUNG_MEMORY_MB } });
  for await (const [line] of on(worker, 'message', { close: ['exit'] })) yield line;
}

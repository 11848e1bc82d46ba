// npm run bench: ratios measured in one run on this machine. Installs what is missing, then measures the sources through tsx.
import { demandNode, ensureInstalled } from '../../server/install.mjs';

demandNode();
await ensureInstalled((line) => process.stderr.write(`${line}\n`));
const { register } = await import('tsx/esm/api');
register();
const { solverBench } = await import('./solver-bench.ts');
for (const line of solverBench()) process.stdout.write(`${line}\n`);

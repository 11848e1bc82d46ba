// npm run bench: ratios measured in one run on this machine. Installs what is missing and builds the server, then measures.
//   --only solver | reports | api | browser   one part
//   --minutes N           how long the fifty users work (1)
import { parseArgs } from 'node:util';
import { demandNode, ensureInstalled } from '../../server/install.mjs';

const { values: options } = parseArgs({
  options: { only: { type: 'string' }, minutes: { type: 'string', default: '1' } },
});
const benches = {
  solver: async () => (await import('./as-the-server-solves.mjs')).solverBenchLines(),
  reports: async () => (await import('./report-bench.ts')).reportBench(),
  api: async () => {
    await (await import('../../server/build.mjs')).ensureBuilt(say);
    return (await import('./api-bench.ts')).apiBench({ minutes: Number(options.minutes) });
  },
  browser: async () => {
    await (await import('../../server/build.mjs')).ensureBuilt(say);
    return (await import('./browser-bench.ts')).browserBench();
  },
};
const chosen = options.only === undefined ? Object.keys(benches) : [options.only];
const unknown = chosen.find((name) => !Object.hasOwn(benches, name));
if (unknown !== undefined || !(Number(options.minutes) > 0)) {
  say(`Usage: npm run bench -- [--only ${Object.keys(benches).join('|')}] [--minutes N]`);
  process.exit(2);
}

demandNode();
await ensureInstalled(say);
const { register } = await import('tsx/esm/api');
register();
for (const name of chosen) {
  for await (const line of await benches[name]()) process.stdout.write(`${line}\n`);
}

function say(line) {
  process.stderr.write(`${line}\n`);
}

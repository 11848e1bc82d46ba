// `npm run dev`: the server through tsx and the pages through ng serve, both restarted at each change of their sources.
import { delimiter, join } from 'node:path';
import { demandNode, ensureInstalled, root } from './install.mjs';

demandNode();
process.chdir(root);
await ensureInstalled((line) => process.stdout.write(`${line}\n`));
const { default: concurrently } = await import('concurrently');
// As npm does for its scripts, so that `node server/dev.mjs` works as well.
const env = { PATH: join(root, 'node_modules', '.bin') + delimiter + process.env.PATH };
const { result } = concurrently(
  [
    { name: 'server', command: 'tsx watch --clear-screen=false server/src/main.ts', env },
    { name: 'web', command: 'ng serve web', env },
  ],
  { killOthersOn: ['failure', 'success'], prefix: 'name' },
);
await result.catch(() => {
  process.exitCode = 1;
});

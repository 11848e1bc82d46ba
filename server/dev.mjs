// `npm run dev`: the server through tsx and the pages through ng serve, both restarted at each change of their sources.
import { demandNode, ensureInstalled, root } from './install.mjs';

demandNode();
process.chdir(root);
await ensureInstalled((line) => process.stdout.write(`${line}\n`));
const { default: concurrently } = await import('concurrently');
const { result } = concurrently(
  [
    { name: 'server', command: 'tsx watch --clear-screen=false server/src/main.ts' },
    { name: 'web', command: 'ng serve web' },
  ],
  { killOthersOn: ['failure', 'success'], prefix: 'name' },
);
await result.catch(() => {
  process.exitCode = 1;
});

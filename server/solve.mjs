// npm run solve -- FILE [--case ID]: installs what is missing, then solves. Standard output is kept for the answer alone.
import { demandNode, ensureInstalled } from './install.mjs';

demandNode();
await ensureInstalled((line) => process.stderr.write(`${line}\n`));
// npm runs its scripts in the project's folder; a file is named from where the person stands
process.chdir(process.env.INIT_CWD ?? process.cwd());
const { register } = await import('tsx/esm/api');
register();
const { solveCommand } = await import('./commands/solve.ts');
const { exitCode, output, error } = solveCommand(process.argv.slice(2));
if (error !== undefined) process.stderr.write(`${JSON.stringify(error, undefined, 2)}\n`);
// whoever reads the answer may have seen enough of it
process.stdout.on('error', ({ code }) => process.exit(code === 'EPIPE' ? 0 : 1));
if (output !== undefined) process.stdout.write(`${JSON.stringify(output)}\n`);
process.exitCode = exitCode;

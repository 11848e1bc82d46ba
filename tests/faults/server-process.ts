import { spawn, type ChildProcess } from 'node:child_process';
import { join } from 'node:path';
import { DEMO_PASSWORD } from '../../server/demo/demo-people';
import ternQuay from '../../server/demo/tern-quay.json';

const ROOT = join(import.meta.dirname, '../..');
const TSX = ['--import', 'tsx'];

export interface ServerProcess {
  readonly child: ChildProcess;
  readonly address: string;
  output(): string;
  ended(): Promise<number | null>;
}

export interface StartOptions {
  readonly env?: Readonly<Record<string, string>>;
  /** No file may grow beyond this: writes then fail as on a full disk. */
  readonly largestFileBytes?: number;
}

/** Starts the server on a database file and waits until it listens. */
export async function startServer(databasePath: string, options: StartOptions = {}): Promise<ServerProcess> {
  const { child, output, ended } = launch(databasePath, ['server/src/main.ts'], options);
  const address = await new Promise<string>((resolve, reject) => {
    child.stdout.on('data', () => {
      const found = /^Riseback: (http\S+)$/m.exec(output())?.[1];
      if (found !== undefined) resolve(found);
    });
    void ended().then((code) => reject(new Error(`the server ended with ${String(code)}: ${output()}`)));
  });
  return { child, address, output, ended };
}

/** Runs a command of server/commands to its end. */
export async function runCommand(
  databasePath: string,
  name: string,
  args: readonly string[] = [],
): Promise<{ code: number | null; output: string }> {
  const { output, ended } = launch(databasePath, [`server/commands/${name}.ts`, ...args], {});
  const code = await ended();
  return { code, output: output() };
}

/** Headers of a session of one of the demo's people. */
export async function signIn(address: string, name = 'designer'): Promise<Record<string, string>> {
  const answer = await fetch(`${address}/api/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email: `${name}@ternquay.example`, password: DEMO_PASSWORD }),
  });
  if (!answer.ok) throw new Error(`signing in was answered ${answer.status}`);
  const cookies = answer.headers.getSetCookie().map((cookie) => cookie.split(';')[0] ?? '');
  const proof = cookies.find((cookie) => cookie.startsWith('XSRF-TOKEN='))?.slice('XSRF-TOKEN='.length) ?? '';
  return { Cookie: cookies.join('; '), 'X-XSRF-TOKEN': decodeURIComponent(proof), 'Content-Type': 'application/json' };
}

/** The demo's one network. */
export async function demoNetwork(
  address: string,
  headers: Readonly<Record<string, string>>,
): Promise<{ id: string; siteId: string; version: number }> {
  const get = async (path: string): Promise<unknown> => (await fetch(address + path, { headers })).json();
  const [site] = (await get('/api/sites')) as { id: string }[];
  const networks = (await get(`/api/sites/${site?.id}/networks`)) as { id: string; name: string; version: number }[];
  const network = networks.find(({ name }) => name === ternQuay.name);
  if (site === undefined || network === undefined) throw new Error('the demo has a site with a network');
  return { id: network.id, siteId: site.id, version: network.version };
}

function launch(databasePath: string, script: readonly string[], { env = {}, largestFileBytes }: StartOptions) {
  const command = [process.execPath, ...TSX, ...script];
  // The shell's limit counts in blocks of 512 bytes. The signal must be ignored, or it would end the process where a
  // full disk makes the write fail.
  const limited = (bytes: number) => [
    'sh',
    '-c',
    `trap '' XFSZ; ulimit -f ${Math.floor(bytes / 512)}; exec "$@"`,
    'sh',
    ...command,
  ];
  const [file = '', ...args] = largestFileBytes === undefined ? command : limited(largestFileBytes);
  const child = spawn(file, args, {
    cwd: ROOT,
    env: {
      PATH: process.env['PATH'] ?? '',
      RISEBACK_DB: databasePath,
      PORT: '0',
      RISEBACK_REQUESTS_PER_MINUTE: '1000000',
      ...env,
    },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk: Buffer) => (output += chunk.toString()));
  const exit = new Promise<number | null>((resolve) => child.once('close', resolve));
  return { child, output: () => output, ended: () => exit };
}

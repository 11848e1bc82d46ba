import { spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { DEMO_PASSWORD } from '../../server/demo/demo-people';

export type Headers = Readonly<Record<string, string>>;

/** The built server in a process of its own, on a database of its own with the demo in it. */
export interface BenchServer {
  readonly address: string;
  /** On the disk that the server writes to. */
  readonly folder: string;
  /** Processor time that the server's process has taken so far, s. */
  cpuSeconds(): Promise<number>;
  signIn(name: string): Promise<Headers>;
  stop(): Promise<void>;
}

/** @param program the built server */
export async function startBenchServer(program: string): Promise<BenchServer> {
  const folder = mkdtempSync(join(tmpdir(), 'riseback-bench-'));
  const child = spawn(process.execPath, [program], {
    env: {
      PATH: process.env['PATH'] ?? '',
      PORT: '0',
      RISEBACK_METRICS_PORT: '0',
      RISEBACK_DB: join(folder, 'riseback.db'),
      RISEBACK_REQUESTS_PER_MINUTE: '1000000000',
    },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let output = '';
  const ended = new Promise<void>((resolve) => child.once('close', () => resolve()));
  const found = (pattern: RegExp): string => pattern.exec(output)?.[1] ?? '';
  await new Promise<void>((resolve, reject) => {
    child.stdout.on('data', (chunk: Buffer) => {
      output += chunk.toString();
      if (found(/^Riseback: (http\S+)$/m) !== '') resolve();
    });
    void ended.then(() => reject(new Error(`the server ended: ${output}`)));
  });
  const address = found(/^Riseback: (http\S+)$/m);
  const figures = found(/^Figures for Prometheus: (http\S+)$/m);
  return {
    address,
    folder,
    cpuSeconds: async () => {
      const text = await (await fetch(figures)).text();
      return Number(/^process_cpu_seconds_total (\S+)$/m.exec(text)?.[1]);
    },
    signIn: (name) => signIn(address, `${name}@ternquay.example`),
    stop: async () => {
      child.kill('SIGTERM');
      await ended;
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

async function signIn(address: string, email: string): Promise<Headers> {
  const answer = await fetch(`${address}/api/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email, password: DEMO_PASSWORD }),
  });
  if (!answer.ok) throw new Error(`signing in was answered ${answer.status}`);
  const cookies = answer.headers.getSetCookie().map((cookie) => cookie.split(';')[0] ?? '');
  const proof = cookies.find((cookie) => cookie.startsWith('XSRF-TOKEN='))?.slice('XSRF-TOKEN='.length) ?? '';
  return { Cookie: cookies.join('; '), 'X-XSRF-TOKEN': decodeURIComponent(proof), 'Content-Type': 'application/json' };
}

import { fileURLToPath } from 'node:url';
import { MessageChannel } from 'node:worker_threads';
import { Piscina } from 'piscina';
import type { ReportProgress } from './report-content';
import type { ReportOrder } from './report-material';

/** What a report's thread posts while it works. */
export interface ProgressMessage {
  readonly share: number;
  readonly doing: string;
}

export interface ReportPort {
  /** Rejects when it is called off, when its thread dies, and with whatever the maker throws. */
  make(order: ReportOrder, progress: ReportProgress, signal: AbortSignal): Promise<Uint8Array>;
}

/** A report of a large plant takes some 200 MB; beyond this its thread ends rather than the server. */
const MEMORY_MB = 1_024;
const IDLE_MS = 60_000;

/** Makes reports in one thread of low priority, which is ended when a report is called off and started again for the next. */
export class ReportThreads implements ReportPort {
  private readonly pool: Piscina;

  constructor(workerUrl = defaultWorkerUrl()) {
    this.pool = new Piscina({
      filename: fileURLToPath(workerUrl),
      name: 'report',
      minThreads: 0,
      maxThreads: 1,
      idleTimeout: IDLE_MS,
      resourceLimits: { maxOldGenerationSizeMb: MEMORY_MB },
    });
  }

  async make(order: ReportOrder, progress: ReportProgress, signal: AbortSignal): Promise<Uint8Array> {
    const { port1: ours, port2: theirs } = new MessageChannel();
    ours.on('message', ({ share, doing }: ProgressMessage) => progress(share, doing));
    try {
      const task = { ...order, port: theirs };
      return (await this.pool.run(task, { signal, transferList: [theirs] })) as Uint8Array;
    } finally {
      ours.close();
    }
  }

  async close(): Promise<void> {
    await this.pool.destroy();
  }
}

/** TypeScript through tsx while developing; beside the server's bundle once built. */
function defaultWorkerUrl(): URL {
  return import.meta.url.endsWith('.ts')
    ? new URL('../../workers/report-worker-dev.mjs', import.meta.url)
    : new URL('./report-worker.js', import.meta.url);
}

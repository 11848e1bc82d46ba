import { constants, setPriority } from 'node:os';
import type { MessagePort } from 'node:worker_threads';
import { makeReport, type ReportOrder } from '../src/reports/report-material';
import type { ProgressMessage } from '../src/reports/report-threads';

// Where processors are short, requests and solves go first. Linux counts a thread by itself; elsewhere this would be the whole server.
if (process.platform === 'linux') setPriority(constants.priority.PRIORITY_LOW);

/** The thread behind ReportThreads: content comes in, a file goes out. It never opens the database. */
export async function report({ port, ...order }: ReportOrder & { readonly port: MessagePort }): Promise<Uint8Array> {
  const tell = (share: number, doing: string) => port.postMessage({ share, doing } satisfies ProgressMessage);
  try {
    // whoever calls a report off ends its thread; no signal reaches in here
    return await makeReport(order, tell, new AbortController().signal);
  } finally {
    port.close();
  }
}

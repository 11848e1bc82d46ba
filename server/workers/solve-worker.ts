import { parentPort } from 'node:worker_threads';
import { solveCases } from '../src/solve/solve-cases';
import type { SolveAnswer, SolveMessage } from '../src/solve/solve-thread';

/** The thread behind SolveThread: a network file comes in, the outcomes of its cases go out. It never opens the database. */
const port = parentPort;
if (port === null) throw new Error('solve-worker runs as a worker thread');

port.on('message', ({ jobId, job }: SolveMessage) => {
  port.postMessage(answer(jobId, job));
});

function answer(jobId: number, job: SolveMessage['job']): SolveAnswer {
  try {
    const start = performance.now();
    const outcomes = solveCases(job);
    return { jobId, ended: { end: 'finished', outcomes, solveMs: performance.now() - start } };
  } catch (error) {
    return { jobId, broke: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

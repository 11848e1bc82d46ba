import { constants, setPriority } from 'node:os';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { parentPort } from 'node:worker_threads';
import type { CaseOutcome } from '@riseback/contracts';
import { solveCase } from '../src/solve/solve-cases';
import { solveText } from '../src/solve/solve-text';
import type { DropMessage, SolveAnswer, SolveMessage } from '../src/solve/solve-thread';

/** The thread behind SolveThread: a network file comes in, the outcomes of its cases go out. It never opens the database. */
const port = parentPort;
if (port === null) throw new Error('solve-worker runs as a worker thread');

// Where processors are short, requests go first. Linux counts a thread by itself; elsewhere this would be the whole server.
if (process.platform === 'linux') setPriority(constants.priority.PRIORITY_BELOW_NORMAL);

let dropped = 0;
port.on('message', (message: SolveMessage | DropMessage) => {
  if ('drop' in message) dropped = message.drop;
  else void answer(message).then((answered) => port.postMessage(answered, buffersOf(answered)));
});

async function answer({ jobId, job }: SolveMessage): Promise<SolveAnswer> {
  try {
    if ('fileText' in job) return { jobId, ended: { end: 'answered', answer: solveText(job) } };
    const start = performance.now();
    const outcomes: CaseOutcome[] = [];
    for (const caseId of job.caseIds) {
      outcomes.push(solveCase(job, caseId));
      // between two turns a message comes in that calls the rest off
      if (outcomes.length < job.caseIds.length) await nextTurn();
      if (dropped === jobId) return { jobId, ended: { end: 'superseded' } };
    }
    return { jobId, ended: { end: 'finished', outcomes, solveMs: performance.now() - start } };
  } catch (error) {
    return { jobId, broke: error instanceof Error ? (error.stack ?? error.message) : String(error) };
  }
}

/** Handed over rather than copied. */
function buffersOf(answered: SolveAnswer): ArrayBuffer[] {
  if (!('ended' in answered) || answered.ended.end !== 'answered' || !('json' in answered.ended.answer)) return [];
  return [answered.ended.answer.json.buffer as ArrayBuffer];
}

// In the place of the solver's worker: a job whose first case is called after a way to die dies it; others are solved.
import { parentPort } from 'node:worker_threads';
import { solveCases } from '../../server/src/solve/solve-cases';
import { solveText } from '../../server/src/solve/solve-text';
import type { SolveMessage } from '../../server/src/solve/solve-thread';

parentPort?.on('message', ({ jobId, job }: SolveMessage) => {
  const deed = 'fileText' in job ? job.caseId : job.caseIds[0];
  if (deed === 'throws') throw new Error('thrown in the worker');
  if (deed === 'ends') process.exit(3);
  if (deed === 'grows') fillMemory();
  while (deed === 'spins');
  parentPort?.postMessage({
    jobId,
    ended:
      'fileText' in job
        ? { end: 'answered', answer: solveText(job) }
        : { end: 'finished', outcomes: solveCases(job), solveMs: 1 },
  });
});

function fillMemory(): void {
  for (const kept: number[][] = []; ;) kept.push(new Array<number>(1e6).fill(1));
}

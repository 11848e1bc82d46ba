// In the place of the solver's worker: the first case of a job says what it does. Answers come a moment late, as a solve's do.
import { parentPort } from 'node:worker_threads';

parentPort.on('message', ({ jobId, job }) => {
  const [deed] = job.caseIds;
  if (deed === 'throw') throw new Error('thrown in the worker');
  if (deed === 'exit') process.exit(3);
  while (deed === 'spin');
  setTimeout(() => parentPort.postMessage({ jobId, ended: { end: 'finished', outcomes: [], solveMs: 1 } }), 20);
});

import { parentPort } from 'node:worker_threads';
import { solverBench } from './solver-bench';

for (const line of solverBench()) parentPort?.postMessage(line);

import { parentPort, workerData } from 'node:worker_threads';
import type { SealOrder } from '../src/platform/backup/seal-aside';
import { sealCopy } from '../src/platform/backup/sealed-copy';

/** Seals one copy, answers with what it found and ends; an error ends it too and reaches the server as its 'error'. */
const { path, madeAt } = workerData as SealOrder;
parentPort?.postMessage(sealCopy(path, madeAt));

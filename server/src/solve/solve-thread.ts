import type { Worker } from 'node:worker_threads';
import { startWorker } from '../platform/start-worker';
import type { FileSolver, SolveEnd, SolveJob, SolvePort, TextEnd } from './solve-port';
import type { TextJob } from './solve-text';

/** What the worker posts back; `broke` carries the error's text for the log. */
export type SolveAnswer =
  | { readonly jobId: number; readonly ended: Exclude<SolveEnd | TextEnd, { end: 'failed' }> }
  | { readonly jobId: number; readonly broke: string };
export interface SolveMessage {
  readonly jobId: number;
  readonly job: SolveJob | TextJob;
}
/** Nobody waits for this job any longer: the worker leaves off at its next case. */
export interface DropMessage {
  readonly drop: number;
}

export interface SolveThreadOptions {
  /** A solve that takes longer is stopped and fails. */
  readonly limitMs?: number;
  /** A solve that needs more ends its thread and fails. */
  readonly memoryMb?: number;
  readonly workerUrl?: URL;
  /** Told of every crash and every stopped solve. */
  readonly report: (error: unknown) => void;
}

interface Waiting {
  readonly job: SolveJob | TextJob;
  readonly resolve: (end: SolveEnd | TextEnd) => void;
}
interface Running extends Waiting {
  readonly key: string;
  readonly jobId: number;
  readonly timer: NodeJS.Timeout;
}

const LIMIT_MS = 10_000;
/** Some ten times what 50,000 pipes take. */
const MEMORY_MB = 1_024;
/**
 * Room for what a solve makes and drops. With what the engine gives unasked, 48, a large network's result is copied over and over
 * while it grows: see docs/decisions/0180. The bench of the solver has as much.
 */
export const YOUNG_MEMORY_MB = 96;
/** Beyond this many networks at once a person had better try again than wait. */
const MOST_WAITING = 100;
const BROKE = 'The solver broke on this network. Its data is safe; undo the last change, or report the network.';
const BUSY = 'The solver has too much to do at the moment. Try again in a few seconds.';

/**
 * Solves in one worker thread, one job at a time, so that a solve never holds up a request. Of jobs under one key only
 * the newest is done. A worker that overruns its time is ended and a new one started: an endless solve can be stopped in
 * no other way.
 */
export class SolveThread implements SolvePort, FileSolver {
  private readonly waiting = new Map<string, Waiting>();
  private readonly limitMs: number;
  private readonly memoryMb: number;
  private readonly workerUrl: URL;
  private readonly report: (error: unknown) => void;
  private worker: Worker | undefined;
  private running: Running | undefined;
  private lastJobId = 0;
  private closed = false;

  constructor({
    limitMs = LIMIT_MS,
    memoryMb = MEMORY_MB,
    workerUrl = defaultWorkerUrl(),
    report,
  }: SolveThreadOptions) {
    this.limitMs = limitMs;
    this.memoryMb = memoryMb;
    this.workerUrl = workerUrl;
    this.report = report;
  }

  solve(key: string, job: SolveJob): Promise<SolveEnd> {
    // the worker answers each kind of job with its own kind of end
    return this.enqueue(key, job) as Promise<SolveEnd>;
  }

  solveText(key: string, job: TextJob): Promise<TextEnd> {
    return this.enqueue(key, job) as Promise<TextEnd>;
  }

  private enqueue(key: string, job: SolveJob | TextJob): Promise<SolveEnd | TextEnd> {
    if (this.closed) return Promise.resolve({ end: 'superseded' });
    const earlier = this.waiting.get(key);
    if (earlier === undefined && this.waiting.size >= MOST_WAITING)
      return Promise.resolve({ end: 'failed', detail: BUSY });
    earlier?.resolve({ end: 'superseded' });
    return new Promise((resolve) => {
      // a key that waits already keeps its turn
      this.waiting.set(key, { job, resolve });
      this.next();
    });
  }

  /** Calls off what is under way under a key; it counts as superseded. A job that is done all the same is answered. */
  drop(key: string): void {
    this.waiting.get(key)?.resolve({ end: 'superseded' });
    this.waiting.delete(key);
    if (this.running?.key !== key) return;
    this.worker?.postMessage({ drop: this.running.jobId } satisfies DropMessage);
  }

  /** Ends the thread; what waits or runs counts as superseded, for nobody is left to ask for it. */
  async close(): Promise<void> {
    this.closed = true;
    for (const { resolve } of this.waiting.values()) resolve({ end: 'superseded' });
    this.waiting.clear();
    this.finish({ end: 'superseded' });
    await this.worker?.terminate();
  }

  private next(): void {
    if (this.running !== undefined || this.closed) return;
    const [first] = this.waiting;
    if (first === undefined) return;
    const [key, { job, resolve }] = first;
    this.waiting.delete(key);
    this.worker ??= this.startWorker();
    const jobId = (this.lastJobId += 1);
    this.running = { key, jobId, job, resolve, timer: setTimeout(() => this.stopOverrun(), this.limitMs) };
    this.worker.postMessage({ jobId, job } satisfies SolveMessage);
  }

  private startWorker(): Worker {
    const worker = startWorker(this.workerUrl, {
      resourceLimits: { maxOldGenerationSizeMb: this.memoryMb, maxYoungGenerationSizeMb: YOUNG_MEMORY_MB },
    });
    // the server's socket keeps the process alive, not its solver
    worker.unref();
    worker.on('message', (answer: SolveAnswer) => this.take(answer));
    worker.on('error', (error) => this.report(error));
    worker.on('exit', () => this.lose(worker));
    return worker;
  }

  private take(answer: SolveAnswer): void {
    if (answer.jobId !== this.running?.jobId) return;
    if ('broke' in answer) this.report(new Error(`the solver broke: ${answer.broke}`));
    this.finish('broke' in answer ? { end: 'failed', detail: BROKE } : answer.ended);
    this.next();
  }

  private stopOverrun(): void {
    const seconds = this.limitMs / 1_000;
    this.report(new Error(`a solve took more than ${seconds} s and was stopped`));
    const { worker } = this;
    // before the thread's end is known, so that its exit is not taken for a crash
    this.worker = undefined;
    this.finish({ end: 'failed', detail: `The solve took more than ${seconds} s and was stopped.` });
    void worker?.terminate();
    this.next();
  }

  /** A thread that ended by itself: out of memory, or an error that escaped it. */
  private lose(worker: Worker): void {
    if (worker !== this.worker) return;
    this.worker = undefined;
    this.finish({ end: 'failed', detail: BROKE });
    this.next();
  }

  private finish(end: SolveEnd | TextEnd): void {
    if (this.running === undefined) return;
    clearTimeout(this.running.timer);
    this.running.resolve(end);
    this.running = undefined;
  }
}

/** TypeScript through tsx while developing; beside the server's bundle once built. */
function defaultWorkerUrl(): URL {
  return import.meta.url.endsWith('.ts')
    ? new URL('../../workers/solve-worker.ts', import.meta.url)
    : new URL('./solve-worker.js', import.meta.url);
}

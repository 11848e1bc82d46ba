import type { Worker } from 'node:worker_threads';
import { startWorker } from '../start-worker';
import type { Hasher } from './passwords';

export type HashOrder =
  | { readonly kind: 'hash'; readonly text: string; readonly cost: number }
  | { readonly kind: 'matches'; readonly text: string; readonly hash: string };
export interface HashMessage {
  readonly id: number;
  readonly order: HashOrder;
}
export type HashAnswer =
  { readonly id: number; readonly value: string | boolean } | { readonly id: number; readonly broke: string };

interface Waiting {
  readonly resolve: (value: string | boolean) => void;
  readonly reject: (error: Error) => void;
}

export interface PasswordThreadsOptions {
  readonly count: number;
  readonly workerUrl?: URL;
  /** Told of a thread that broke. */
  readonly report: (error: unknown) => void;
}

/** Hashes in threads of their own, so that people who sign in do not hold up those who read. */
export class PasswordThreads implements Hasher {
  private readonly threads: readonly HashThread[];

  constructor({ count, workerUrl = defaultWorkerUrl(), report }: PasswordThreadsOptions) {
    this.threads = Array.from({ length: count }, () => new HashThread(workerUrl, report));
  }

  async hash(text: string, cost: number): Promise<string> {
    return String(await this.idlest().run({ kind: 'hash', text, cost }));
  }

  async matches(text: string, hash: string): Promise<boolean> {
    return (await this.idlest().run({ kind: 'matches', text, hash })) === true;
  }

  async close(): Promise<void> {
    await Promise.all(this.threads.map((thread) => thread.close()));
  }

  private idlest(): HashThread {
    return this.threads.reduce((best, thread) => (thread.load < best.load ? thread : best));
  }
}

/** One worker, started when first needed and again after it broke. */
class HashThread {
  private readonly waiting = new Map<number, Waiting>();
  private worker: Worker | undefined;
  private lastId = 0;
  private closed = false;

  constructor(
    private readonly workerUrl: URL,
    private readonly report: (error: unknown) => void,
  ) {}

  get load(): number {
    return this.waiting.size;
  }

  run(order: HashOrder): Promise<string | boolean> {
    if (this.closed) return Promise.reject(new Error('the password threads are closed'));
    return new Promise((resolve, reject) => {
      const id = (this.lastId += 1);
      this.waiting.set(id, { resolve, reject });
      this.worker ??= this.start();
      this.worker.postMessage({ id, order } satisfies HashMessage);
    });
  }

  async close(): Promise<void> {
    this.closed = true;
    await this.worker?.terminate();
  }

  private start(): Worker {
    const worker = startWorker(this.workerUrl);
    // the server's socket keeps the process alive, not these
    worker.unref();
    worker.on('message', (answer: HashAnswer) => this.take(answer));
    worker.on('error', this.report);
    worker.on('exit', () => this.lose());
    return worker;
  }

  private take(answer: HashAnswer): void {
    const waiting = this.waiting.get(answer.id);
    this.waiting.delete(answer.id);
    if ('broke' in answer) waiting?.reject(new Error(`hashing broke: ${answer.broke}`));
    else waiting?.resolve(answer.value);
  }

  private lose(): void {
    this.worker = undefined;
    for (const { reject } of this.waiting.values()) reject(new Error('the thread that hashes passwords ended'));
    this.waiting.clear();
  }
}

/** TypeScript through tsx while developing; beside the server's bundle once built. */
function defaultWorkerUrl(): URL {
  return import.meta.url.endsWith('.ts')
    ? new URL('../../../workers/hash-worker.ts', import.meta.url)
    : new URL('./hash-worker.js', import.meta.url);
}

import { statfsSync, statSync } from 'node:fs';
import { dirname } from 'node:path';
import type { RequestHandler } from 'express';
import { collectDefaultMetrics, Counter, Gauge, Histogram, Registry } from 'prom-client';
import type { FileSolver, SolvePort } from '../../solve/solve-port';

/** From a read out of memory to a solve that takes all the time it may. */
const REQUEST_BUCKETS_S = [0.002, 0.005, 0.01, 0.025, 0.05, 0.1, 0.25, 0.5, 1, 5, 10];
const SOLVE_BUCKETS_S = [0.005, 0.02, 0.05, 0.1, 0.25, 0.5, 1, 2.5, 5, 10];

/**
 * Figures of a running server in the form that Prometheus reads. Labels are patterns of routes and ends of solves, never
 * an id, a name or an address: each value of a label is kept for ever.
 */
export class Metrics {
  private readonly registry = new Registry();
  private readonly requests: Histogram<'method' | 'route' | 'status'>;
  private readonly solves: Histogram<'end'>;
  private readonly backups: Counter<'end'>;
  private readonly lastBackup: Gauge;
  private readonly mails: Counter<'end'>;

  constructor(databasePath: string) {
    const registers = [this.registry];
    collectDefaultMetrics({ register: this.registry });
    this.requests = new Histogram({
      name: 'riseback_http_request_seconds',
      help: 'From the head of a request to the end of its answer.',
      labelNames: ['method', 'route', 'status'],
      buckets: REQUEST_BUCKETS_S,
      registers,
    });
    this.solves = new Histogram({
      name: 'riseback_solve_seconds',
      help: 'From asking the solver to its end, the wait for its turn included.',
      labelNames: ['end'],
      buckets: SOLVE_BUCKETS_S,
      registers,
    });
    this.backups = new Counter({
      name: 'riseback_backups_total',
      help: 'Backups since the start of the server.',
      labelNames: ['end'],
      registers,
    });
    this.lastBackup = new Gauge({
      name: 'riseback_last_backup_timestamp_seconds',
      help: 'When the last backup since the start of the server was done; 0 = none yet.',
      registers,
    });
    this.mails = new Counter({
      name: 'riseback_mails_total',
      help: 'Tries to send a mail since the start of the server, by how they ended.',
      labelNames: ['end'],
      registers,
    });
    if (databasePath !== ':memory:') gaugeFiles(databasePath, registers);
  }

  text(): Promise<string> {
    return this.registry.metrics();
  }

  get contentType(): string {
    return this.registry.contentType;
  }

  /** Times each request under the pattern of the route that it met. */
  requestTimer(): RequestHandler {
    return (req, res, next) => {
      const stop = this.requests.startTimer();
      res.once('close', () => {
        const { path } = (req.route ?? {}) as { path?: unknown };
        const route = typeof path === 'string' ? path : 'other';
        stop({ method: req.method, route, status: `${Math.floor(res.statusCode / 100)}xx` });
      });
      next();
    };
  }

  /** The same solver, timed. */
  timed(solver: SolvePort): SolvePort {
    return { solve: (key, job) => this.time(() => solver.solve(key, job)) };
  }

  timedFiles(solver: FileSolver): FileSolver {
    return { solveText: (key, job) => this.time(() => solver.solveText(key, job)) };
  }

  private async time<End extends { readonly end: string }>(solve: () => Promise<End>): Promise<End> {
    const stop = this.solves.startTimer();
    const ended = await solve();
    stop({ end: ended.end === 'answered' ? 'finished' : ended.end });
    return ended;
  }

  mailEnded(end: 'sent' | 'failed' | 'givenUp'): void {
    this.mails.inc({ end });
  }

  backupEnded(madeAt: Date | undefined): void {
    this.backups.inc({ end: madeAt === undefined ? 'failed' : 'done' });
    if (madeAt !== undefined) this.lastBackup.set(madeAt.getTime() / 1_000);
  }
}

function gaugeFiles(databasePath: string, registers: Registry[]): void {
  const sizeOf = (path: string) => statSync(path, { throwIfNoEntry: false })?.size ?? 0;
  new Gauge({
    name: 'riseback_database_bytes',
    help: 'Size of the database file and of its write-ahead log.',
    labelNames: ['file'],
    registers,
    collect() {
      this.set({ file: 'database' }, sizeOf(databasePath));
      this.set({ file: 'log' }, sizeOf(`${databasePath}-wal`));
    },
  });
  new Gauge({
    name: 'riseback_disk_free_bytes',
    help: "Free room on the database's disk.",
    registers,
    collect() {
      const { bavail, bsize } = statfsSync(dirname(databasePath));
      this.set(bavail * bsize);
    },
  });
}

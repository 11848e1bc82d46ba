import type { ReportJob } from '@riseback/contracts';
import { ProblemError, problemOf } from '../platform/problem';
import type { ReportMaterial } from './report-material';
import type { ReportOrderRow, ReportRepository } from './report-repository';
import type { ReportPort } from './report-threads';

export interface ReportRunnerOptions {
  readonly gather: (order: ReportOrderRow) => Promise<ReportMaterial>;
  readonly port: ReportPort;
  readonly now: () => Date;
  /** Told of every step of an order. */
  readonly changed: (job: ReportJob) => void;
  /** Told of what broke. */
  readonly report: (error: unknown) => void;
}

interface UnderWay {
  readonly calledOff: AbortController;
  progress: number;
  doing: string;
}

/** Once more after a crash, and once more after a restart; then it is the report's own fault. */
const MOST_ATTEMPTS = 2;
/** One is set in the thread while the next waits for its results. */
const AT_ONCE = 2;
const KEPT_MS = 24 * 3_600_000;
const SWEEP_MS = 3_600_000;
/** Files kept of a person. */
const MOST_FILES = 20;

/** Works off the orders for reports, in the order in which they came. */
export class ReportRunner {
  private readonly waiting: ReportOrderRow[] = [];
  private readonly underWay = new Map<string, UnderWay>();
  private sweeper: NodeJS.Timeout | undefined;
  private closed = false;

  constructor(
    private readonly reports: ReportRepository,
    private readonly options: ReportRunnerOptions,
  ) {}

  /** What an earlier server left behind is taken up; called once, when the server starts. */
  takeUp(): void {
    for (const order of this.reports.unfinished()) {
      if (order.attempt < MOST_ATTEMPTS) this.add(order);
      else this.fail(order.id, new Error('the server ended twice while this report was made'));
    }
    this.sweep();
    this.sweeper = setInterval(() => this.sweep(), SWEEP_MS).unref();
  }

  add(order: ReportOrderRow): void {
    this.waiting.push(order);
    this.next();
  }

  /** Ends an order at once, whatever it is at. */
  cancel(jobId: string): void {
    const place = this.waiting.findIndex(({ id }) => id === jobId);
    if (place !== -1) this.waiting.splice(place, 1);
    if (this.reports.end(jobId, 'cancelled', this.time())) this.tell(jobId);
    this.underWay.get(jobId)?.calledOff.abort();
  }

  /** The order with what is being done about it at the moment. */
  present(job: ReportJob): ReportJob {
    const now = this.underWay.get(job.id);
    return now === undefined || job.state !== 'running' ? job : { ...job, progress: now.progress, doing: now.doing };
  }

  /** Leaves off; what was not finished is taken up by the next server. */
  close(): void {
    this.closed = true;
    clearInterval(this.sweeper);
    for (const { calledOff } of this.underWay.values()) calledOff.abort();
  }

  private next(): void {
    while (!this.closed && this.underWay.size < AT_ONCE) {
      const order = this.waiting.shift();
      if (order === undefined) return;
      const work = { calledOff: new AbortController(), progress: 0, doing: 'Waiting for the results' };
      this.underWay.set(order.id, work);
      void this.work(order, work)
        .catch(this.options.report)
        .finally(() => {
          this.underWay.delete(order.id);
          this.next();
        });
    }
  }

  /** Ends in the order's row, and rejects only where that cannot be written. */
  private async work(order: ReportOrderRow, work: UnderWay): Promise<void> {
    const { signal } = work.calledOff;
    for (let attempt = order.attempt + 1; ; attempt += 1) {
      try {
        this.reports.start(order.id, attempt, this.time());
        this.tell(order.id);
        const content = await this.make(order, work);
        if (!signal.aborted) this.store(order, content);
        return;
      } catch (error) {
        if (signal.aborted) return;
        if (!(error instanceof ProblemError)) this.options.report(error);
        if (error instanceof ProblemError || attempt >= MOST_ATTEMPTS) return this.fail(order.id, error);
      }
    }
  }

  private async make(order: ReportOrderRow, work: UnderWay): Promise<Buffer> {
    const { signal } = work.calledOff;
    const material = await unlessAborted(this.options.gather(order), signal);
    const told = (share: number, doing: string): void => {
      Object.assign(work, { progress: share, doing });
      this.tell(order.id);
    };
    const { format } = order.input;
    return Buffer.from(await this.options.port.make({ format, material }, told, signal));
  }

  private store({ id, siteId, networkId, personId, input }: ReportOrderRow, content: Buffer): void {
    const at = this.options.now();
    const { format, revisionId } = input;
    const stored = this.reports.finish(id, content, at.toISOString(), (sha256) => ({
      ...{ at, personId, siteId, action: 'report.make', subject: networkId },
      details: {
        jobId: id,
        format,
        ...(revisionId === undefined ? {} : { revisionId }),
        sha256,
        bytes: content.length,
      },
    }));
    if (stored) this.reports.keepNewest(personId, MOST_FILES);
    this.tell(id);
  }

  private fail(jobId: string, error: unknown): void {
    const problem =
      error instanceof ProblemError
        ? error.problem
        : problemOf('internal', 'The report could not be made. Try again; if it fails once more, report the network.');
    this.reports.end(jobId, 'failed', this.time(), problem);
    this.tell(jobId);
  }

  private tell(jobId: string): void {
    const job = this.reports.byId(jobId);
    if (job !== undefined) this.options.changed(this.present(job));
  }

  private sweep(): void {
    this.reports.sweep(new Date(this.options.now().getTime() - KEPT_MS).toISOString());
  }

  private time(): string {
    return this.options.now().toISOString();
  }
}

/** The promise, or a rejection as soon as nobody waits for it any longer. */
function unlessAborted<T>(promise: Promise<T>, signal: AbortSignal): Promise<T> {
  return new Promise((resolve, reject) => {
    const calledOff = () => reject(new Error('called off'));
    signal.addEventListener('abort', calledOff, { once: true });
    promise.then(resolve, reject).finally(() => signal.removeEventListener('abort', calledOff));
  });
}

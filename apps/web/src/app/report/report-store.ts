import { computed, inject, Injectable, signal } from '@angular/core';
import { takeUntilDestroyed, toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { Problem, ReportJob, ReportRequest } from '@riseback/contracts';
import {
  catchError,
  EMPTY,
  filter,
  firstValueFrom,
  fromEvent,
  map,
  merge,
  startWith,
  switchMap,
  tap,
  timer,
} from 'rxjs';
import { type Load, LOADING } from '../shared/load';
import { toProblem } from '../shared/problem';
import { rereading } from '../shared/rereading';
import { ReportApi } from './report-api';

/** A stream that was refused is not asked for again at once. */
const AGAIN_MS = 3_000;

/** A person's own reports of one network, and how far each is. In the page's `providers`. */
@Injectable()
export class ReportStore {
  private readonly api = inject(ReportApi);

  readonly networkId = signal('');
  private readonly asked = signal(0);
  private readonly reading = computed(() => ({ key: this.networkId(), count: this.asked() }));
  /** What was heard of reports since the list was read, by id. */
  private readonly heard = signal<ReadonlyMap<string, ReportJob>>(new Map());
  /** What was ordered from this page, so that it can be ordered once more just so. */
  private readonly requests = new Map<string, ReportRequest>();

  readonly load = toSignal<Load<ReportJob[]>, Load<ReportJob[]>>(
    rereading(this.reading, (networkId) => this.api.list(networkId).pipe(tap(() => this.heard.set(new Map())))),
    { initialValue: LOADING },
  );
  /** The newest first. */
  readonly jobs = computed((): readonly ReportJob[] => {
    const load = this.load();
    const heard = this.heard();
    const listed = load.status === 'ready' ? load.value : [];
    const known = new Set(listed.map(({ id }) => id));
    return [
      ...listed.map((job) => heard.get(job.id) ?? job),
      ...[...heard.values()].filter(({ id }) => !known.has(id)),
    ].sort((a, b) => b.createdAt.localeCompare(a.createdAt));
  });
  readonly ordering = signal(false);
  /** Why the last command was refused. */
  readonly rejection = signal<Problem | null>(null);
  /** What became of a report, said once. */
  readonly news = signal('');

  private readonly unfinished = computed(
    () => ({
      networkId: this.networkId(),
      ids: this.jobs()
        .filter(isUnfinished)
        .map(({ id }) => id),
      count: this.asked(),
    }),
    { equal: (a, b) => a.networkId === b.networkId && a.count === b.count && a.ids.join() === b.ids.join() },
  );

  constructor() {
    const seen = fromEvent(document, 'visibilitychange').pipe(
      startWith(null),
      map(() => document.visibilityState !== 'hidden'),
    );
    toObservable(this.unfinished)
      .pipe(
        filter(({ networkId }) => networkId !== ''),
        // a hidden tab would hold some of the browser's few connections
        switchMap((wanted) => seen.pipe(map((visible) => ({ ...wanted, ids: visible ? wanted.ids : [] })))),
        switchMap(({ networkId, ids }) => merge(...ids.map((id) => this.followed(networkId, id)))),
        takeUntilDestroyed(),
      )
      .subscribe((job) => this.hear(job));
  }

  contentUrl(jobId: string): string {
    return this.api.contentUrl(this.networkId(), jobId);
  }

  reload(): void {
    this.asked.update((count) => count + 1);
  }

  async order(request: ReportRequest): Promise<void> {
    this.ordering.set(true);
    this.rejection.set(null);
    try {
      const job = await firstValueFrom(this.api.order(this.networkId(), request));
      this.requests.set(job.id, request);
      this.hear(job);
      this.news.set(`${job.name} is being made.`);
    } catch (error) {
      this.rejection.set(toProblem(error));
    } finally {
      this.ordering.set(false);
    }
  }

  /** The same once more; of one that another page ordered, only what its row tells is known. */
  async orderAgain(job: ReportJob, paper: ReportRequest['paper']): Promise<void> {
    const { id, format, revisionId } = job;
    await this.order(
      this.requests.get(id) ?? { format, paper, ledgersOf: [], ...(revisionId === undefined ? {} : { revisionId }) },
    );
  }

  async cancel(jobId: string): Promise<void> {
    this.rejection.set(null);
    try {
      this.hear(await firstValueFrom(this.api.cancel(this.networkId(), jobId)));
    } catch (error) {
      this.rejection.set(toProblem(error));
    }
  }

  private followed(networkId: string, jobId: string) {
    return this.api.progress(networkId, jobId).pipe(
      catchError(() =>
        timer(AGAIN_MS).pipe(
          switchMap(() => {
            this.reload();
            return EMPTY;
          }),
        ),
      ),
    );
  }

  private hear(job: ReportJob): void {
    const before = this.jobs().find(({ id }) => id === job.id);
    this.heard.update((heard) => new Map(heard).set(job.id, job));
    if (before !== undefined && before.state !== job.state && !isUnfinished(job)) this.news.set(newsOf(job));
  }
}

export function isUnfinished({ state }: Pick<ReportJob, 'state'>): boolean {
  return state === 'waiting' || state === 'running';
}

function newsOf({ name, state, problem }: ReportJob): string {
  switch (state) {
    case 'finished':
      return `${name} is made and can be downloaded.`;
    case 'cancelled':
      return `${name} was called off.`;
    case 'failed':
      return `${name} could not be made. ${problem?.detail ?? problem?.title ?? ''}`.trim();
    case 'waiting':
    case 'running':
      return '';
  }
}

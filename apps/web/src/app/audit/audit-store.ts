import { computed, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { AuditFilter, AuditPage, AuditRecord, Problem } from '@riseback/contracts';
import { filter, firstValueFrom, switchMap, tap } from 'rxjs';
import { type Load, LOADING, loads } from '../shared/load';
import { toProblem } from '../shared/problem';
import { AuditApi } from './audit-api';

/** The log of one site as far as it was asked for: the newest page, and older ones one after the other. */
@Injectable()
export class AuditStore {
  private readonly api = inject(AuditApi);

  readonly siteId = signal('');
  readonly filter = signal<AuditFilter>({});
  /** Pages below the first, which a new filter drops. */
  private readonly older = signal<readonly AuditPage[]>([]);
  private readonly asked = signal(0);
  private readonly query = computed(() => ({ siteId: this.siteId(), filter: this.filter(), asked: this.asked() }));

  readonly loadingOlder = signal(false);
  readonly problem = signal<Problem | null>(null);
  readonly first = toSignal<Load<AuditPage>, Load<AuditPage>>(
    toObservable(this.query).pipe(
      filter(({ siteId }) => siteId !== ''),
      tap(() => this.older.set([])),
      switchMap((query) => loads(this.api.page(query.siteId, query.filter))),
    ),
    { initialValue: LOADING },
  );
  readonly entries = computed((): readonly AuditRecord[] => {
    const first = this.first();
    return first.status === 'ready' ? [first.value, ...this.older()].flatMap(({ entries }) => entries) : [];
  });
  readonly nextBefore = computed(() => {
    const first = this.first();
    return first.status === 'ready' ? (this.older().at(-1) ?? first.value).nextBefore : undefined;
  });

  exportUrl(format: 'csv' | 'json'): string {
    return this.api.exportUrl(this.siteId(), this.filter(), format);
  }

  change(change: AuditFilter): void {
    this.filter.update((before) => ({ ...before, ...change }));
  }

  ask(): void {
    this.asked.update((count) => count + 1);
  }

  async loadOlder(): Promise<void> {
    const before = this.nextBefore();
    if (before === undefined || this.loadingOlder()) return;
    const query = this.query();
    this.loadingOlder.set(true);
    this.problem.set(null);
    try {
      const page = await firstValueFrom(this.api.page(query.siteId, query.filter, before));
      // a page of another filter would not belong to what is shown by now
      if (query === this.query()) this.older.update((pages) => [...pages, page]);
    } catch (error) {
      this.problem.set(toProblem(error));
    } finally {
      this.loadingOlder.set(false);
    }
  }
}

import { TestBed } from '@angular/core/testing';
import type { ReportJob, ReportRequest } from '@riseback/contracts';
import { NEVER, type Observable, of, Subject, throwError } from 'rxjs';
import { describe, expect, it } from 'vitest';
import { ReportApi } from './report-api';
import { ReportStore } from './report-store';

const REQUEST: ReportRequest = { format: 'xlsx', paper: 'letter', ledgersOf: ['T1'] };

function job(change: Partial<ReportJob> = {}): ReportJob {
  return {
    id: 'j1',
    name: 'plant.xlsx',
    format: 'xlsx',
    state: 'running',
    progress: 0.2,
    doing: 'Filling the tables',
    createdAt: '2026-03-01T08:00:00.000Z',
    ...change,
  };
}

function storeWith(api: Partial<Record<keyof ReportApi, unknown>>): ReportStore {
  TestBed.configureTestingModule({
    providers: [ReportStore, { provide: ReportApi, useValue: { list: () => of([]), progress: () => NEVER, ...api } }],
  });
  const store = TestBed.inject(ReportStore);
  store.networkId.set('n1');
  TestBed.tick();
  return store;
}

describe('ReportStore', () => {
  it('follows what is not finished, and says once what became of it', () => {
    const steps = new Subject<ReportJob>();
    const store = storeWith({ list: () => of([job()]), progress: () => steps });
    steps.next(job({ progress: 0.8, doing: 'Writing the workbook' }));
    expect(store.jobs()[0]?.doing).toBe('Writing the workbook');
    expect(store.news()).toBe('');
    steps.next(job({ state: 'finished', progress: 1 }));
    expect(store.news()).toBe('plant.xlsx is made and can be downloaded.');
    TestBed.tick();
    expect(steps.observed).toBe(false);
  });

  it('shows what was ordered at once, the newest first', async () => {
    const newer = job({ id: 'j2', createdAt: '2026-03-01T09:00:00.000Z' });
    const store = storeWith({ list: () => of([job({ state: 'finished' })]), order: () => of(newer) });
    await store.order(REQUEST);
    expect(store.jobs().map(({ id }) => id)).toEqual(['j2', 'j1']);
  });

  it('orders again what failed just as it was ordered', async () => {
    const ordered: ReportRequest[] = [];
    const order = (_: string, request: ReportRequest): Observable<ReportJob> => {
      ordered.push(request);
      return of(job({ id: `j${String(ordered.length)}`, state: 'failed' }));
    };
    const store = storeWith({ order });
    await store.order(REQUEST);
    await store.orderAgain(job({ id: 'j1' }), 'a4');
    // of one from another page, what its row tells
    await store.orderAgain(job({ id: 'elsewhere', revisionId: 'r1' }), 'a4');
    expect(ordered.slice(1)).toEqual([REQUEST, { format: 'xlsx', paper: 'a4', ledgersOf: [], revisionId: 'r1' }]);
  });

  it('says why an order was refused', async () => {
    const store = storeWith({ order: () => throwError(() => new Error('broken')) });
    await store.order(REQUEST);
    expect(store.rejection()?.title).toBe('The answer could not be understood');
    expect(store.ordering()).toBe(false);
  });
});

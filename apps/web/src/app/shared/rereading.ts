import type { Signal } from '@angular/core';
import { toObservable } from '@angular/core/rxjs-interop';
import { filter, map, type Observable, scan, switchMap } from 'rxjs';
import { type Load, LOADING, loads } from './load';

/** What is asked for, and how often it was asked for anew. */
export interface Reading {
  /** '' while there is nothing to ask for. */
  readonly key: string;
  readonly count: number;
}

interface Kept<T> {
  readonly key: string;
  readonly load: Load<T>;
}

/**
 * Reads something now and whenever its count goes up. What was read stays on screen while it is read anew, and while the server cannot be
 * reached; a refusal replaces it, since what was seen before may not be seen any more.
 */
export function rereading<T>(reading: Signal<Reading>, request: (key: string) => Observable<T>): Observable<Load<T>> {
  return toObservable(reading).pipe(
    filter(({ key }) => key !== ''),
    switchMap(({ key }) => loads(request(key)).pipe(map((load): Kept<T> => ({ key, load })))),
    scan(
      (before: Kept<T>, now): Kept<T> => {
        if (before.key !== now.key || before.load.status !== 'ready') return now;
        const passing = now.load.status === 'loading' || (now.load.status === 'failed' && isPassing(now.load.problem));
        return passing ? before : now;
      },
      { key: '', load: LOADING },
    ),
    map(({ load }) => load),
  );
}

function isPassing({ status }: { readonly status: number }): boolean {
  return status === 0 || status >= 502;
}

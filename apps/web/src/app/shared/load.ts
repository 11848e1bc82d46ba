import type { Problem } from '@riseback/contracts';
import { catchError, map, type Observable, of, startWith } from 'rxjs';
import { toProblem } from './problem';

/** Something asked of the server: on its way, here, or not to be had. */
export type Load<T> =
  | { readonly status: 'loading' }
  | { readonly status: 'ready'; readonly value: T }
  | { readonly status: 'failed'; readonly problem: Problem };

export const LOADING = { status: 'loading' } as const;

/** The request as a stream of its states; it never fails, so that the stream around it outlives a failure. */
export function loads<T>(request: Observable<T>): Observable<Load<T>> {
  return request.pipe(
    map((value): Load<T> => ({ status: 'ready', value })),
    catchError((error: unknown) => of<Load<T>>({ status: 'failed', problem: toProblem(error) })),
    startWith<Load<T>>(LOADING),
  );
}

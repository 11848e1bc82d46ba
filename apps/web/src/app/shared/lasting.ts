import { computed, type Signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { map, of, switchMap, timer } from 'rxjs';

/** True once the source has been true for so long, and false at once with it: what is over sooner would only flicker. */
export function lasting(source: Signal<boolean>, afterMs: number): Signal<boolean> {
  const long = toSignal(
    toObservable(source).pipe(switchMap((on) => (on ? timer(afterMs).pipe(map(() => true)) : of(false)))),
    { initialValue: false },
  );
  return computed(() => source() && long());
}

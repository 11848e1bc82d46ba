import type { Signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { fromEvent, map, merge, startWith } from 'rxjs';

/** Whether the device has a connection at all, as the browser knows it. In an injection context. */
export function onlineSignal(): Signal<boolean> {
  return toSignal(
    merge(fromEvent(window, 'online'), fromEvent(window, 'offline')).pipe(
      startWith(null),
      map(() => navigator.onLine),
    ),
    { requireSync: true },
  );
}

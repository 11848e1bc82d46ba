import { PeopleEvent, type PersonHere, SavedBatch, SolveEvent } from '@riseback/contracts';
import { Observable } from 'rxjs';

export type NetworkEvent =
  /** A stream has been opened, the first or another one. */
  | { readonly kind: 'open' }
  | { readonly kind: 'edit'; readonly batch: SavedBatch }
  | { readonly kind: 'solve'; readonly solve: SolveEvent }
  | { readonly kind: 'people'; readonly people: readonly PersonHere[] }
  | { readonly kind: 'plan' }
  | { readonly kind: 'revisions' }
  | { readonly kind: 'comments' }
  | { readonly kind: 'rounds' }
  | { readonly kind: 'reload' };

/** A browser gives up on a stream that was refused; it may be let in again later. */
const AGAIN_MS = 10_000;

/**
 * What happens on a network, for as long as the page can be seen: a hidden tab would hold one of the browser's few connections.
 * @param since the version that this page has, asked whenever a stream is opened
 */
export function networkEvents(networkId: string, since: () => number): Observable<NetworkEvent> {
  return new Observable((subscriber) => {
    let source: EventSource | undefined;
    let again: ReturnType<typeof setTimeout> | undefined;

    const close = (): void => {
      clearTimeout(again);
      source?.close();
      source = undefined;
    };
    const open = (): void => {
      close();
      if (document.visibilityState === 'hidden') return;
      source = new EventSource(`/api/networks/${networkId}/events?since=${String(since())}`);
      const on = (name: string, take: (data: unknown) => NetworkEvent): void => {
        source?.addEventListener(name, (event: MessageEvent<string>) => {
          subscriber.next(take(JSON.parse(event.data)));
        });
      };
      on('edit', (data) => ({ kind: 'edit', batch: SavedBatch.parse(data) }));
      on('solve', (data) => ({ kind: 'solve', solve: SolveEvent.parse(data) }));
      on('people', (data) => ({ kind: 'people', people: PeopleEvent.parse(data).people }));
      on('plan', () => ({ kind: 'plan' }));
      on('revisions', () => ({ kind: 'revisions' }));
      on('comments', () => ({ kind: 'comments' }));
      on('rounds', () => ({ kind: 'rounds' }));
      on('reload', () => ({ kind: 'reload' }));
      source.addEventListener('open', () => subscriber.next({ kind: 'open' }));
      source.addEventListener('error', () => {
        if (source?.readyState === EventSource.CLOSED) again = setTimeout(open, AGAIN_MS);
      });
    };

    document.addEventListener('visibilitychange', open);
    // what the page leaves in the back-forward cache must not hold a connection either
    window.addEventListener('pagehide', close);
    window.addEventListener('pageshow', open);
    open();
    return () => {
      document.removeEventListener('visibilitychange', open);
      window.removeEventListener('pagehide', close);
      window.removeEventListener('pageshow', open);
      close();
    };
  });
}

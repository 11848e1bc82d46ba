import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { CommentThread, NamedPerson, type NewComment } from '@riseback/contracts';
import { map, type Observable, retry, throwError, timer } from 'rxjs';
import { isTransient } from '../shared/problem';

@Injectable({ providedIn: 'root' })
export class CommentApi {
  private readonly http = inject(HttpClient);

  /** All threads of the network, those at its revisions too. */
  threads(networkId: string): Observable<CommentThread[]> {
    return this.http.get<unknown>(`/api/networks/${networkId}/comments`).pipe(
      retry({
        count: 2,
        delay: (error: unknown, attempt) => (isTransient(error) ? timer(250 * 2 ** attempt) : throwError(() => error)),
      }),
      map((body) => CommentThread.array().parse(body)),
    );
  }

  add(networkId: string, comment: Omit<NewComment, 'mentions'> & { mentions: readonly string[] }): Observable<unknown> {
    return this.http.post<unknown>(`/api/networks/${networkId}/comments`, comment);
  }

  resolve(networkId: string, threadId: string, resolved: boolean): Observable<unknown> {
    const thread = encodeURIComponent(threadId);
    return this.http.post<unknown>(`/api/networks/${networkId}/comments/${thread}/resolution`, { resolved });
  }

  names(siteId: string): Observable<NamedPerson[]> {
    return this.http.get<unknown>(`/api/sites/${siteId}/names`).pipe(map((body) => NamedPerson.array().parse(body)));
  }
}

import { HttpClient, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { EditAccepted, Network, NetworkResults, NetworkSummary, SavedBatch } from '@riseback/contracts';
import type { EditBatch, NetworkFile } from '@riseback/network';
import { EMPTY, expand, map, type Observable, reduce, retry, throwError, timer } from 'rxjs';
import { isTransient } from '../shared/problem';

@Injectable({ providedIn: 'root' })
export class NetworkApi {
  private readonly http = inject(HttpClient);

  list(siteId: string): Observable<NetworkSummary[]> {
    return this.http.get<unknown>(`/api/sites/${siteId}/networks`).pipe(
      retryTransient(),
      map((body) => NetworkSummary.array().parse(body)),
    );
  }

  /** Makes a network out of a network file, read on the server; `file` goes as it was given, mistakes included. */
  create(siteId: string, file: unknown): Observable<{ id: string; name: string }> {
    return this.http
      .post<unknown>(`/api/sites/${siteId}/networks`, file)
      .pipe(map((body) => NetworkSummary.pick({ id: true, name: true }).parse(body)));
  }

  get(networkId: string): Observable<Network> {
    return this.http.get<unknown>(`/api/networks/${networkId}`).pipe(
      retryTransient(),
      map((body) => Network.parse(body)),
    );
  }

  file(networkId: string): Observable<NetworkFile> {
    return this.http.get<NetworkFile>(`/api/networks/${networkId}/file`).pipe(retryTransient());
  }

  /** Safe to send again: the server answers a known batchId with its first answer. */
  edit(networkId: string, version: number, batch: EditBatch): Observable<EditAccepted> {
    return this.http
      .post<unknown>(`/api/networks/${networkId}/edits`, batch, { headers: { 'If-Match': `"${String(version)}"` } })
      .pipe(
        retryTransient(),
        map((body) => EditAccepted.parse(body)),
      );
  }

  /** All that was saved after a version, however many answers the server tells it in. */
  editsSince(networkId: string, version: number): Observable<SavedBatch[]> {
    return this.editPage(networkId, version).pipe(
      expand(({ batches, more }) => {
        const last = batches.at(-1);
        return more && last !== undefined ? this.editPage(networkId, last.version) : EMPTY;
      }),
      reduce((all: SavedBatch[], { batches }) => [...all, ...batches], []),
    );
  }

  /** What this person has selected, for the others on the network. */
  present(networkId: string, selected: readonly string[]): Observable<unknown> {
    return this.http.post<unknown>(`/api/networks/${networkId}/presence`, { selected });
  }

  /** @param bands `later`: answered as soon as there are pressures, perhaps with `bandsToCome` */
  results(networkId: string, version: number, bands?: 'later'): Observable<NetworkResults> {
    const params = new HttpParams({ fromObject: bands === undefined ? { version } : { version, bands } });
    return this.http.get<unknown>(`/api/networks/${networkId}/results`, { params }).pipe(
      retryTransient(),
      map((body) => NetworkResults.parse(body)),
    );
  }

  /** Of a long history the server tells the first part, and in the header Link that there is more. */
  private editPage(networkId: string, version: number): Observable<{ batches: SavedBatch[]; more: boolean }> {
    const params = new HttpParams({ fromObject: { since: version } });
    return this.http.get<unknown>(`/api/networks/${networkId}/edits`, { params, observe: 'response' }).pipe(
      retryTransient(),
      map(({ body, headers }) => ({ batches: SavedBatch.array().parse(body), more: headers.has('Link') })),
    );
  }
}

function retryTransient<T>() {
  return retry<T>({
    count: 3,
    delay: (error: unknown, attempt) => (isTransient(error) ? timer(250 * 2 ** attempt) : throwError(() => error)),
  });
}

import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { LibraryModel, type SavedLibraryModel } from '@riseback/contracts';
import { map, type Observable, retry, throwError, timer } from 'rxjs';
import { isTransient } from '../shared/problem';

@Injectable({ providedIn: 'root' })
export class LibraryApi {
  private readonly http = inject(HttpClient);

  /** Each model in its newest version, retired ones too. */
  list(siteId: string): Observable<LibraryModel[]> {
    return this.read(`/api/sites/${siteId}/library`).pipe(map((body) => LibraryModel.array().parse(body)));
  }

  /** The newest first. */
  versions(siteId: string, modelId: string): Observable<LibraryModel[]> {
    return this.read(`/api/sites/${siteId}/library/${modelId}/versions`).pipe(
      map((body) => LibraryModel.array().parse(body)),
    );
  }

  add(siteId: string, model: SavedLibraryModel): Observable<LibraryModel> {
    return this.http.post<unknown>(`/api/sites/${siteId}/library`, model).pipe(map((body) => LibraryModel.parse(body)));
  }

  /** Saves on a version; another one there meanwhile is a 412 with what stands there. */
  save(siteId: string, modelId: string, version: number, model: SavedLibraryModel): Observable<LibraryModel> {
    return this.http
      .put<unknown>(`/api/sites/${siteId}/library/${modelId}`, model, {
        headers: { 'If-Match': `"${String(version)}"` },
      })
      .pipe(map((body) => LibraryModel.parse(body)));
  }

  private read(url: string): Observable<unknown> {
    return this.http.get<unknown>(url).pipe(
      retry({
        count: 2,
        delay: (error: unknown, n) => (isTransient(error) ? timer(250 * 2 ** n) : throwError(() => error)),
      }),
    );
  }
}

import { HttpClient, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import {
  NetworkResults,
  type NewRevision,
  type NewSignature,
  Revision,
  RevisionSummary,
  type SignatureMeaning,
  SigningTerms,
  Verification,
} from '@riseback/contracts';
import { map, type Observable, retry, throwError, timer } from 'rxjs';
import { isTransient } from '../shared/problem';

/** What moves a revision on, by the last part of its address. */
export type RevisionStep = 'submission' | 'return' | 'withdrawal';

@Injectable({ providedIn: 'root' })
export class RevisionApi {
  private readonly http = inject(HttpClient);

  list(networkId: string): Observable<RevisionSummary[]> {
    return this.http.get<unknown>(revisionsOf(networkId)).pipe(
      retryTransient(),
      map((body) => RevisionSummary.array().parse(body)),
    );
  }

  get(networkId: string, revisionId: string): Observable<Revision> {
    return this.http.get<unknown>(oneOf(networkId, revisionId)).pipe(
      retryTransient(),
      map((body) => Revision.parse(body)),
    );
  }

  /** As they were frozen; they never change. */
  results(networkId: string, revisionId: string): Observable<NetworkResults> {
    return this.http.get<unknown>(`${oneOf(networkId, revisionId)}/results`).pipe(
      retryTransient(),
      map((body) => NetworkResults.parse(body)),
    );
  }

  freeze(networkId: string, input: NewRevision): Observable<{ id: string }> {
    return this.http
      .post<unknown>(revisionsOf(networkId), input)
      .pipe(map((body) => Revision.pick({ id: true }).parse(body)));
  }

  step(networkId: string, revisionId: string, step: RevisionStep, note: string): Observable<unknown> {
    return this.http.post<unknown>(`${oneOf(networkId, revisionId)}/${step}`, { note });
  }

  terms(networkId: string, revisionId: string, meaning: SignatureMeaning): Observable<SigningTerms> {
    const params = new HttpParams({ fromObject: { meaning } });
    return this.http.get<unknown>(`${oneOf(networkId, revisionId)}/signing`, { params }).pipe(
      retryTransient(),
      map((body) => SigningTerms.parse(body)),
    );
  }

  sign(networkId: string, revisionId: string, input: NewSignature): Observable<unknown> {
    return this.http.post<unknown>(`${oneOf(networkId, revisionId)}/signatures`, input);
  }

  verification(networkId: string, revisionId: string): Observable<Verification> {
    return this.http
      .get<unknown>(`${oneOf(networkId, revisionId)}/verification`)
      .pipe(map((body) => Verification.parse(body)));
  }
}

function revisionsOf(networkId: string): string {
  return `/api/networks/${networkId}/revisions`;
}

function oneOf(networkId: string, revisionId: string): string {
  return `${revisionsOf(networkId)}/${encodeURIComponent(revisionId)}`;
}

function retryTransient<T>() {
  return retry<T>({
    count: 2,
    delay: (error: unknown, attempt) => (isTransient(error) ? timer(250 * 2 ** attempt) : throwError(() => error)),
  });
}

import { HttpClient, HttpErrorResponse, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { type CaseOutcome, SolveResult } from '@riseback/contracts';
import type { NetworkFile } from '@riseback/network';
import { catchError, from, map, mergeMap, type Observable, of, retry, throwError, timer, toArray } from 'rxjs';
import { isTransient, toProblem } from '../shared/problem';

/** As many solves of one trial at once: the server has few threads, and other people. */
const AT_ONCE = 2;

/** Solves a network that is not stored: nothing of it stays on the server. */
@Injectable({ providedIn: 'root' })
export class TrialApi {
  private readonly http = inject(HttpClient);

  /** Each case's outcome, in the order given; a case that cannot be solved is refused by name while the others stand. */
  solve(file: NetworkFile, caseIds: readonly string[]): Observable<CaseOutcome[]> {
    return from(caseIds).pipe(
      mergeMap((caseId) => this.solveCase(file, caseId), AT_ONCE),
      toArray(),
      map((outcomes) => outcomes.sort((a, b) => caseIds.indexOf(a.caseId) - caseIds.indexOf(b.caseId))),
    );
  }

  private solveCase(file: NetworkFile, caseId: string): Observable<CaseOutcome> {
    const params = caseId === '' ? new HttpParams() : new HttpParams({ fromObject: { case: caseId } });
    return this.http.post<unknown>('/api/solve', file, { params }).pipe(
      // a solve changes nothing, so it may be asked for again
      retry({
        count: 2,
        delay: (error: unknown, attempt) => (isTransient(error) ? timer(250 * 2 ** attempt) : throwError(() => error)),
      }),
      map((body): CaseOutcome => ({ caseId, status: 'solved', result: SolveResult.parse(body) })),
      catchError((error: unknown) =>
        error instanceof HttpErrorResponse && error.status === 400
          ? of<CaseOutcome>({ caseId, status: 'refused', problem: toProblem(error) })
          : throwError(() => error),
      ),
    );
  }
}

import { HttpClient, HttpParams } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { SolveResult, type TrapResult } from '@riseback/contracts';
import { applyBatch, type EditOp, type NetworkDocument, toFile } from '@riseback/network';
import { catchError, map, type Observable, of } from 'rxjs';
import { toProblem } from '../../shared/problem';
import { turnWords, verdictsOf } from './turned-verdicts';

export interface TrialBase {
  readonly document: NetworkDocument;
  /** '' for the network without cases; null while each trap shows a case of its own. */
  readonly caseId: string | null;
  /** What is shown now. */
  readonly traps: ReadonlyMap<string, TrapResult>;
}

/** Solves a change on the server without making it, to say which verdicts it would turn. */
@Injectable({ providedIn: 'root' })
export class TrialSolve {
  private readonly http = inject(HttpClient);

  /** One sentence; '' where the change touches no result. */
  outlook({ document, caseId, traps }: TrialBase, ops: readonly EditOp[]): Observable<string> {
    if (caseId === null) return of('Choose one case to see which verdicts it would turn.');
    if (ops.length === 0 || ops.every((op) => op.in === 'gauges')) return of('');
    const applied = applyBatch(document, ops);
    if (!applied.ok) return of('');
    const params = caseId === '' ? new HttpParams() : new HttpParams({ fromObject: { case: caseId } });
    return this.http.post<unknown>('/api/solve', toFile(applied.document), { params }).pipe(
      map((body) => SolveResult.parse(body)),
      map((result) =>
        result.converged
          ? turnWords(verdictsOf(traps.values()), verdictsOf(result.traps))
          : 'It would leave no solution.',
      ),
      catchError((error: unknown) => of(`Which verdicts it would turn cannot be told: ${toProblem(error).title}.`)),
    );
  }
}

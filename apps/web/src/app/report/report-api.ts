import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { ReportJob, type ReportRequest } from '@riseback/contracts';
import { map, Observable, retry, throwError, timer } from 'rxjs';
import { isTransient } from '../shared/problem';

@Injectable({ providedIn: 'root' })
export class ReportApi {
  private readonly http = inject(HttpClient);

  /** One's own of the last day, the newest first. */
  list(networkId: string): Observable<ReportJob[]> {
    return this.http.get<unknown>(reportsOf(networkId)).pipe(
      retry({
        count: 2,
        delay: (error: unknown, attempt) => (isTransient(error) ? timer(250 * 2 ** attempt) : throwError(() => error)),
      }),
      map((body) => ReportJob.array().parse(body)),
    );
  }

  order(networkId: string, request: ReportRequest): Observable<ReportJob> {
    return this.http.post<unknown>(reportsOf(networkId), request).pipe(map((body) => ReportJob.parse(body)));
  }

  /** Answers with the report as it then is: one that had ended meanwhile stays as it is. */
  cancel(networkId: string, jobId: string): Observable<ReportJob> {
    return this.http.delete<unknown>(oneOf(networkId, jobId)).pipe(map((body) => ReportJob.parse(body)));
  }

  /** Where the browser fetches the file from. */
  contentUrl(networkId: string, jobId: string): string {
    return `${oneOf(networkId, jobId)}/content`;
  }

  /** How far the report is, now and at each step; fails where the stream is refused. The browser itself takes up a broken one. */
  progress(networkId: string, jobId: string): Observable<ReportJob> {
    return new Observable((subscriber) => {
      const source = new EventSource(`${oneOf(networkId, jobId)}/events`);
      source.addEventListener('report', (event: MessageEvent<string>) => {
        subscriber.next(ReportJob.parse(JSON.parse(event.data)));
      });
      source.addEventListener('error', () => {
        if (source.readyState === EventSource.CLOSED) subscriber.error(new Error('The stream was refused'));
      });
      return () => source.close();
    });
  }
}

function reportsOf(networkId: string): string {
  return `/api/networks/${networkId}/reports`;
}

function oneOf(networkId: string, jobId: string): string {
  return `${reportsOf(networkId)}/${encodeURIComponent(jobId)}`;
}

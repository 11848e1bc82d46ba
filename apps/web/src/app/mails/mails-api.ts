import { HttpClient, HttpErrorResponse } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { OutboxMail, ReceivedMail, ReceivedMailContent } from '@riseback/contracts';
import { catchError, map, type Observable, of, throwError } from 'rxjs';

const NOT_FOUND = 404;

/** The mails of a site, for its administrators. */
@Injectable({ providedIn: 'root' })
export class MailsApi {
  private readonly http = inject(HttpClient);

  outbox(siteId: string): Observable<OutboxMail[]> {
    return this.http.get<unknown>(`/api/sites/${siteId}/mails`).pipe(map((body) => OutboxMail.array().parse(body)));
  }

  /** Null where real mail is sent: then nobody but its recipient reads it. */
  received(siteId: string): Observable<ReceivedMail[] | null> {
    return this.http.get<unknown>(receivedOf(siteId)).pipe(
      map((body) => ReceivedMail.array().parse(body)),
      catchError((error: unknown) =>
        error instanceof HttpErrorResponse && error.status === NOT_FOUND ? of(null) : throwError(() => error),
      ),
    );
  }

  content(siteId: string, mailId: string): Observable<ReceivedMailContent> {
    return this.http
      .get<unknown>(`${receivedOf(siteId)}/${encodeURIComponent(mailId)}`)
      .pipe(map((body) => ReceivedMailContent.parse(body)));
  }
}

function receivedOf(siteId: string): string {
  return `/api/sites/${siteId}/received-mails`;
}

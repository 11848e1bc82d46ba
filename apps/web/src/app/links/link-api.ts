import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { type InvitationAcceptance, LinkTold, type ResetCompletion, type ResetRequest } from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

/** What the links in mails are for. Tokens travel in bodies alone, never in an address. */
@Injectable({ providedIn: 'root' })
export class LinkApi {
  private readonly http = inject(HttpClient);

  ask(token: string): Observable<LinkTold> {
    return this.http.post<unknown>('/api/links', { token }).pipe(map((body) => LinkTold.parse(body)));
  }

  accept(acceptance: InvitationAcceptance): Observable<void> {
    return this.http.post<unknown>('/api/links/acceptance', acceptance).pipe(map(() => undefined));
  }

  requestReset(email: string): Observable<void> {
    return this.http.post<unknown>('/api/password-resets', { email } satisfies ResetRequest).pipe(map(() => undefined));
  }

  completeReset(completion: ResetCompletion): Observable<void> {
    return this.http.post<unknown>('/api/password-resets/completion', completion).pipe(map(() => undefined));
  }
}

import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import {
  CodesBegun,
  type CodesProof,
  CodesState,
  OwnSession,
  type PasswordChange,
  RecoveryCodes,
  Session,
  SessionsEnded,
} from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

const CODES = '/api/one-time-codes';
const SESSIONS = '/api/own-sessions';

/** What concerns one's own account beyond the profile. */
@Injectable({ providedIn: 'root' })
export class AccountApi {
  private readonly http = inject(HttpClient);

  changePassword(change: PasswordChange): Observable<Session> {
    return this.http.post<unknown>('/api/password', change).pipe(map((body) => Session.parse(body)));
  }

  sessions(): Observable<OwnSession[]> {
    return this.http.get<unknown>(SESSIONS).pipe(map((body) => OwnSession.array().parse(body)));
  }

  endSession(id: string): Observable<void> {
    return this.http.delete<unknown>(`${SESSIONS}/${encodeURIComponent(id)}`).pipe(map(() => undefined));
  }

  endOtherSessions(): Observable<SessionsEnded> {
    return this.http.delete<unknown>(SESSIONS).pipe(map((body) => SessionsEnded.parse(body)));
  }

  codes(): Observable<CodesState> {
    return this.http.get<unknown>(CODES).pipe(map((body) => CodesState.parse(body)));
  }

  beginCodes(password: string): Observable<CodesBegun> {
    return this.http.post<unknown>(CODES, { password }).pipe(map((body) => CodesBegun.parse(body)));
  }

  confirmCodes(code: string): Observable<RecoveryCodes> {
    return this.http.post<unknown>(`${CODES}/confirmation`, { code }).pipe(map((body) => RecoveryCodes.parse(body)));
  }

  turnCodesOff(proof: CodesProof): Observable<void> {
    return this.http.post<unknown>(`${CODES}/removal`, proof).pipe(map(() => undefined));
  }

  renewRecoveryCodes(proof: CodesProof): Observable<RecoveryCodes> {
    return this.http.post<unknown>('/api/recovery-codes', proof).pipe(map((body) => RecoveryCodes.parse(body)));
  }
}

import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { Person, type ProfileChange, Session, type SignIn } from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

@Injectable({ providedIn: 'root' })
export class SessionApi {
  private readonly http = inject(HttpClient);

  current(): Observable<Session> {
    return this.http.get<unknown>('/api/session').pipe(map((body) => Session.parse(body)));
  }

  signIn(input: SignIn): Observable<Session> {
    return this.http.post<unknown>('/api/session', input).pipe(map((body) => Session.parse(body)));
  }

  signOut(): Observable<void> {
    return this.http.delete<unknown>('/api/session').pipe(map(() => undefined));
  }

  changeProfile(change: ProfileChange): Observable<Person> {
    return this.http.patch<unknown>('/api/profile', change).pipe(map((body) => Person.parse(body)));
  }
}

import { HttpClient } from '@angular/common/http';
import { inject, Injectable } from '@angular/core';
import { Invitation, type NewInvitation, type Role, type RoleChange, SitePerson } from '@riseback/contracts';
import { map, type Observable } from 'rxjs';

/** What an administrator may do to the account of somebody who is at this site. */
export type AccountAct = 'disabling' | 'enabling' | 'password-reset' | 'codes-off';

/** Who is at a site, and who is invited; for its administrators. */
@Injectable({ providedIn: 'root' })
export class PeopleApi {
  private readonly http = inject(HttpClient);

  people(siteId: string): Observable<SitePerson[]> {
    return this.http.get<unknown>(peopleOf(siteId)).pipe(map((body) => SitePerson.array().parse(body)));
  }

  changeRole(siteId: string, personId: string, role: Role): Observable<void> {
    return this.http
      .put<unknown>(`${peopleOf(siteId)}/${personId}`, { role } satisfies RoleChange)
      .pipe(map(() => undefined));
  }

  takeRole(siteId: string, personId: string): Observable<void> {
    return this.http.delete<unknown>(`${peopleOf(siteId)}/${personId}`).pipe(map(() => undefined));
  }

  act(siteId: string, personId: string, what: AccountAct): Observable<void> {
    return this.http.post<unknown>(`${peopleOf(siteId)}/${personId}/${what}`, null).pipe(map(() => undefined));
  }

  invitations(siteId: string): Observable<Invitation[]> {
    return this.http.get<unknown>(invitationsOf(siteId)).pipe(map((body) => Invitation.array().parse(body)));
  }

  invite(siteId: string, invitation: NewInvitation): Observable<void> {
    return this.http.post<unknown>(invitationsOf(siteId), invitation).pipe(map(() => undefined));
  }

  sendAgain(siteId: string, invitationId: string): Observable<void> {
    return this.http.post<unknown>(`${invitationsOf(siteId)}/${invitationId}/sending`, null).pipe(map(() => undefined));
  }

  withdraw(siteId: string, invitationId: string): Observable<void> {
    return this.http.delete<unknown>(`${invitationsOf(siteId)}/${invitationId}`).pipe(map(() => undefined));
  }
}

function peopleOf(siteId: string): string {
  return `/api/sites/${siteId}/people`;
}

function invitationsOf(siteId: string): string {
  return `/api/sites/${siteId}/invitations`;
}

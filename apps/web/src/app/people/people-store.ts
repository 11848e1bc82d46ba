import { computed, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { Invitation, NewInvitation, Role, Site, SitePerson } from '@riseback/contracts';
import { filter, forkJoin, map, type Observable, of, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING, loads } from '../shared/load';
import { type Outcome, outcomeOf } from '../shared/outcome';
import { SiteApi } from '../sites/site-api';
import { type AccountAct, PeopleApi } from './people-api';

export interface SitePeople {
  readonly site: Site;
  /** Absent for who is not an administrator of the site. */
  readonly lists?: { readonly people: readonly SitePerson[]; readonly invitations: readonly Invitation[] };
}

/** The people of one site and the invitations to it. A command that was taken brings the lists up to date. */
@Injectable()
export class PeopleStore {
  private readonly api = inject(PeopleApi);
  private readonly sites = inject(SiteApi);
  private readonly session = inject(SessionStore);

  readonly siteId = signal('');
  private readonly asked = signal(0);
  private readonly query = computed(() => ({ siteId: this.siteId(), asked: this.asked() }));
  private readonly load = toSignal<Load<SitePeople>, Load<SitePeople>>(
    toObservable(this.query).pipe(
      filter(({ siteId }) => siteId !== ''),
      switchMap(({ siteId }) => loads(this.sites.get(siteId).pipe(switchMap((site) => this.listsOf(site))))),
    ),
    { initialValue: LOADING },
  );
  /** Kept while it is read anew, so that rows keep their place and the focus its button. */
  private last: SitePeople | null = null;

  readonly shown = computed((): Load<SitePeople> => {
    const load = this.load();
    if (load.status === 'ready') this.last = load.value;
    if (load.status !== 'loading' || this.last?.site.id !== this.siteId()) return load;
    return { status: 'ready', value: this.last };
  });
  readonly role = computed(() => {
    const shown = this.shown();
    return shown.status === 'ready' ? shown.value.site.role : null;
  });
  readonly ownId = computed(() => this.session.person()?.id);
  readonly timeZone = this.session.timeZone;

  reload(): void {
    this.asked.update((count) => count + 1);
  }

  changeRole({ id }: SitePerson, role: Role): Promise<Outcome<void>> {
    return this.run(this.api.changeRole(this.siteId(), id, role));
  }

  takeRole({ id }: SitePerson): Promise<Outcome<void>> {
    return this.run(this.api.takeRole(this.siteId(), id));
  }

  act({ id }: SitePerson, what: AccountAct): Promise<Outcome<void>> {
    return this.run(this.api.act(this.siteId(), id, what));
  }

  /** Several go one after the other; whoever invites asks for the lists once, at the end. */
  invite(invitation: NewInvitation): Promise<Outcome<void>> {
    return outcomeOf(this.api.invite(this.siteId(), invitation));
  }

  sendAgain({ id }: Invitation): Promise<Outcome<void>> {
    return this.run(this.api.sendAgain(this.siteId(), id));
  }

  withdraw({ id }: Invitation): Promise<Outcome<void>> {
    return this.run(this.api.withdraw(this.siteId(), id));
  }

  private listsOf(site: Site): Observable<SitePeople> {
    if (!site.permissions.includes('people')) return of({ site });
    const lists = forkJoin({ people: this.api.people(site.id), invitations: this.api.invitations(site.id) });
    return lists.pipe(map((both) => ({ site, lists: both })));
  }

  private async run(command: Observable<void>): Promise<Outcome<void>> {
    const outcome = await outcomeOf(command);
    if ('value' in outcome) this.reload();
    return outcome;
  }
}

import { computed, effect, inject, Injectable, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { OutboxMail, ReceivedMail, ReceivedMailContent, Site } from '@riseback/contracts';
import { filter, forkJoin, map, type Observable, of, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING, loads } from '../shared/load';
import { SiteApi } from '../sites/site-api';
import { MailsApi } from './mails-api';

const LOOK_AGAIN_AFTER_MS = 3_000;

export interface SiteMails {
  readonly site: Site;
  /** Absent for who is not an administrator of the site. */
  readonly lists?: {
    readonly outbox: readonly OutboxMail[];
    /** Null where real mail is sent. */
    readonly received: readonly ReceivedMail[] | null;
  };
}

/** The mails of a site; looked at again by itself while one of them is on its way. */
@Injectable()
export class MailsStore {
  private readonly api = inject(MailsApi);
  private readonly sites = inject(SiteApi);

  readonly siteId = signal('');
  /** Of the received mail that is open; '' for none. */
  readonly openId = signal('');
  private readonly asked = signal(0);
  private readonly query = computed(() => ({ siteId: this.siteId(), asked: this.asked() }));
  private readonly load = toSignal<Load<SiteMails>, Load<SiteMails>>(
    toObservable(this.query).pipe(
      filter(({ siteId }) => siteId !== ''),
      switchMap(({ siteId }) => loads(this.sites.get(siteId).pipe(switchMap((site) => this.listsOf(site))))),
    ),
    { initialValue: LOADING },
  );
  /** Kept while it is read anew, so that nothing flickers. */
  private last: SiteMails | null = null;

  readonly shown = computed((): Load<SiteMails> => {
    const load = this.load();
    if (load.status === 'ready') this.last = load.value;
    if (load.status !== 'loading' || this.last?.site.id !== this.siteId()) return load;
    return { status: 'ready', value: this.last };
  });
  readonly role = computed(() => {
    const shown = this.shown();
    return shown.status === 'ready' ? shown.value.site.role : null;
  });
  readonly timeZone = inject(SessionStore).timeZone;

  private readonly wanted = computed(() => ({ siteId: this.siteId(), mailId: this.openId() }));
  /** The open mail; null when none is. */
  readonly open = toSignal<Load<ReceivedMailContent> | null, null>(
    toObservable(this.wanted).pipe(
      switchMap(({ siteId, mailId }) =>
        siteId === '' || mailId === '' ? of(null) : loads(this.api.content(siteId, mailId)),
      ),
    ),
    { initialValue: null },
  );

  constructor() {
    effect((onCleanup) => {
      const load = this.load();
      if (load.status !== 'ready' || !isUnderWay(load.value)) return;
      const timer = setTimeout(() => this.look(), LOOK_AGAIN_AFTER_MS);
      onCleanup(() => clearTimeout(timer));
    });
  }

  look(): void {
    this.asked.update((count) => count + 1);
  }

  private listsOf(site: Site): Observable<SiteMails> {
    if (!site.permissions.includes('people')) return of({ site });
    const lists = forkJoin({ outbox: this.api.outbox(site.id), received: this.api.received(site.id) });
    return lists.pipe(map((both) => ({ site, lists: both })));
  }
}

function isUnderWay({ lists }: SiteMails): boolean {
  return lists?.outbox.some(({ state }) => state === 'waiting') ?? false;
}

import { computed, inject, Injectable, linkedSignal, signal } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { Site, SiteSettings, SiteSettingsChange } from '@riseback/contracts';
import type { DisplayUnits } from '@riseback/units';
import { filter, forkJoin, switchMap } from 'rxjs';
import { SessionStore } from '../session/session-store';
import { type Load, LOADING, loads } from '../shared/load';
import { outcomeOf } from '../shared/outcome';
import { SiteApi } from './site-api';

interface SiteWithSettings {
  readonly site: Site;
  readonly settings: SiteSettings;
}

/** The settings of the page's site. In the settings page's `providers`. */
@Injectable()
export class SiteSettingsStore {
  private readonly api = inject(SiteApi);
  private readonly session = inject(SessionStore);

  readonly siteId = signal('');
  private readonly asked = signal(0);
  private readonly query = computed(() => ({ siteId: this.siteId(), asked: this.asked() }));
  readonly load = toSignal<Load<SiteWithSettings>, Load<SiteWithSettings>>(
    toObservable(this.query).pipe(
      filter(({ siteId }) => siteId !== ''),
      switchMap(({ siteId }) => loads(forkJoin({ site: this.api.get(siteId), settings: this.api.settings(siteId) }))),
    ),
    { initialValue: LOADING },
  );
  readonly site = computed(() => {
    const load = this.load();
    return load.status === 'ready' ? load.value.site : null;
  });
  /** What was saved here included. */
  readonly settings = linkedSignal((): SiteSettings | null => {
    const load = this.load();
    return load.status === 'ready' ? load.value.settings : null;
  });
  readonly mayEdit = computed(() => this.site()?.permissions.includes('draw') ?? false);
  readonly units = computed((): DisplayUnits => ({
    system: this.session.unitSystem(),
    atmosphericPressurePa: this.settings()?.atmosphericPressurePa ?? 101_325,
  }));

  reload(): void {
    this.asked.update((count) => count + 1);
  }

  /** Why it was refused; '' when it was taken. */
  async change(change: SiteSettingsChange): Promise<string> {
    const outcome = await outcomeOf(this.api.changeSettings(this.siteId(), change));
    if ('value' in outcome) {
      this.settings.set(outcome.value);
      return '';
    }
    const { errors, detail, title } = outcome.problem;
    return errors?.[0]?.detail ?? detail ?? title;
  }
}

import { inject, Injectable, type Signal, signal, type WritableSignal } from '@angular/core';
import type { SiteSettings, TagPatterns } from '@riseback/contracts';
import { type Load, LOADING, loads } from '../shared/load';
import { SiteApi } from './site-api';

/** The settings of sites as network pages read them: asked anew when a network is opened, the last answer meanwhile. */
@Injectable({ providedIn: 'root' })
export class HeldSiteSettings {
  private readonly api = inject(SiteApi);
  private readonly bySite = new Map<string, WritableSignal<Load<SiteSettings>>>();

  of(siteId: string): Signal<Load<SiteSettings>> {
    return this.held(siteId).asReadonly();
  }

  /** None until they are here: a new element is then tagged after those that there are. */
  tagPatterns(siteId: string): TagPatterns {
    const load = this.held(siteId)();
    return load.status === 'ready' ? load.value.tagPatterns : {};
  }

  ask(siteId: string): void {
    const held = this.held(siteId);
    loads(this.api.settings(siteId)).subscribe((load) => {
      // what is known stays while it is asked for again, and when that fails
      if (load.status === 'ready' || held().status !== 'ready') held.set(load);
    });
  }

  private held(siteId: string): WritableSignal<Load<SiteSettings>> {
    const known = this.bySite.get(siteId);
    if (known !== undefined) return known;
    const made = signal<Load<SiteSettings>>(LOADING);
    this.bySite.set(siteId, made);
    return made;
  }
}

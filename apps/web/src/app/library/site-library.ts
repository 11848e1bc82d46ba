import { inject, Injectable, type Signal, signal, type WritableSignal } from '@angular/core';
import type { LibraryModel } from '@riseback/contracts';
import { type Load, LOADING, loads } from '../shared/load';
import { LibraryApi } from './library-api';

/** The trap libraries of sites as network pages read them: asked anew when something that shows one opens, the last answer meanwhile. */
@Injectable({ providedIn: 'root' })
export class SiteLibrary {
  private readonly api = inject(LibraryApi);
  private readonly bySite = new Map<string, WritableSignal<Load<readonly LibraryModel[]>>>();

  of(siteId: string): Signal<Load<readonly LibraryModel[]>> {
    return this.held(siteId).asReadonly();
  }

  ask(siteId: string): void {
    const held = this.held(siteId);
    loads<readonly LibraryModel[]>(this.api.list(siteId)).subscribe((load) => {
      // what is known stays on screen while it is asked for again, and when that fails
      if (load.status === 'ready' || held().status !== 'ready') held.set(load);
    });
  }

  private held(siteId: string): WritableSignal<Load<readonly LibraryModel[]>> {
    const known = this.bySite.get(siteId);
    if (known !== undefined) return known;
    const made = signal<Load<readonly LibraryModel[]>>(LOADING);
    this.bySite.set(siteId, made);
    return made;
  }
}

import { inject, Injectable, Injector } from '@angular/core';
import { Router } from '@angular/router';
import { Drafts } from '../networks/drafts';
import { SessionStore } from '../session/session-store';

/** Signs out, and asks first what becomes of work that only this device has. */
@Injectable({ providedIn: 'root' })
export class SignOut {
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  private readonly drafts = inject(Drafts);
  private readonly injector = inject(Injector);

  async begin(): Promise<void> {
    const personId = this.session.person()?.id ?? '';
    // without the browser's storage nothing can lie there
    const networks = await this.drafts.networksOf(personId).catch(() => 0);
    const choice = networks === 0 ? 'keep' : await this.ask(networks);
    if (choice === 'stay') return;
    await this.session.signOut();
    await this.router.navigateByUrl('/sign-in');
    // only now: the page that was open has written what it had when it went
    if (choice === 'discard') await this.drafts.removeAllOf(personId);
  }

  /** The dialog comes when it is needed, which is seldom. */
  private async ask(networks: number): Promise<'stay' | 'keep' | 'discard'> {
    const { askAboutUnsaved } = await import('./unsaved-dialog');
    return askAboutUnsaved(this.injector, networks);
  }
}

import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { deviceTimeZone, timeWords } from '../account/time-words';
import { LinkProblem } from '../links/link-problem';
import { LinkStore } from '../links/link-store';
import { roleMeaning } from '../people/role-words';
import { SessionStore } from '../session/session-store';
import { RisebackMark } from '../shell/riseback-mark';
import { LiftPicture } from '../sign-in/lift-picture';
import { AcceptanceForm } from './acceptance-form';

/** Where the link of an invitation leads: who invites to what, and how to accept. */
@Component({
  selector: 'app-invitation-page',
  imports: [AcceptanceForm, LiftPicture, LinkProblem, RisebackMark, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [LinkStore],
  templateUrl: './invitation-page.html',
  styleUrls: ['../shell/entry-page.scss', './invitation-page.scss'],
})
export class InvitationPage {
  private readonly session = inject(SessionStore);
  protected readonly store = inject(LinkStore);

  /** Where one is a member now; null until then. */
  protected readonly acceptedSite = signal<string | null>(null);
  protected readonly signedInAs = computed(() => this.session.person());
  protected readonly roleMeaning = roleMeaning;

  constructor() {
    // asked only to be able to say so; an answer that does not come changes nothing
    this.session.restore().catch(() => null);
  }

  protected until(expiresAt: string): string {
    return timeWords(expiresAt, deviceTimeZone());
  }

  protected accepted(siteName: string): void {
    this.acceptedSite.set(siteName);
  }
}

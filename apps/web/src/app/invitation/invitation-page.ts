import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { Person } from '@riseback/contracts';
import { deviceTimeZone, timeWords } from '../account/time-words';
import { LinkProblem } from '../links/link-problem';
import { LinkStore } from '../links/link-store';
import { roleMeaning } from '../people/role-words';
import { SessionStore } from '../session/session-store';
import { RisebackMark } from '../shell/riseback-mark';
import { LiftPicture } from '../sign-in/lift-picture';
import { AcceptanceForm, type InvitationTold } from './acceptance-form';

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

  /** What was accepted; null until then. */
  protected readonly accepted = signal<InvitationTold | null>(null);
  /** Somebody may be signed in here, who need not be who is invited. */
  protected readonly present = this.session.person;
  protected readonly roleMeaning = roleMeaning;

  constructor() {
    // asked only to be able to say so; an answer that does not come changes nothing
    this.session.restore().catch(() => null);
  }

  protected until(expiresAt: string): string {
    return timeWords(expiresAt, deviceTimeZone());
  }

  protected isFor({ email }: InvitationTold, person: Person): boolean {
    return person.email.toLowerCase() === email.toLowerCase();
  }
}

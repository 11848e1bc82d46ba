import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { RouterLink } from '@angular/router';
import { deviceTimeZone, timeWords } from '../account/time-words';
import { LinkProblem } from '../links/link-problem';
import { LinkStore } from '../links/link-store';
import { RisebackMark } from '../shell/riseback-mark';
import { LiftPicture } from '../sign-in/lift-picture';
import { NewPasswordForm } from './new-password-form';

/** Where the link for a new password leads. */
@Component({
  selector: 'app-password-reset-page',
  imports: [LiftPicture, LinkProblem, NewPasswordForm, RisebackMark, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [LinkStore],
  template: `
    <main>
      <app-riseback-mark />
      <h1>New password</h1>
      @if (done()) {
        <div role="status">
          <p>Your password is changed, and every session of yours has ended. Sign in with the new one.</p>
        </div>
        <p><a routerLink="/sign-in">To sign-in</a></p>
      } @else if (store.told(); as state) {
        @if (state.status === 'loading') {
          <p role="status">Reading the link</p>
        } @else if (state.status === 'failed') {
          <app-link-problem [problem]="state.problem" (retried)="store.ask()">
            <p>
              A link for a new password counts once and for 24 hours, and ends when a newer one is sent.
              <a routerLink="/forgotten-password">Ask for another one</a>.
            </p>
          </app-link-problem>
        } @else if (state.value.purpose !== 'passwordReset') {
          <p>This link is an invitation. Open it once more from the mail as it stands there.</p>
        } @else {
          @if (state.value; as reset) {
            <p>
              For {{ reset.email }}, good until {{ until(reset.expiresAt) }}.
              {{ reset.fromName ? reset.fromName + ' had it sent to you.' : 'It was asked for on the sign-in page.' }}
              If you did not expect it, leave it: your present password goes on.
            </p>
            <app-new-password-form [email]="reset.email" (changed)="done.set(true)" />
          }
        }
      } @else {
        <p>
          Open the link in the mail once more. What makes it count is kept nowhere in the browser, so it is gone when
          the page is loaded anew.
        </p>
        <p><a routerLink="/forgotten-password">Ask for another one</a></p>
      }
    </main>
    <app-lift-picture />
  `,
  styleUrl: '../shell/entry-page.scss',
})
export class PasswordResetPage {
  protected readonly store = inject(LinkStore);
  protected readonly done = signal(false);

  protected until(expiresAt: string): string {
    return timeWords(expiresAt, deviceTimeZone());
  }
}

import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { RouterLink } from '@angular/router';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { AppBar } from '../shell/app-bar';
import { AccountStore } from './account-store';
import { CodesPanel } from './codes-panel';
import { MailsPanel } from './mails-panel';
import { PasswordPanel } from './password-panel';
import { ProfilePanel } from './profile-panel';
import { SessionList } from './session-list';

/** One's own account. */
@Component({
  selector: 'app-account-page',
  imports: [AppBar, CodesPanel, MailsPanel, PasswordPanel, ProblemBanner, ProfilePanel, RouterLink, SessionList],
  changeDetection: ChangeDetectionStrategy.OnPush,
  providers: [AccountStore],
  template: `
    <app-bar />
    <main>
      <p><a routerLink="/sites">Sites</a></p>
      <h1>Your account</h1>
      @if (store.problem(); as problem) {
        <app-problem-banner [problem]="problem" [canRetry]="true" (retried)="store.reload()" />
      }
      <section aria-labelledby="account-you">
        <h2 id="account-you">You</h2>
        <app-profile-panel />
      </section>
      <section aria-labelledby="account-mails">
        <h2 id="account-mails">Mails</h2>
        <app-mails-panel />
      </section>
      <section aria-labelledby="account-password">
        <h2 id="account-password">Password</h2>
        <app-password-panel />
      </section>
      <section aria-labelledby="account-codes">
        <h2 id="account-codes">One-time codes</h2>
        <app-codes-panel />
      </section>
      <section aria-labelledby="account-sessions">
        <h2 id="account-sessions">Where you are signed in</h2>
        <app-session-list />
      </section>
    </main>
  `,
  styleUrl: './account-page.scss',
})
export class AccountPage {
  protected readonly store = inject(AccountStore);
}

import { ChangeDetectionStrategy, Component, type ElementRef, inject, signal, viewChild } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { ResetRequest } from '@riseback/contracts';
import { LinkApi } from '../links/link-api';
import { outcomeOf } from '../shared/outcome';
import { StatusMark } from '../shared/status-mark/status-mark';
import { RisebackMark } from '../shell/riseback-mark';
import { LiftPicture } from '../sign-in/lift-picture';

/** Asks for a link to choose a new password. What it answers tells nobody whether there is such an account. */
@Component({
  selector: 'app-forgotten-password-page',
  imports: [LiftPicture, MatButton, ReactiveFormsModule, RisebackMark, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <main>
      <app-riseback-mark />
      <h1>Forgotten password</h1>
      @if (!asked()) {
        <p>Give the address that you sign in with. A link goes there, with which you choose a new password.</p>
        <form [formGroup]="form" (ngSubmit)="submit()" novalidate>
          <label for="email">E-mail</label>
          <input
            #emailBox
            id="email"
            type="email"
            autocomplete="username"
            formControlName="email"
            [attr.aria-invalid]="complaint() !== ''"
            aria-describedby="complaint"
          />
          <p id="complaint" aria-live="assertive">
            @if (complaint(); as words) {
              <app-status-mark status="fail" [word]="words" />
            }
          </p>
          <button matButton="filled" type="submit" [disabled]="busy()">
            {{ busy() ? 'Asking' : 'Send the link' }}
          </button>
        </form>
      }
      <div role="status">
        @if (asked(); as email) {
          <p>
            If there is an account under <strong>{{ email }}</strong>, a link is on its way there. It can be used once,
            within 24 hours.
          </p>
          <p>Nothing came? Look where unwanted mails go, and whether the address is the one that you sign in with.</p>
        }
      </div>
      @if (asked()) {
        <p><button matButton="outlined" type="button" (click)="again()">Another address</button></p>
      }
      <p><a routerLink="/sign-in">To sign-in</a></p>
    </main>
    <app-lift-picture />
  `,
  styleUrl: '../shell/entry-page.scss',
})
export class ForgottenPasswordPage {
  private readonly api = inject(LinkApi);

  private readonly emailBox = viewChild<ElementRef<HTMLInputElement>>('emailBox');
  protected readonly form = inject(NonNullableFormBuilder).group({ email: '' });
  protected readonly busy = signal(false);
  protected readonly complaint = signal('');
  /** The address that a link was asked for. */
  protected readonly asked = signal('');

  protected async submit(): Promise<void> {
    const request = ResetRequest.safeParse(this.form.getRawValue());
    if (!request.success) {
      this.complaint.set('This is not an e-mail address.');
      this.emailBox()?.nativeElement.focus();
      return;
    }
    this.busy.set(true);
    this.complaint.set('');
    const outcome = await outcomeOf(this.api.requestReset(request.data.email));
    this.busy.set(false);
    if ('problem' in outcome) this.complaint.set(outcome.problem.detail ?? outcome.problem.title);
    else this.asked.set(request.data.email);
  }

  protected again(): void {
    this.form.reset();
    this.asked.set('');
  }
}

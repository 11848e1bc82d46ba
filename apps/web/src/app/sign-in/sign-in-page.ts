import { ChangeDetectionStrategy, Component, inject, input, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { Router } from '@angular/router';
import { SessionStore } from '../session/session-store';
import { toProblem } from '../shared/problem';
import { StatusMark } from '../shared/status-mark/status-mark';
import { RisebackMark } from '../shell/riseback-mark';
import { LiftPicture } from './lift-picture';

@Component({
  selector: 'app-sign-in-page',
  imports: [LiftPicture, MatButton, ReactiveFormsModule, RisebackMark, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './sign-in-page.html',
  styleUrl: './sign-in-page.scss',
})
export class SignInPage {
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);

  /** Where the person was going, from the query. */
  readonly return = input<string>();

  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.email]],
    password: ['', Validators.required],
  });
  protected readonly busy = signal(false);
  protected readonly complaint = signal('');
  protected readonly shown = signal(false);

  protected async submit(): Promise<void> {
    if (this.form.invalid) {
      this.complaint.set('Give your e-mail address and your password.');
      return;
    }
    this.busy.set(true);
    this.complaint.set('');
    try {
      await this.session.signIn(this.form.getRawValue());
      await this.router.navigateByUrl(this.safeReturn());
    } catch (error) {
      const { title, detail } = toProblem(error);
      this.complaint.set(detail ?? title);
    } finally {
      this.busy.set(false);
    }
  }

  /** Only a path of this application: a link may not send people elsewhere after they signed in. */
  private safeReturn(): string {
    const wanted = this.return() ?? '';
    return wanted.startsWith('/') && !wanted.startsWith('//') ? wanted : '/sites';
  }
}

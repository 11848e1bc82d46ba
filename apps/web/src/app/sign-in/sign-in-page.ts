import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  type ElementRef,
  inject,
  Injector,
  input,
  signal,
  viewChild,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { Router, RouterLink } from '@angular/router';
import type { Problem } from '@riseback/contracts';
import { SessionStore } from '../session/session-store';
import { toProblem } from '../shared/problem';
import { StatusMark } from '../shared/status-mark/status-mark';
import { RisebackMark } from '../shell/riseback-mark';
import { LiftPicture } from './lift-picture';

@Component({
  selector: 'app-sign-in-page',
  imports: [LiftPicture, MatButton, ReactiveFormsModule, RisebackMark, RouterLink, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './sign-in-page.html',
  styleUrls: ['../shell/entry-page.scss', './sign-in-page.scss'],
})
export class SignInPage {
  private readonly session = inject(SessionStore);
  private readonly router = inject(Router);
  private readonly injector = inject(Injector);

  /** Where the person was going, from the query. */
  readonly return = input<string>();

  private readonly emailBox = viewChild<ElementRef<HTMLInputElement>>('emailBox');
  private readonly codeBox = viewChild<ElementRef<HTMLInputElement>>('codeBox');

  protected readonly form = inject(NonNullableFormBuilder).group({
    email: ['', [Validators.required, Validators.email]],
    password: ['', Validators.required],
    code: '',
  });
  /** The code is asked for only once address and password were right. */
  protected readonly step = signal<'password' | 'code'>('password');
  protected readonly byRecovery = signal(false);
  protected readonly busy = signal(false);
  protected readonly complaint = signal('');
  protected readonly shown = signal(false);

  protected async submit(): Promise<void> {
    if (this.form.invalid) {
      this.complaint.set('Give your e-mail address and your password.');
      return;
    }
    const { code, ...credentials } = this.form.getRawValue();
    if (this.step() === 'code' && code.trim() === '') {
      this.complaint.set('Give a code.');
      return;
    }
    this.busy.set(true);
    this.complaint.set('');
    try {
      await this.session.signIn(this.step() === 'code' ? { ...credentials, code } : credentials);
      await this.router.navigateByUrl(this.safeReturn());
    } catch (error) {
      this.tell(toProblem(error));
    } finally {
      this.busy.set(false);
    }
  }

  protected startAgain(): void {
    this.form.reset();
    this.complaint.set('');
    this.byRecovery.set(false);
    this.goTo('password');
  }

  protected otherKind(): void {
    this.byRecovery.update((by) => !by);
    this.form.controls.code.reset();
    this.goTo('code');
  }

  private tell({ type, title, detail }: Problem): void {
    if (type === '/problems/code-needed') {
      this.goTo('code');
      return;
    }
    // by the time of the code the password may have become another
    if (type === '/problems/wrong-credentials') this.goTo('password');
    this.form.controls.code.reset();
    this.complaint.set(detail ?? title);
  }

  private goTo(step: 'password' | 'code'): void {
    this.step.set(step);
    afterNextRender(() => (step === 'code' ? this.codeBox() : this.emailBox())?.nativeElement.focus(), {
      injector: this.injector,
    });
  }

  /** Only a path of this application: a link may not send people elsewhere after they signed in. */
  private safeReturn(): string {
    const wanted = this.return() ?? '';
    return wanted.startsWith('/') && !wanted.startsWith('//') ? wanted : '/sites';
  }
}

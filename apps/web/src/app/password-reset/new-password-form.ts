import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  Injector,
  input,
  output,
  signal,
  viewChild,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { passwordMistake, personalWords, type Problem } from '@riseback/contracts';
import { CodeField } from '../account/code-field';
import { passwordAdvice } from '../account/password-advice';
import { PasswordField } from '../account/password-field';
import { LinkStore } from '../links/link-store';
import { SessionStore } from '../session/session-store';
import { refusalsOf } from '../shared/outcome';
import { StatusMark } from '../shared/status-mark/status-mark';

const NO_REFUSALS: ReadonlyMap<string, string> = new Map();

/** Chooses the new password that a link allows; a code is asked for where codes are on, as at a sign-in. */
@Component({
  selector: 'app-new-password-form',
  imports: [CodeField, MatButton, PasswordField, ReactiveFormsModule, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form" (ngSubmit)="submit()" novalidate>
      <input
        class="rb-visually-hidden"
        type="text"
        autocomplete="username"
        [value]="email()"
        tabindex="-1"
        aria-hidden="true"
        readonly
      />
      <app-password-field
        label="New password"
        autocomplete="new-password"
        [control]="form.controls.newPassword"
        [hint]="hint()"
        [refusal]="refusals().get('/newPassword') ?? ''"
      />
      @if (codeAsked()) {
        <app-code-field
          label="Code"
          [recovery]="true"
          [control]="form.controls.code"
          [refusal]="refusals().get('/code') ?? ''"
        />
      }
      <div role="alert">
        @if (complaint(); as words) {
          <app-status-mark status="fail" [word]="words" />
        }
      </div>
      <button matButton="filled" type="submit" [disabled]="busy()">
        {{ busy() ? 'Changing' : 'Change the password' }}
      </button>
    </form>
  `,
  styleUrl: '../invitation/acceptance-form.scss',
})
export class NewPasswordForm {
  private readonly store = inject(LinkStore);
  private readonly session = inject(SessionStore);
  private readonly injector = inject(Injector);

  readonly email = input.required<string>();
  readonly changed = output();

  private readonly password = viewChild.required(PasswordField);
  private readonly code = viewChild(CodeField);

  protected readonly form = inject(NonNullableFormBuilder).group({ newPassword: '', code: '' });
  private readonly typed = toSignal(this.form.controls.newPassword.valueChanges, { initialValue: '' });
  private readonly personal = computed(() => personalWords({ name: '', email: this.email() }));
  protected readonly hint = computed(() => passwordAdvice(this.typed(), this.personal()));
  protected readonly codeAsked = signal(false);
  protected readonly busy = signal(false);
  protected readonly complaint = signal('');
  protected readonly refusals = signal(NO_REFUSALS);

  constructor() {
    // what was refused is no longer what stands there
    this.form.valueChanges.subscribe(() => this.refusals.set(NO_REFUSALS));
  }

  protected async submit(): Promise<void> {
    this.complaint.set('');
    const { newPassword, code } = this.form.getRawValue();
    const mistake = passwordMistake(newPassword, this.personal());
    if (mistake !== undefined) return this.refuse(new Map([['/newPassword', mistake]]));
    if (this.codeAsked() && code.trim() === '') return this.refuse(new Map([['/code', 'Give a code.']]));
    this.busy.set(true);
    const outcome = await this.store.completeReset({ newPassword, ...(this.codeAsked() ? { code } : {}) });
    this.busy.set(false);
    if ('problem' in outcome) return this.tell(outcome.problem);
    this.session.forget();
    this.changed.emit();
    this.store.forget();
  }

  private tell(problem: Problem): void {
    if (problem.type === '/problems/code-needed') {
      this.codeAsked.set(true);
      afterNextRender(() => this.code()?.focus(), { injector: this.injector });
      return;
    }
    const { fields, rest } = refusalsOf(problem);
    this.form.controls.code.reset();
    this.complaint.set(rest);
    this.refuse(fields);
  }

  private refuse(fields: ReadonlyMap<string, string>): void {
    this.refusals.set(fields);
    if (fields.has('/newPassword')) this.password().focus();
    else if (fields.has('/code')) this.code()?.focus();
  }
}

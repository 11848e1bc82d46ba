import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  type ElementRef,
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
import { type LinkTold, passwordMistake, personalWords, PersonName, type Problem } from '@riseback/contracts';
import { CodeField } from '../account/code-field';
import { passwordAdvice } from '../account/password-advice';
import { PasswordField } from '../account/password-field';
import { LinkStore } from '../links/link-store';
import { SessionStore } from '../session/session-store';
import { refusalsOf } from '../shared/outcome';
import { StatusMark } from '../shared/status-mark/status-mark';

export type InvitationTold = Extract<LinkTold, { readonly purpose: 'invitation' }>;

const NO_REFUSALS: ReadonlyMap<string, string> = new Map();

/** Accepts an invitation: with a name and a new password, or with the password of the account that is there already. */
@Component({
  selector: 'app-acceptance-form',
  imports: [CodeField, MatButton, PasswordField, ReactiveFormsModule, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './acceptance-form.html',
  styleUrl: './acceptance-form.scss',
})
export class AcceptanceForm {
  private readonly store = inject(LinkStore);
  private readonly session = inject(SessionStore);
  private readonly injector = inject(Injector);

  readonly invitation = input.required<InvitationTold>();
  readonly accepted = output();

  private readonly nameBox = viewChild<ElementRef<HTMLInputElement>>('nameBox');
  private readonly password = viewChild.required(PasswordField);
  private readonly code = viewChild(CodeField);

  protected readonly form = inject(NonNullableFormBuilder).group({ name: '', password: '', code: '' });
  private readonly typed = toSignal(this.form.valueChanges, { initialValue: this.form.value });
  private readonly personal = computed(() =>
    personalWords({ name: this.typed().name ?? '', email: this.invitation().email }),
  );
  protected readonly hint = computed(() =>
    this.invitation().hasAccount
      ? 'The one that you sign in with.'
      : passwordAdvice(this.typed().password ?? '', this.personal()),
  );
  /** Asked for once the password was right, where codes are on. */
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
    const mistakes = this.mistakes();
    if (mistakes.size > 0) return this.refuse(mistakes);
    const { name, password, code } = this.form.getRawValue();
    this.busy.set(true);
    const outcome = await this.store.accept({
      password,
      ...(this.invitation().hasAccount ? {} : { name: name.trim() }),
      ...(this.codeAsked() ? { code } : {}),
    });
    if ('problem' in outcome) {
      this.busy.set(false);
      return this.tell(outcome.problem);
    }
    await this.enter(password);
    this.busy.set(false);
    this.accepted.emit();
    this.store.forget();
  }

  /** Who was not signed in here need not type it all again, unless the code is spent; whoever else was, stays. */
  private async enter(password: string): Promise<void> {
    this.session.forget();
    const present = await this.session.restore().catch(() => null);
    if (present !== null || this.codeAsked()) return;
    await this.session.signIn({ email: this.invitation().email, password }).catch(() => undefined);
  }

  private mistakes(): ReadonlyMap<string, string> {
    const { name, password, code } = this.form.getRawValue();
    const mistakes = new Map<string, string>();
    if (this.invitation().hasAccount) {
      if (password === '') mistakes.set('/password', 'Give your password.');
      if (this.codeAsked() && code.trim() === '') mistakes.set('/code', 'Give a code.');
      return mistakes;
    }
    if (!PersonName.safeParse(name).success) mistakes.set('/name', 'Give your name, of 80 characters at most.');
    const mistake = passwordMistake(password, this.personal());
    if (mistake !== undefined) mistakes.set('/password', mistake);
    return mistakes;
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
    if (fields.has('/name')) this.nameBox()?.nativeElement.focus();
    else if (fields.has('/password')) this.password().focus();
    else if (fields.has('/code')) this.code()?.focus();
  }
}

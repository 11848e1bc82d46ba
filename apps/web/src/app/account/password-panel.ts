import { ChangeDetectionStrategy, Component, computed, inject, signal, viewChild } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { passwordMistake, personalWords } from '@riseback/contracts';
import { refusalsOf } from '../shared/outcome';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AccountStore } from './account-store';
import { passwordAdvice } from './password-advice';
import { PasswordField } from './password-field';

const NO_REFUSALS: ReadonlyMap<string, string> = new Map();

@Component({
  selector: 'app-password-panel',
  imports: [MatButton, PasswordField, ReactiveFormsModule, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <form [formGroup]="form" (ngSubmit)="submit()" novalidate>
      <input
        class="rb-visually-hidden"
        type="text"
        autocomplete="username"
        [value]="store.person()?.email"
        tabindex="-1"
        aria-hidden="true"
        readonly
      />
      <app-password-field
        #present
        label="Present password"
        autocomplete="current-password"
        [control]="form.controls.presentPassword"
        [refusal]="refusals().get('/presentPassword') ?? ''"
      />
      <app-password-field
        #next
        label="New password"
        autocomplete="new-password"
        [control]="form.controls.newPassword"
        [hint]="hint()"
        [refusal]="refusals().get('/newPassword') ?? ''"
      />
      <p class="aside">Everybody who is signed in as you elsewhere is signed out; you stay in here.</p>
      <button matButton="filled" type="submit" [disabled]="busy()">
        {{ busy() ? 'Changing' : 'Change the password' }}
      </button>
    </form>
    <div class="said" role="status">
      @if (done()) {
        <app-status-mark status="pass" word="Your password is changed, and every other session has ended." />
      }
    </div>
    <div class="said" role="alert">
      @if (complaint(); as words) {
        <app-status-mark status="fail" [word]="words" />
      }
    </div>
  `,
  styleUrl: './account-panel.scss',
})
export class PasswordPanel {
  protected readonly store = inject(AccountStore);

  private readonly present = viewChild.required<PasswordField>('present');
  private readonly next = viewChild.required<PasswordField>('next');

  protected readonly form = inject(NonNullableFormBuilder).group({ presentPassword: '', newPassword: '' });
  private readonly typed = toSignal(this.form.controls.newPassword.valueChanges, { initialValue: '' });
  protected readonly busy = signal(false);
  protected readonly done = signal(false);
  protected readonly complaint = signal('');
  protected readonly refusals = signal(NO_REFUSALS);
  private readonly personal = computed(() => {
    const person = this.store.person();
    return person === null ? [] : personalWords(person);
  });
  protected readonly hint = computed(() => passwordAdvice(this.typed(), this.personal()));

  constructor() {
    // what was refused is no longer what stands there
    this.form.valueChanges.subscribe(() => this.refusals.set(NO_REFUSALS));
  }

  protected async submit(): Promise<void> {
    const change = this.form.getRawValue();
    this.done.set(false);
    this.complaint.set('');
    if (change.presentPassword === '')
      return this.refuse(new Map([['/presentPassword', 'Give your present password.']]));
    const mistake = passwordMistake(change.newPassword, this.personal());
    if (mistake !== undefined) return this.refuse(new Map([['/newPassword', mistake]]));
    this.busy.set(true);
    const outcome = await this.store.changePassword(change);
    this.busy.set(false);
    if ('problem' in outcome) {
      const { fields, rest } = refusalsOf(outcome.problem);
      this.complaint.set(rest);
      this.refuse(fields);
      return;
    }
    this.form.reset();
    this.done.set(true);
  }

  private refuse(fields: ReadonlyMap<string, string>): void {
    this.refusals.set(fields);
    if (fields.has('/presentPassword')) this.present().focus();
    else if (fields.has('/newPassword')) this.next().focus();
  }
}

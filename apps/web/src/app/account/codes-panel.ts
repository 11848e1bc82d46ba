import {
  ChangeDetectionStrategy,
  Component,
  computed,
  ElementRef,
  inject,
  Injector,
  afterNextRender,
  signal,
  viewChild,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { CodesBegun, CodesProof } from '@riseback/contracts';
import { type Outcome, refusalsOf } from '../shared/outcome';
import { StatusMark } from '../shared/status-mark/status-mark';
import { AccountStore } from './account-store';
import { CodeField } from './code-field';
import { PasswordField } from './password-field';
import { QrPicture } from './qr-picture';
import { RecoveryCodeList } from './recovery-code-list';
import { timeWords } from './time-words';

/** What is being done; `rest` says how things stand and what may be begun. */
type Doing =
  | { readonly step: 'rest' }
  | { readonly step: 'proving'; readonly what: 'turnOn' | 'renew' | 'turnOff' }
  | { readonly step: 'confirming'; readonly begun: CodesBegun }
  | { readonly step: 'keeping'; readonly recoveryCodes: readonly string[] };

const REST: Doing = { step: 'rest' };
const NO_REFUSALS: ReadonlyMap<string, string> = new Map();
/** So few recovery codes that it is time for new ones. */
const FEW_LEFT = 3;

const HEADS = { turnOn: 'Turn on', renew: 'New recovery codes', turnOff: 'Turn off' } as const;

/** One-time codes: on, off, and new recovery codes; each step after the other in one place. */
@Component({
  selector: 'app-codes-panel',
  imports: [CodeField, MatButton, PasswordField, QrPicture, ReactiveFormsModule, RecoveryCodeList, StatusMark],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './codes-panel.html',
  styleUrl: './account-panel.scss',
})
export class CodesPanel {
  protected readonly store = inject(AccountStore);
  private readonly injector = inject(Injector);

  private readonly password = viewChild(PasswordField);
  private readonly code = viewChild(CodeField);
  private readonly recoveryList = viewChild<RecoveryCodeList, ElementRef<HTMLElement>>(RecoveryCodeList, {
    read: ElementRef,
  });
  private readonly first = viewChild<unknown, ElementRef<HTMLElement>>('first', { read: ElementRef });

  protected readonly form = inject(NonNullableFormBuilder).group({ password: '', code: '' });
  protected readonly doing = signal<Doing>(REST);
  protected readonly busy = signal(false);
  protected readonly said = signal('');
  protected readonly complaint = signal('');
  protected readonly refusals = signal(NO_REFUSALS);

  protected readonly state = computed(() => this.store.account()?.codes);
  protected readonly since = computed(() => {
    const since = this.state()?.since;
    return since === undefined ? '' : timeWords(since, this.store.person()?.timeZone ?? 'UTC');
  });
  protected readonly fewLeft = computed(() => (this.state()?.recoveryCodesLeft ?? 0) <= FEW_LEFT);
  /** In fours, as one reads it out. */
  protected readonly spacedSecret = computed(() => {
    const doing = this.doing();
    return doing.step === 'confirming' ? (doing.begun.secret.match(/.{1,4}/g) ?? []).join(' ') : '';
  });
  protected readonly heads = HEADS;

  constructor() {
    // what was refused is no longer what stands there
    this.form.valueChanges.subscribe(() => this.refusals.set(NO_REFUSALS));
  }

  protected begin(what: 'turnOn' | 'renew' | 'turnOff'): void {
    this.said.set('');
    this.go({ step: 'proving', what });
  }

  protected rest(said = ''): void {
    this.go(REST);
    this.said.set(said);
  }

  protected async prove(what: 'turnOn' | 'renew' | 'turnOff'): Promise<void> {
    const proof: CodesProof = this.form.getRawValue();
    if (proof.password === '') return this.refuse(new Map([['/password', 'Give your present password.']]));
    if (what !== 'turnOn' && proof.code === '') return this.refuse(new Map([['/code', 'Give a code.']]));
    switch (what) {
      case 'turnOn':
        return this.run(this.store.beginCodes(proof.password), (begun) => this.go({ step: 'confirming', begun }));
      case 'renew':
        return this.run(this.store.renewRecoveryCodes(proof), (kept) => this.go({ step: 'keeping', ...kept }));
      case 'turnOff':
        return this.run(this.store.turnCodesOff(proof), () =>
          this.rest('Codes are off. Delete the entry from your authenticator.'),
        );
    }
  }

  protected async confirm(): Promise<void> {
    const { code } = this.form.getRawValue();
    if (code === '') return this.refuse(new Map([['/code', 'Give the code that your authenticator shows.']]));
    await this.run(this.store.confirmCodes(code), (kept) => this.go({ step: 'keeping', ...kept }));
  }

  private async run<T>(command: Promise<Outcome<T>>, done: (value: T) => void): Promise<void> {
    this.busy.set(true);
    this.complaint.set('');
    const outcome = await command;
    this.busy.set(false);
    if ('value' in outcome) return done(outcome.value);
    const { fields, rest } = refusalsOf(outcome.problem);
    this.complaint.set(rest);
    this.refuse(fields);
  }

  private refuse(fields: ReadonlyMap<string, string>): void {
    this.refusals.set(fields);
    if (fields.has('/password')) this.password()?.focus();
    else if (fields.has('/code')) this.code()?.focus();
  }

  /** What was typed goes with its step, and the focus goes to where the next one begins. */
  private go(doing: Doing): void {
    this.form.reset();
    this.complaint.set('');
    this.doing.set(doing);
    afterNextRender(() => this.focusStep(doing), { injector: this.injector });
  }

  private focusStep({ step }: Doing): void {
    if (step === 'proving') this.password()?.focus();
    else if (step === 'confirming') this.code()?.focus();
    else if (step === 'keeping') this.recoveryList()?.nativeElement.querySelector<HTMLElement>('h3')?.focus();
    else this.first()?.nativeElement.focus();
  }
}

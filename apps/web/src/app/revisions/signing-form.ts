import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  type ElementRef,
  inject,
  input,
  output,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { FormControl } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import type { Problem, Revision, SigningTerms } from '@riseback/contracts';
import { CodeField } from '../account/code-field';
import { PasswordField } from '../account/password-field';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { beforeSigning, stillMissing } from './before-signing';
import { RevisionReader } from './revision-reader';
import { MEANING_WORDS } from './revision-words';

/** What a signature says, word for word; what is to be seen before; and the password that makes it. */
@Component({
  selector: 'app-signing-form',
  imports: [CodeField, MatButton, PasswordField, ProblemBanner],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './signing-form.html',
  styleUrl: './signing-form.scss',
})
export class SigningForm {
  protected readonly reader = inject(RevisionReader);

  readonly revision = input.required<Revision>();
  /** The letter that it is compared with; '' for the first. */
  readonly comparedWith = input('');
  /** How many cases were solved. */
  readonly caseCount = input.required<number>();
  readonly signed = output<string>();

  private readonly region = viewChild.required<ElementRef<HTMLElement>>('region');
  private readonly passwordField = viewChild(PasswordField);
  private readonly codeField = viewChild(CodeField);

  protected readonly meanings = ['approved', 'reviewed'] as const;
  protected readonly meaningWords = MEANING_WORDS;
  protected readonly password = new FormControl('', { nonNullable: true });
  protected readonly code = new FormControl('', { nonNullable: true });
  protected readonly ticked = signal<ReadonlySet<string>>(new Set());
  protected readonly busy = signal(false);
  protected readonly complaint = signal('');
  protected readonly changed = signal(false);
  private readonly problem = signal<Problem | null>(null);

  protected readonly terms = computed((): SigningTerms | null => {
    const load = this.reader.terms();
    if (load.status !== 'ready' || load.value.meaning !== this.reader.meaning()) return null;
    // those of another revision may still stand there while this one's are read
    return load.value.fileHash === this.revision().fileHash ? load.value : null;
  });
  protected readonly termsProblem = computed(() => {
    const load = this.reader.terms();
    return load.status === 'failed' ? load.problem : null;
  });
  protected readonly lines = computed(() => {
    const terms = this.terms();
    return terms === null ? [] : beforeSigning(terms, this.comparedWith(), this.caseCount(), this.reader.changeCount());
  });
  protected readonly missing = computed(() => stillMissing(this.lines(), this.ticked()));
  protected readonly refusals = computed(
    () => new Map((this.problem()?.errors ?? []).map(({ pointer, detail }) => [pointer, detail])),
  );
  /** What is wrong beside the fields. */
  protected readonly otherProblem = computed(() => {
    const problem = this.problem();
    return problem === null || this.refusals().has('/password') || this.refusals().has('/code') ? null : problem;
  });

  private readToken = '';

  constructor() {
    effect(() => {
      const terms = this.terms();
      if (terms === null) return;
      untracked(() => this.readAnew(terms));
    });
  }

  protected tick(key: string, ticked: boolean): void {
    this.complaint.set('');
    this.ticked.update((before) => {
      const after = new Set(before);
      if (ticked) after.add(key);
      else after.delete(key);
      return after;
    });
  }

  protected mean(meaning: (typeof this.meanings)[number]): void {
    this.reader.meaning.set(meaning);
  }

  protected async sign(): Promise<void> {
    const terms = this.terms();
    if (terms === null || this.busy()) return;
    this.problem.set(null);
    const [first] = this.missing();
    if (first !== undefined) {
      this.complaint.set(`Not signed yet: tick “${first.words}” once it is so.`);
      this.region().nativeElement.querySelector<HTMLElement>(`[data-line="${first.key}"]`)?.focus();
      return;
    }
    if (this.password.value === '') {
      this.complaint.set('Not signed yet: enter your password.');
      this.passwordField()?.focus();
      return;
    }
    if (terms.asksForCode && this.code.value.trim() === '') {
      this.complaint.set('Not signed yet: enter the code of your authenticator.');
      this.codeField()?.focus();
      return;
    }
    await this.send(terms);
  }

  private async send(terms: SigningTerms): Promise<void> {
    this.complaint.set('');
    this.busy.set(true);
    const problem = await this.reader.sign({
      meaning: terms.meaning,
      token: terms.token,
      password: this.password.value,
      ...(terms.asksForCode ? { code: this.code.value.trim() } : {}),
      despiteOpenComments: terms.openComments > 0,
    });
    this.busy.set(false);
    this.problem.set(problem);
    // typed for one try each: a password does not wait in a field
    this.password.reset();
    this.code.reset();
    if (problem === null) this.signed.emit(MEANING_WORDS[terms.meaning].toLowerCase());
    else if (this.refusals().has('/code')) this.codeField()?.focus();
    else if (this.refusals().has('/password')) this.passwordField()?.focus();
  }

  /** Other words than those that were ticked off are to be read again. */
  private readAnew({ token }: SigningTerms): void {
    if (token === this.readToken) return;
    this.changed.set(this.readToken !== '' && this.ticked().size > 0);
    this.readToken = token;
    this.ticked.set(new Set());
  }
}

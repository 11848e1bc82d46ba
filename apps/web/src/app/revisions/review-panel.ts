import { ChangeDetectionStrategy, Component, computed, inject, input, signal, viewChild } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { CommentSubject, Problem, Revision, RevisionDeed } from '@riseback/contracts';
import { fromFile } from '@riseback/network';
import { CommentForm } from '../comments/comment-form';
import { CommentList } from '../comments/comment-list';
import { CommentStore } from '../comments/comment-store';
import { subjectWords, WHOLE } from '../comments/comment-subjects';
import { zonesOf } from '../comments/zones';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { TextDrafts } from '../shared/text-drafts';
import { NoteForm } from './note-form';
import type { RevisionStep } from './revision-api';
import { RevisionCourse } from './revision-course';
import { RevisionReader } from './revision-reader';
import { sealWords, STATE_SENTENCES, STATE_WORDS } from './revision-words';
import { SigningForm } from './signing-form';
import { type StepForm, STEP_FORMS } from './step-forms';

/** Review and sign: the state of a revision, its comments, and what the reader may do with it, or why not. */
@Component({
  selector: 'app-review-panel',
  imports: [CommentForm, CommentList, MatButton, NoteForm, ProblemBanner, RevisionCourse, RouterLink, SigningForm],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './review-panel.html',
  styleUrl: './review-panel.scss',
})
export class ReviewPanel {
  protected readonly reader = inject(RevisionReader);
  protected readonly comments = inject(CommentStore);
  private readonly drafts = inject(TextDrafts);

  readonly revision = input.required<Revision>();
  /** The letter of what it is compared with; '' for nothing. */
  readonly comparedWith = input('');
  readonly siteId = input.required<string>();

  private readonly form = viewChild(CommentForm);
  /** What is being done, until its note is sent. */
  protected readonly doing = signal<StepForm | null>(null);
  protected readonly busy = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly said = signal('');
  protected readonly writing = signal<CommentSubject>(WHOLE);

  protected readonly stateWords = STATE_WORDS;
  protected readonly stateSentences = STATE_SENTENCES;
  protected readonly document = computed(() => fromFile(this.revision().file));
  protected readonly zones = computed(() => zonesOf(this.document()));
  protected readonly threads = computed(() =>
    this.comments.threads().filter(({ revisionId }) => revisionId === this.revision().id),
  );
  protected readonly openCount = computed(() => this.threads().filter(({ resolved }) => resolved === undefined).length);
  protected readonly caseCount = computed(() => this.reader.after()?.results.length ?? 0);
  protected readonly seal = computed(() => ({
    inputs: sealWords(this.revision().fileHash),
    results: sealWords(this.revision().resultsHash),
  }));
  protected readonly frozen = computed(() => [
    '/sites',
    this.siteId(),
    'networks',
    this.revision().networkId,
    'frozen',
    this.revision().id,
  ]);
  protected readonly frozenDrawing = computed(() => [...this.frozen(), 'drawing']);
  protected readonly verification = computed(() => [
    '/sites',
    this.siteId(),
    'networks',
    this.revision().networkId,
    'revisions',
    this.revision().id,
    'verification',
  ]);
  /** Steps that the reader may take. */
  protected readonly steps = computed(() => STEP_FORMS.filter(({ deed }) => this.revision().deeds[deed].allowed));
  /** Why the others may not be taken, each reason once. */
  protected readonly reasons = computed(() => {
    const { deeds, state } = this.revision();
    // of all other states the sentence above says what comes next
    const told: readonly RevisionDeed[] =
      state === 'underReview' ? ['sign', 'return'] : state === 'draft' ? ['submit'] : [];
    const whys = told.flatMap((deed) => {
      const answer = deeds[deed];
      return answer.allowed ? [] : [answer.why];
    });
    return [...new Set(whys)];
  });
  protected readonly editors = computed(() =>
    this.revision()
      .editedBy.map(({ personName }) => personName)
      .join(', '),
  );
  protected readonly writingLabel = computed(() =>
    this.writing().kind === 'whole'
      ? `New comment on revision ${this.revision().letter} as a whole`
      : `New comment on ${subjectWords(this.writing(), this.document())}`,
  );
  protected readonly place = computed(() => ({ subject: this.writing(), revisionId: this.revision().id }));

  /** From the comparison: a line of it is to be commented on. */
  commentOn(subject: CommentSubject): void {
    this.writing.set(subject);
    this.form()?.focus();
  }

  protected begin(step: StepForm): void {
    this.problem.set(null);
    this.doing.set(step);
  }

  protected aboutOf({ step }: StepForm): string {
    return `${step}/${this.revision().id}`;
  }

  protected async take(form: StepForm, note: string): Promise<void> {
    const about = this.aboutOf(form);
    this.busy.set(true);
    const problem = await this.reader.take(form.step, note);
    this.busy.set(false);
    this.problem.set(problem);
    if (problem !== null) return;
    this.drafts.keep(about, '');
    this.doing.set(null);
    this.said.set(`Revision ${this.revision().letter} is ${DONE_WORDS[form.step]}.`);
  }

  protected signed(meaning: string): void {
    this.said.set(`You signed revision ${this.revision().letter} as ${meaning}.`);
  }

  protected commented(): void {
    this.writing.set(WHOLE);
  }
}

const DONE_WORDS: Readonly<Record<RevisionStep, string>> = {
  submission: 'submitted for review',
  return: 'returned',
  withdrawal: 'withdrawn',
};

import { ChangeDetectionStrategy, Component, computed, inject, input, linkedSignal, viewChild } from '@angular/core';
import type { CommentSubject } from '@riseback/contracts';
import type { NetworkNode, PipeRun } from '@riseback/network';
import { NetworkStore } from '../networks/network-store';
import { checkName } from '../results/finding-words';
import { RevisionHistory } from '../revisions/revision-history';
import { type Choice, ChoiceField } from '../shared/fields/choice-field';
import { nameOf } from '../shared/element-words';
import { CommentForm } from './comment-form';
import { CommentList } from './comment-list';
import { CommentStore } from './comment-store';
import { elementOf, subjectKey, subjectWords } from './comment-subjects';

/** The comments pinned to one element or to what came out for it, and a new one. */
@Component({
  selector: 'app-comments-tab',
  imports: [ChoiceField, CommentForm, CommentList],
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <app-comment-list
      [threads]="threads()"
      [document]="store.document()"
      [letterOf]="letterOf()"
      [none]="'No comments on ' + name() + '.'"
    />
    @if (comments.mayComment()) {
      @if (choices().length > 1) {
        <app-choice-field
          label="About"
          [choices]="choices()"
          [value]="key()"
          (accepted)="chosenKey.set($event ?? '')"
        />
      }
      <app-comment-form [label]="'New comment on ' + words()" [place]="place()" />
    } @else {
      <p class="aside">Your role here reads comments and does not write them.</p>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
      align-content: start;
      padding: 12px 16px 24px;
    }
    .aside {
      color: var(--rb-ink-2);
      font:
        400 12px/16px Inter,
        sans-serif;
    }
  `,
})
export class CommentsTab {
  protected readonly store = inject(NetworkStore);
  protected readonly comments = inject(CommentStore);
  private readonly history = inject(RevisionHistory);

  readonly element = input.required<NetworkNode | PipeRun>();

  private readonly form = viewChild(CommentForm);
  protected readonly name = computed(() => nameOf(this.element()));
  protected readonly threads = computed(() => {
    const [id, revisionId] = [this.element().id, this.comments.revisionId()];
    return this.comments
      .threads()
      .filter((thread) => elementOf(thread.subject) === id)
      .filter((thread) => revisionId === undefined || thread.revisionId === revisionId);
  });
  /** The element itself, what the case that is shown finds about it, and what was asked for from elsewhere. */
  private readonly subjects = computed((): readonly CommentSubject[] => {
    const elementId = this.element().id;
    const caseId = this.store.caseOf(elementId);
    const result = this.store.resultAt(elementId);
    const checks = result?.traps.find(({ id }) => id === elementId)?.checks ?? [];
    const warnings = (result?.warnings ?? []).filter(({ element }) => element === elementId);
    const codes = [...checks, ...warnings].map(({ code }) => code);
    const found = [...new Set(codes)].map((code): CommentSubject => ({ kind: 'result', elementId, caseId, code }));
    const wanted = this.comments.wanted()?.subject;
    const all: CommentSubject[] = [{ kind: 'element', elementId }, ...found];
    if (wanted !== undefined && elementOf(wanted) === elementId) all.push(wanted);
    return [...new Map(all.map((subject) => [subjectKey(subject), subject])).values()];
  });
  protected readonly choices = computed((): Choice[] =>
    this.subjects().map((subject) => ({ value: subjectKey(subject), words: this.choiceWords(subject) })),
  );
  /** Goes back to the element itself with another one, and to what is asked for when that is. */
  protected readonly chosenKey = linkedSignal(() => {
    const wanted = this.comments.wanted()?.subject;
    const element: CommentSubject = { kind: 'element', elementId: this.element().id };
    return subjectKey(wanted !== undefined && elementOf(wanted) === this.element().id ? wanted : element);
  });
  private readonly subject = computed(
    (): CommentSubject =>
      this.subjects().find((subject) => subjectKey(subject) === this.chosenKey()) ?? {
        kind: 'element',
        elementId: this.element().id,
      },
  );
  protected readonly key = computed(() => subjectKey(this.subject()));
  protected readonly words = computed(() => subjectWords(this.subject(), this.store.document()));
  protected readonly place = computed(() => ({ subject: this.subject(), revisionId: this.comments.revisionId() }));
  protected readonly letterOf = computed(() => {
    const letters = new Map(this.history.revisions().map(({ id, letter }) => [id, letter]));
    return ({ revisionId }: { readonly revisionId?: string | undefined }) => letters.get(revisionId ?? '') ?? '';
  });

  focusForm(): void {
    this.form()?.focus();
  }

  private choiceWords(subject: CommentSubject): string {
    if (subject.kind !== 'result') return this.name();
    const caseName = this.store.nameOfCase(subject.caseId ?? '');
    return `${checkName(subject.code ?? '')}${caseName === '' ? '' : ` in ${caseName}`}`;
  }
}

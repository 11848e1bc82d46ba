import { ChangeDetectionStrategy, Component, computed, inject, input, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import type { CommentThread, Problem } from '@riseback/contracts';
import type { NetworkDocument } from '@riseback/network';
import { timeWords } from '../account/time-words';
import { SessionStore } from '../session/session-store';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { CommentForm } from './comment-form';
import { CommentNumber } from './comment-number';
import { CommentStore } from './comment-store';
import { elementOf, subjectWords } from './comment-subjects';
import { partsOf } from './mentions';

/** One thread: what it is about, what was said, and answering, resolving or opening it again. */
@Component({
  selector: 'app-comment-thread-view',
  imports: [CommentForm, CommentNumber, MatButton, ProblemBanner, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.resolved]': 'thread().resolved !== undefined', '[attr.data-thread]': 'thread().id' },
  templateUrl: './comment-thread-view.html',
  styleUrl: './comment-thread-view.scss',
})
export class CommentThreadView {
  protected readonly store = inject(CommentStore);
  private readonly session = inject(SessionStore);

  readonly thread = input.required<CommentThread>();
  /** What its elements are called by. */
  readonly document = input.required<NetworkDocument | null>();
  /** The sheet's zone of an element; '' where that is not known. */
  readonly zone = input('');
  /** Where its element is drawn; null where nothing leads there. */
  readonly drawing = input<readonly string[] | null>(null);
  /** The letter of its revision, where threads of several stand together. */
  readonly letter = input('');

  protected readonly answering = signal(false);
  protected readonly problem = signal<Problem | null>(null);
  protected readonly busy = signal(false);
  protected readonly number = computed(() => this.store.numbers().get(this.thread().id) ?? 0);
  protected readonly elementId = computed(() => elementOf(this.thread().subject));
  protected readonly head = computed(() =>
    [
      subjectWords(this.thread().subject, this.document()),
      this.zone() === '' ? '' : `zone ${this.zone()}`,
      this.letter() === '' ? '' : `revision ${this.letter()}`,
    ]
      .filter((part) => part !== '')
      .join(', '),
  );
  protected readonly comments = computed(() =>
    this.thread().comments.map((comment) => ({
      ...comment,
      parts: partsOf(
        comment.body,
        comment.mentions.map(({ personName }) => personName),
      ),
      when: timeWords(comment.at, this.session.timeZone()),
    })),
  );
  protected readonly resolvedWords = computed(() => {
    const resolved = this.thread().resolved;
    return resolved === undefined
      ? ''
      : `Resolved by ${resolved.personName}, ${timeWords(resolved.at, this.session.timeZone())}`;
  });

  protected readonly mayResolve = computed(() => this.store.mayResolve(this.thread()));

  protected async resolve(resolved: boolean): Promise<void> {
    this.busy.set(true);
    this.problem.set(await this.store.resolve(this.thread().id, resolved));
    this.busy.set(false);
  }
}

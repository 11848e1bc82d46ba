import { ChangeDetectionStrategy, Component, computed, inject, input, output, signal, viewChild } from '@angular/core';
import type { CommentSubject } from '@riseback/contracts';
import { MatButton } from '@angular/material/button';
import { CommentForm } from '../comments/comment-form';
import { CommentList } from '../comments/comment-list';
import { CommentStore } from '../comments/comment-store';
import { subjectWords, WHOLE } from '../comments/comment-subjects';
import { zonesOf } from '../comments/zones';
import { NetworkStore } from '../networks/network-store';
import { freezeObstacle } from './freeze-obstacle';
import { RevisionHistory } from './revision-history';

/** Beside the network as it is drawn: its comments, and freezing it. */
@Component({
  selector: 'app-working-panel',
  imports: [CommentForm, CommentList, MatButton],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './working-panel.html',
  styleUrl: './review-panel.scss',
})
export class WorkingPanel {
  protected readonly store = inject(NetworkStore);
  protected readonly comments = inject(CommentStore);
  private readonly history = inject(RevisionHistory);

  readonly mayFreeze = input(false);
  readonly freezeAsked = output();

  protected readonly obstacle = computed(() =>
    freezeObstacle(this.store.saveState(), this.store.solveState(), this.store.conflicts().length),
  );
  protected readonly zones = computed(() => {
    const document = this.store.document();
    return document === null ? new Map<string, string>() : zonesOf(document);
  });
  /** Those on the network itself, and those still open on its revisions: both are to be mended here. */
  protected readonly threads = computed(() =>
    this.comments.threads().filter(({ revisionId, resolved }) => revisionId === undefined || resolved === undefined),
  );
  protected readonly letterOf = computed(() => {
    const letters = new Map(this.history.revisions().map(({ id, letter }) => [id, letter]));
    return ({ revisionId }: { readonly revisionId?: string | undefined }) => letters.get(revisionId ?? '') ?? '';
  });
  protected readonly drawing = computed(() => [
    '/sites',
    this.store.network()?.siteId ?? '',
    'networks',
    this.store.networkId(),
    'drawing',
  ]);
  private readonly form = viewChild(CommentForm);
  protected readonly writing = signal<CommentSubject>(WHOLE);
  protected readonly writingLabel = computed(() =>
    this.writing().kind === 'whole'
      ? 'New comment on the network as a whole'
      : `New comment on ${subjectWords(this.writing(), this.store.document())}`,
  );
  protected readonly place = computed(() => ({ subject: this.writing() }));

  /** From the comparison: a line of it is to be commented on. */
  commentOn(subject: CommentSubject): void {
    this.writing.set(subject);
    this.form()?.focus();
  }

  protected commented(): void {
    this.writing.set(WHOLE);
  }
}

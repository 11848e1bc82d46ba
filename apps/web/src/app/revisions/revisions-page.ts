import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  inject,
  input,
  untracked,
  viewChild,
  ViewContainerRef,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatDialog } from '@angular/material/dialog';
import { Router } from '@angular/router';
import type { CommentSubject } from '@riseback/contracts';
import { firstValueFrom } from 'rxjs';
import { CommentStore } from '../comments/comment-store';
import { elementOf } from '../comments/comment-subjects';
import { EditQueue } from '../networks/edit-queue';
import { NetworkStore } from '../networks/network-store';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { FreezeDialog } from './freeze-dialog';
import { HistoryList } from './history-list';
import { ReviewPanel } from './review-panel';
import { comparedRevision, shownRevision, WORKING } from './revision-choice';
import { RevisionHistory } from './revision-history';
import { RevisionReader } from './revision-reader';
import { WorkingPanel } from './working-panel';

/** Revisions: the history, what changed from one to the next, and review and signature. Which two are looked at stands in the address. */
@Component({
  selector: 'app-revisions-page',
  imports: [HistoryList, MatButton, ProblemBanner, ReviewPanel, WorkingPanel],
  providers: [RevisionReader],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './revisions-page.html',
  styleUrl: './revisions-page.scss',
})
export class RevisionsPage {
  protected readonly store = inject(NetworkStore);
  protected readonly history = inject(RevisionHistory);
  protected readonly reader = inject(RevisionReader);
  private readonly queue = inject(EditQueue);
  private readonly comments = inject(CommentStore);
  private readonly dialog = inject(MatDialog);
  private readonly router = inject(Router);
  private readonly here = inject(ViewContainerRef);

  /** From the address. */
  readonly revision = input<string>();
  readonly with = input<string>();

  private readonly review = viewChild(ReviewPanel);
  protected readonly version = this.queue.version;
  protected readonly shownId = computed(() => shownRevision(this.history.revisions(), this.revision()));
  protected readonly comparedId = computed(() => {
    const shown = this.shownId();
    return shown === null ? null : comparedRevision(this.history.revisions(), shown, this.with());
  });
  /** The address names a revision that this network has not. */
  protected readonly unknown = computed(() => {
    const wanted = this.revision();
    if (wanted === undefined || wanted === WORKING || this.history.load().status !== 'ready') return false;
    return !this.history.revisions().some(({ id }) => id === wanted);
  });
  protected readonly comparedLabel = computed(() => {
    const id = this.comparedId();
    return id === null ? '' : this.history.labelOf(id);
  });
  protected readonly listProblem = computed(() => {
    const load = this.history.load();
    return load.status === 'failed' ? load.problem : null;
  });
  protected readonly shownProblem = computed(() => {
    const load = this.reader.shown();
    return load.status === 'failed' ? load.problem : null;
  });
  protected readonly mayDraw = computed(() => this.store.mayDraw());
  protected readonly mayFreeze = computed(() => this.store.mayDraw() && this.shownId() !== null);
  /** Numbers of the open comments on what is shown, by element. */
  protected readonly commentNumbers = computed((): ReadonlyMap<string, readonly number[]> => {
    const shown = this.shownId();
    const numbers = this.comments.numbers();
    const byElement = new Map<string, number[]>();
    for (const thread of this.comments.threads()) {
      const element = elementOf(thread.subject);
      const belongs = shown === WORKING ? thread.revisionId === undefined : thread.revisionId === shown;
      if (element === null || thread.resolved !== undefined || !belongs) continue;
      byElement.set(element, [...(byElement.get(element) ?? []), numbers.get(thread.id) ?? 0]);
    }
    return byElement;
  });

  constructor() {
    effect(() => {
      const [shown, compared] = [this.shownId() ?? '', this.comparedId() ?? ''];
      untracked(() => {
        this.reader.shownId.set(shown);
        this.reader.comparedId.set(compared);
      });
    });
    effect(() => {
      const comparedId = this.comparedId();
      const shownId = this.shownId();
      const revision = this.reader.revision();
      const shown = shownId === WORKING ? { revision: null, comparedId } : { revision, comparedId };
      const known = shownId === WORKING || revision !== null;
      untracked(() => this.history.shown.set(known ? shown : null));
    });
    inject(DestroyRef).onDestroy(() => this.history.shown.set(null));
  }

  protected async freeze(): Promise<void> {
    const dialog = this.dialog.open<FreezeDialog, undefined, string>(FreezeDialog, {
      width: '560px',
      maxWidth: '96vw',
      viewContainerRef: this.here,
    });
    const id = await firstValueFrom(dialog.afterClosed());
    if (id === undefined) return;
    await this.router.navigate([], { queryParams: { revision: id, with: null }, queryParamsHandling: 'merge' });
  }

  protected commentOn(subject: CommentSubject): void {
    this.review()?.commentOn(subject);
  }
}

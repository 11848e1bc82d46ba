import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  type ElementRef,
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
import { EditQueue } from '../networks/edit-queue';
import { NetworkStore } from '../networks/network-store';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { RevisionCompare } from './compare/revision-compare';
import { FreezeDialog } from './freeze-dialog';
import { HistoryList } from './history-list';
import { ReviewPanel } from './review-panel';
import { comparedRevision, shownRevision, WORKING } from './revision-choice';
import { RevisionHistory } from './revision-history';
import { RevisionReader } from './revision-reader';
import type { RevisionSide } from './revision-side';
import { WorkingPanel } from './working-panel';

/** Revisions: the history, what changed from one to the next, and review and signature. Which two are looked at stands in the address. */
@Component({
  selector: 'app-revisions-page',
  imports: [HistoryList, MatButton, ProblemBanner, RevisionCompare, ReviewPanel, WorkingPanel],
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
  protected readonly comments = inject(CommentStore);
  private readonly dialog = inject(MatDialog);
  private readonly router = inject(Router);
  private readonly here = inject(ViewContainerRef);

  /** From the address. */
  readonly revision = input<string>();
  readonly with = input<string>();

  private readonly aside = viewChild<ElementRef<HTMLElement>>('aside');
  private readonly review = viewChild(ReviewPanel);
  private readonly working = viewChild(WorkingPanel);
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
  protected readonly sides = computed(() => {
    const [before, after] = [this.reader.before(), this.reader.after()];
    return before === null || after === null ? null : { before, after };
  });
  /** The numbers of the comments that are open on what is shown, by element. */
  protected readonly commentsOf = computed((): ReadonlyMap<string, readonly number[]> => {
    const [shown, numbers] = [this.shownId(), this.comments.numbers()];
    const at = [...this.comments.openAt()].map(([element, threads]) => {
      const here = threads.filter(({ revisionId }) => (revisionId ?? WORKING) === shown);
      return [element, here.map(({ id }) => numbers.get(id) ?? 0)] as const;
    });
    return new Map(at.filter(([, some]) => some.length > 0));
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

  /** Where it stands below the comparison. */
  protected goToReview(): void {
    this.aside()?.nativeElement.scrollIntoView();
    this.aside()?.nativeElement.focus();
  }

  protected commentOn(subject: CommentSubject): void {
    (this.review() ?? this.working())?.commentOn(subject);
  }

  /** On the drawing of the later one of the two that has it, with what is otherwise than in the earlier one where that is asked. */
  protected showOnDrawing(elementId: string | null): void {
    const has = (side: RevisionSide | null) =>
      side !== null && [...side.file.nodes, ...side.file.pipes].some(({ id }) => id === elementId);
    const id = elementId === null || has(this.reader.after()) ? this.shownId() : this.comparedId();
    const compare = id === this.shownId() && this.comparedId() !== WORKING ? this.comparedId() : null;
    const network = ['/sites', this.store.network()?.siteId ?? '', 'networks', this.store.networkId()];
    const view = id === null || id === WORKING ? ['drawing'] : ['frozen', id, 'drawing'];
    void this.router.navigate([...network, ...view], { queryParams: { element: elementId, compare } });
  }
}

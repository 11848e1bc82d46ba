import { ChangeDetectionStrategy, Component, computed, effect, inject, input, signal, untracked } from '@angular/core';
import { Title } from '@angular/platform-browser';
import { RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import type { Revision } from '@riseback/contracts';
import { CommentStore } from '../comments/comment-store';
import { PlanStore } from '../drawing/plan/plan-store';
import { PlanTool } from '../drawing/plan/plan-tool';
import { Company } from '../networks/company';
import { EditQueue } from '../networks/edit-queue';
import { NetworkApi } from '../networks/network-api';
import { NetworkStore } from '../networks/network-store';
import { TitleBlock } from '../networks/title-block';
import { UndoStack } from '../networks/undo-stack';
import { BANDS_TO_COME } from '../shared/bands-to-come';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { AppBar } from '../shell/app-bar';
import { FrozenNetworkApi } from './frozen-network-api';
import { RevisionHistory } from './revision-history';
import { sealWords, STATE_WORDS } from './revision-words';

const VIEWS = [
  { path: 'drawing', word: 'Drawing' },
  { path: 'lists', word: 'Lists' },
  { path: 'ledger', word: 'Lift & ledger' },
  { path: 'cases', word: 'Cases' },
  { path: 'try', word: 'Try changes' },
  { path: 'method', word: 'Method' },
] as const;

/** The frame of one frozen revision: the views of a network, read only, under a band that says so. */
@Component({
  selector: 'app-frozen-page',
  imports: [AppBar, ProblemBanner, RouterLink, RouterLinkActive, RouterOutlet, TitleBlock],
  providers: [
    FrozenNetworkApi,
    { provide: NetworkApi, useExisting: FrozenNetworkApi },
    NetworkStore,
    // of the frozen copy alone: nobody is in it, nothing arrives
    Company,
    CommentStore,
    EditQueue,
    PlanStore,
    PlanTool,
    RevisionHistory,
    UndoStack,
    { provide: BANDS_TO_COME, useValue: signal(false) },
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './frozen-page.html',
  styleUrls: ['../networks/network-page.scss', './frozen-page.scss'],
})
export class FrozenPage {
  protected readonly store = inject(NetworkStore);
  private readonly api = inject(FrozenNetworkApi);
  private readonly comments = inject(CommentStore);
  private readonly history = inject(RevisionHistory);
  private readonly title = inject(Title);

  readonly siteId = input.required<string>();
  readonly networkId = input.required<string>();
  readonly revisionId = input.required<string>();
  readonly case = input<string>();

  protected readonly views = VIEWS;
  protected readonly revision = signal<Revision | null>(null);
  protected readonly band = computed(() => {
    const revision = this.revision();
    if (revision === null) return null;
    // its state may have changed since it was opened
    const state = this.history.revisions().find(({ id }) => id === revision.id)?.state ?? revision.state;
    return { letter: revision.letter, state: STATE_WORDS[state].toLowerCase(), seal: sealWords(revision.fileHash) };
  });

  constructor() {
    effect(() => {
      const [networkId, revisionId] = [this.networkId(), this.revisionId()];
      untracked(() => this.open(networkId, revisionId));
    });
    effect(() => {
      this.store.wantedCaseId.set(this.case() ?? '');
    });
    effect(() => {
      const revision = this.revision();
      if (revision !== null) this.title.setTitle(`${revision.letter}, ${revision.file.name} · Riseback`);
    });
  }

  protected open(networkId: string, revisionId: string): void {
    this.api.revisionId = revisionId;
    this.comments.revisionId.set(revisionId);
    this.revision.set(null);
    this.store.open(networkId);
    this.api.revision(networkId).subscribe({
      next: (revision) => this.revision.set(revision),
      // the store asks for the same and says what is wrong
      error: () => undefined,
    });
  }
}

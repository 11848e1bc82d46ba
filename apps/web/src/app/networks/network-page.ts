import { ChangeDetectionStrategy, Component, DOCUMENT, effect, inject, input, untracked } from '@angular/core';
import { Title } from '@angular/platform-browser';
import { RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { CommentStore } from '../comments/comment-store';
import { GuideStrip } from '../guide/guide-strip';
import { PlanStore } from '../drawing/plan/plan-store';
import { PlanTool } from '../drawing/plan/plan-tool';
import { RevisionHistory } from '../revisions/revision-history';
import { RevisionTitleBlock } from '../revisions/revision-title-block';
import { BANDS_TO_COME } from '../shared/bands-to-come';
import { onlineSignal } from '../shared/online';
import { ProblemBanner } from '../shared/problem-banner/problem-banner';
import { HeldSiteSettings } from '../sites/held-site-settings';
import { AppBar } from '../shell/app-bar';
import { Company } from './company';
import { CompanyStrip } from './company-strip';
import { ConflictNotice } from './conflict-notice';
import { DraftKeeper } from './draft-keeper';
import { DraftOffer } from './draft-offer';
import { EditQueue } from './edit-queue';
import { NetworkStore } from './network-store';
import { RefusedEdits } from './refused-edits';
import { TitleBlock } from './title-block';
import { UndoStack } from './undo-stack';

const VIEWS = [
  { path: 'drawing', word: 'Drawing' },
  { path: 'lists', word: 'Lists' },
  { path: 'ledger', word: 'Lift & ledger' },
  { path: 'cases', word: 'Cases' },
  { path: 'try', word: 'Try changes' },
  { path: 'gauges', word: 'Gauges' },
  { path: 'revisions', word: 'Revisions' },
  { path: 'report', word: 'Report' },
  { path: 'method', word: 'Method' },
] as const;

/** Of a problem that no server told. */
const NOT_REACHED = 0;

/** The frame of one network: views, title block, and the view that the route names. */
@Component({
  selector: 'app-network-page',
  imports: [
    AppBar,
    CompanyStrip,
    ConflictNotice,
    DraftOffer,
    GuideStrip,
    ProblemBanner,
    RefusedEdits,
    RevisionTitleBlock,
    RouterLink,
    RouterLinkActive,
    RouterOutlet,
    TitleBlock,
  ],
  providers: [
    NetworkStore,
    CommentStore,
    Company,
    DraftKeeper,
    EditQueue,
    PlanStore,
    PlanTool,
    RevisionHistory,
    UndoStack,
    { provide: BANDS_TO_COME, useFactory: () => inject(NetworkStore).bandsToCome },
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {
    '(window:beforeunload)': 'warnBeforeLoss($event)',
    '(window:online)': 'saveAfterOffline()',
    '(window:pagehide)': 'keepWhatIsTyped()',
    '(document:visibilitychange)': 'drafts.flush()',
  },
  templateUrl: './network-page.html',
  styleUrl: './network-page.scss',
})
export class NetworkPage {
  protected readonly store = inject(NetworkStore);
  protected readonly drafts = inject(DraftKeeper);
  protected readonly online = onlineSignal();
  protected readonly history = inject(RevisionHistory);
  private readonly company = inject(Company);
  private readonly title = inject(Title);
  private readonly page = inject(DOCUMENT);

  readonly siteId = input.required<string>();
  readonly networkId = input.required<string>();
  readonly case = input<string>();
  readonly element = input<string>();

  protected readonly views = VIEWS;

  constructor() {
    effect(() => {
      const networkId = this.networkId();
      untracked(() => {
        this.drafts.open(networkId);
        this.store.open(networkId);
      });
    });
    effect(() => {
      const networkId = this.store.network()?.id;
      if (networkId !== undefined) untracked(() => this.company.open(networkId));
    });
    const siteSettings = inject(HeldSiteSettings);
    effect(() => {
      const siteId = this.siteId();
      untracked(() => siteSettings.ask(siteId));
    });
    effect(() => {
      const element = this.element();
      untracked(() => this.company.lookAt(element));
    });
    effect(() => {
      if (this.company.reloadAsked() > 0) untracked(() => this.store.readOn());
    });
    effect(() => {
      const solve = this.company.solveTold();
      if (solve !== null) untracked(() => this.store.hearOfSolve(solve));
    });
    effect(() => {
      this.store.wantedCaseId.set(this.case() ?? '');
    });
    effect(() => {
      const name = this.store.document()?.name;
      if (name !== undefined) this.title.setTitle(`${name} · Riseback`);
    });
  }

  /** The connection is back: what could not be loaded or saved comes and goes without the person having to ask. */
  protected saveAfterOffline(): void {
    if (this.store.problem()?.status === NOT_REACHED) this.store.open(this.networkId());
    else if (this.store.saveState() === 'notSaved') this.store.retrySave();
  }

  /** On a phone the row of views is wider than the screen. */
  protected bringIntoView(active: boolean, link: HTMLElement): void {
    if (active) link.scrollIntoView({ block: 'nearest', inline: 'nearest' });
  }

  /** A field is taken over when it is left, and the tab's end leaves it; then on to the device with all that is unsaved. */
  protected keepWhatIsTyped(): void {
    const field = this.page.activeElement;
    if (field instanceof HTMLElement) field.blur();
    this.drafts.flush();
  }

  /** The browser asks before a tab with unsaved edits is closed. */
  protected warnBeforeLoss(event: BeforeUnloadEvent): void {
    this.keepWhatIsTyped();
    if (this.store.saveState() !== 'saved') event.preventDefault();
  }
}

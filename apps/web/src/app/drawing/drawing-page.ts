import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DOCUMENT,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import { Router } from '@angular/router';
import type { CommentSubject } from '@riseback/contracts';
import type { Position } from '@riseback/network';
import { CommentStore } from '../comments/comment-store';
import { elementOf } from '../comments/comment-subjects';
import { NetworkStore } from '../networks/network-store';
import { allFindings, findingsOfCases } from '../results/finding-list';
import { gaugeNotes } from '../results/gauges/gauge-finding-list';
import { GaugeOutlooks } from '../results/gauges/gauge-outlook';
import { FindingsList } from '../results/findings-list/findings-list';
import { ComparisonPanel } from './comparison/comparison-panel';
import { DrawingComparison } from './comparison/drawing-comparison';
import { DrawingClipboard } from './drawing-clipboard';
import { DrawingCommands } from './drawing-commands';
import { DrawingScene } from './drawing-scene';
import { DrawingState } from './drawing-state';
import { DrawingTray } from './drawing-tray';
import { EmptySheet } from './empty-sheet';
import { FindingsHeight, keptFindingsHeight } from './findings-height';
import { Inspector } from './inspector/inspector';
import { KeyList } from './key-list';
import { zoneOf } from '@riseback/figures';
import { gaugeIdOf, gaugeKey } from './model/gauge-keys';
import { NodeArranging } from './node-arranging';
import { PlanStore } from './plan/plan-store';
import { PlanTool } from './plan/plan-tool';
import { DeletePrompt } from './sheet/delete-prompt';
import { DrawingSheet } from './sheet/drawing-sheet';
import { ElementMoving } from './sheet/element-moving';
import { GaugePlacing } from './sheet/gauge-placing';
import { GaugeSliding } from './sheet/gauge-sliding';
import { NodePlacing } from './sheet/node-placing';
import { PipeDrawing } from './sheet/pipe-drawing';
import { PipeGrabbing } from './sheet/pipe-grabbing';
import { SheetKeys } from './sheet/sheet-keys';
import { WalkKeys } from './sheet/walk-keys';
import { TagFinder } from './tag-finder';

const NARROW = '(width < 720px)';

/** The drawing of a network: sheet, tray, findings, inspector. Which element is looked at stands in the address. */
@Component({
  selector: 'app-drawing-page',
  imports: [
    ComparisonPanel,
    DrawingSheet,
    DrawingTray,
    EmptySheet,
    FindingsHeight,
    FindingsList,
    Inspector,
    KeyList,
    TagFinder,
  ],
  providers: [
    DeletePrompt,
    DrawingClipboard,
    DrawingCommands,
    DrawingComparison,
    DrawingScene,
    DrawingState,
    ElementMoving,
    GaugeOutlooks,
    GaugePlacing,
    GaugeSliding,
    NodeArranging,
    NodePlacing,
    PipeDrawing,
    PipeGrabbing,
    SheetKeys,
    WalkKeys,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.no-inspector]': '!inspectorOpen()' },
  templateUrl: './drawing-page.html',
  styleUrl: './drawing-page.scss',
})
export class DrawingPage {
  private readonly router = inject(Router);
  protected readonly store = inject(NetworkStore);
  protected readonly state = inject(DrawingState);
  protected readonly scene = inject(DrawingScene);
  protected readonly comments = inject(CommentStore);
  protected readonly planTool = inject(PlanTool);
  private readonly gauges = inject(GaugeOutlooks);
  protected readonly comparison = inject(DrawingComparison);

  /** From the address: the element looked at. */
  readonly element = input<string>();
  /** The revision that the drawing is compared with. */
  readonly compare = input<string>();

  /** On a phone the sheet has all the room until something is chosen. */
  private readonly narrow = inject(DOCUMENT).defaultView?.matchMedia(NARROW).matches === true;
  protected readonly findingsOpen = signal(!this.narrow);
  protected readonly inspectorOpen = signal(!this.narrow);
  protected readonly findingsHeight = signal(this.narrow ? 148 : keptFindingsHeight(inject(DOCUMENT).defaultView));
  protected readonly findings = computed(() => {
    const document = this.store.document();
    if (document === null) return [];
    const sources = { document, topology: this.store.topology(), units: this.store.units() };
    const found = this.store.showsWorst()
      ? findingsOfCases({ ...sources, outcomes: this.store.caseOutcomes() })
      : allFindings({ ...sources, outcome: this.store.outcome() });
    // notes come last in the list, and what is said of instruments after what is said of the plant
    return [...found, ...gaugeNotes(document, this.gauges.findings(), this.store.units())];
  });
  /** Said beside each finding where several cases stand together. */
  protected readonly nameOfCase = computed(() =>
    this.store.showsWorst() ? (caseId: string) => this.store.nameOfCase(caseId) : undefined,
  );
  protected readonly zoneAt = computed(() => {
    const sheet = this.scene.sheet();
    return (position: Position) => zoneOf(position, sheet);
  });
  protected readonly unsolved = computed(() => this.store.outcome() === null);
  protected readonly currentId = computed(() => {
    const chosen = this.state.chosenId() ?? '';
    return gaugeIdOf(chosen) ?? chosen;
  });

  constructor() {
    effect(() => {
      this.comparison.revisionId.set(this.compare() ?? '');
    });
    effect(() => {
      const wanted = this.element();
      untracked(() => {
        if (wanted !== undefined && wanted !== this.state.chosenId() && this.scene.has(wanted)) {
          this.state.select(wanted);
          this.state.focusId.set(wanted);
        }
      });
    });
    effect(() => {
      const chosen = this.state.chosenId();
      untracked(() => {
        if ((this.element() ?? null) !== chosen) this.writeAddress(chosen);
      });
    });
    effect(() => {
      const chosen = this.state.chosenId();
      if (this.narrow) this.inspectorOpen.set(chosen !== null);
    });
    effect(() => {
      if (this.state.asking() || this.state.fieldsAsked() > 0) this.inspectorOpen.set(true);
    });
    const plan = inject(PlanStore);
    effect(() => {
      if (plan.panelAsked() > 0) this.inspectorOpen.set(true);
    });
  }

  protected open(elementId: string): void {
    // a finding names a gauge by its own id
    const id = [elementId, gaugeKey(elementId)].find((candidate) => this.scene.has(candidate));
    if (id === undefined) return;
    this.state.select(id);
    this.state.focusOn(id);
  }

  /** Of the case that is shown, unless the finding is of another. */
  protected commentOn(subject: CommentSubject): void {
    const elementId = elementOf(subject);
    if (elementId === null || !this.scene.has(elementId)) return;
    this.state.select(elementId);
    const caseId = this.store.caseOf(elementId);
    const ofCase = subject.kind === 'result' && subject.caseId === undefined && caseId !== '';
    this.comments.ask(ofCase ? { ...subject, caseId } : subject);
    this.inspectorOpen.set(true);
  }

  protected toggleFindings(): void {
    this.findingsOpen.update((open) => !open);
  }

  protected toggleInspector(): void {
    this.inspectorOpen.update((open) => !open);
  }

  private writeAddress(element: string | null): void {
    // the person is on the way to another view: writing this one's address would call that off
    if (this.router.currentNavigation() !== null) return;
    void this.router.navigate([], { queryParams: { element }, queryParamsHandling: 'merge', replaceUrl: true });
  }
}

import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  Injector,
  afterNextRender,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { MakeCase } from '../../cases/make-case';
import { CommentStore } from '../../comments/comment-store';
import { CommentsTab } from '../../comments/comments-tab';
import { elementOf } from '../../comments/comment-subjects';
import { NetworkStore } from '../../networks/network-store';
import { type Status, StatusMark } from '../../shared/status-mark/status-mark';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { isPipe, KIND_WORDS, nameOf, TRAP_TYPE_WORDS } from '../../shared/element-words';
import { DeletePrompt } from '../sheet/delete-prompt';
import { ElementIcon } from '../symbols/element-icon';
import { placeWords } from '../model/gauge-name';
import { GaugePanel } from './gauge-panel';
import { InputsTab } from './inputs-tab';
import { ModelTab } from './model-tab';
import { NetworkPanel } from './network-panel';
import { NewElementForm } from './new-element-form';
import { NewGaugeForm } from './new-gauge-form';
import { ResultTab } from './result-tab';

const TABS = { result: 'Result', inputs: 'Inputs', model: 'Model', comments: 'Comments' } as const;
type Tab = keyof typeof TABS;

/** Beside the sheet: the selected element's result, inputs and model; the new element being asked for; or the network as a whole. */
@Component({
  selector: 'app-inspector',
  imports: [
    CommentsTab,
    ElementIcon,
    GaugePanel,
    InputsTab,
    MakeCase,
    MatButton,
    ModelTab,
    NetworkPanel,
    NewElementForm,
    NewGaugeForm,
    ResultTab,
    RouterLink,
    StatusMark,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './inspector.html',
  styleUrl: './inspector.scss',
})
export class Inspector {
  protected readonly store = inject(NetworkStore);
  protected readonly state = inject(DrawingState);
  private readonly scene = inject(DrawingScene);
  protected readonly comments = inject(CommentStore);
  private readonly deletePrompt = inject(DeletePrompt);
  private readonly commands = inject(DrawingCommands);

  private readonly inputs = viewChild(InputsTab);
  private readonly gaugePanel = viewChild(GaugePanel);
  private readonly commentsTab = viewChild(CommentsTab);

  private readonly wantedTab = signal<Tab>('result');
  protected readonly element = computed(() => {
    const chosen = this.state.chosenId();
    if (chosen === null) return null;
    const { nodes, pipes } = this.scene.settled();
    return nodes.get(chosen)?.node ?? pipes.get(chosen)?.pipe ?? null;
  });
  protected readonly gauge = computed(() => this.scene.gauges().get(this.state.chosenId() ?? '')?.gauge ?? null);
  protected readonly gaugePlace = computed(() => {
    const [gauge, document] = [this.gauge(), this.store.document()];
    return gauge === null || document === null ? '' : `Gauge ${placeWords(gauge, document, this.store.units())}`;
  });
  protected readonly head = computed(() => {
    const element = this.element();
    if (element === null) return null;
    if (isPipe(element))
      return { kind: 'pipe' as const, name: nameOf(element), under: 'Pipe', trapType: undefined, vented: false };
    const trapType = element.kind === 'trap' ? element.trapType : undefined;
    const words = KIND_WORDS[element.kind];
    return {
      kind: element.kind,
      name: nameOf(element),
      under: [
        trapType === undefined ? words.charAt(0).toUpperCase() + words.slice(1) : TRAP_TYPE_WORDS[trapType],
        element.area ?? '',
      ]
        .filter((part) => part !== '')
        .join(', '),
      trapType,
      vented: element.kind === 'receiver' && element.vented === true,
    };
  });
  protected readonly status = computed((): Status | null => {
    const chosen = this.state.chosenId();
    if (chosen === null) return null;
    const concern = this.scene.nodeViews().get(chosen)?.concern ?? this.scene.pipeViews().get(chosen)?.concern ?? null;
    if (concern !== null) return concern;
    return this.store.trapResults().has(chosen) ? 'pass' : null;
  });
  protected readonly model = computed(() => {
    const model = this.trap()?.trapModel;
    return model === undefined ? null : (this.store.document()?.trapModels.get(model)?.value ?? null);
  });
  protected readonly tabs = computed(() =>
    (Object.keys(TABS) as Tab[]).filter((tab) => tab !== 'model' || this.trap() !== null),
  );
  protected readonly tab = computed(() => (this.tabs().includes(this.wantedTab()) ? this.wantedTab() : 'result'));
  protected readonly words = TABS;
  protected readonly openComments = computed(
    () => this.comments.openAt().get(this.state.chosenId() ?? '')?.length ?? 0,
  );
  protected readonly trap = computed(() => {
    const element = this.element();
    return element === null || isPipe(element) || element.kind !== 'trap' ? null : element;
  });

  protected readonly mayRemove = computed(() => this.commands.mayRemove(this.state.selection()));

  constructor() {
    const injector = inject(Injector);
    effect(() => {
      if (this.state.fieldsAsked() === 0) return;
      untracked(() => {
        this.wantedTab.set('inputs');
        afterNextRender(() => (this.gaugePanel() ?? this.inputs())?.focusFirst(), { injector });
      });
    });
    effect(() => {
      const wanted = this.comments.wanted();
      const chosen = this.state.chosenId();
      if (wanted === null || wanted.opened || elementOf(wanted.subject) !== chosen) return;
      untracked(() => {
        this.comments.opened();
        this.wantedTab.set('comments');
        afterNextRender(() => this.commentsTab()?.focusForm(), { injector });
      });
    });
  }

  protected choose(tab: Tab): void {
    this.wantedTab.set(tab);
  }

  /** Arrows go from tab to tab, as everywhere. */
  protected step(event: Event, by: number): void {
    const tabs = this.tabs();
    const next = tabs[(tabs.indexOf(this.tab()) + by + tabs.length) % tabs.length];
    if (next === undefined) return;
    this.wantedTab.set(next);
    const list = event.currentTarget instanceof Element ? event.currentTarget.parentElement : null;
    list?.querySelector<HTMLElement>(`[data-tab="${next}"]`)?.focus();
  }

  /** Back to the drawing: from a field, or with the button. */
  protected back(): void {
    this.state.focusOn(this.state.chosenId() ?? this.state.focusId());
  }

  protected close(): void {
    this.state.select();
    this.state.focusOn(this.state.focusId());
  }

  protected askDelete(): void {
    void this.deletePrompt.ask(this.state.selection());
  }
}

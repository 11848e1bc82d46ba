import type { ElementRef } from '@angular/core';
import {
  afterRenderEffect,
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  inject,
  untracked,
  viewChild,
} from '@angular/core';
import type { Position } from '@riseback/network';
import { CommentStore } from '../../comments/comment-store';
import { Company } from '../../networks/company';
import { NetworkStore } from '../../networks/network-store';
import { ComparisonLayer } from '../comparison/comparison-layer';
import { DrawingComparison } from '../comparison/drawing-comparison';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { GraphCanvas } from '../graph-canvas/graph-canvas';
import { LabelLayer } from '../labels/label-layer';
import type { NodeView, PipeView } from '../model/element-views';
import { gaugeIdOf } from '../model/gauge-keys';
import type { GaugeView } from '../model/gauge-views';
import { SheetMenu } from '../menus/sheet-menu';
import { type Direction, placeOf } from '../model/navigation';
import { boundsOf, needsOverview } from '../model/overview';
import { centreToShow, symbolScale, toScreen, toSheet } from '../model/viewport';
import { PlanLayer } from '../plan/plan-layer';
import { PlanOverlay } from '../plan/plan-overlay';
import { GaugeMark } from '../symbols/gauge-mark';
import { NodeMark } from '../symbols/node-mark';
import { PipeMark } from '../symbols/pipe-mark';
import { ColourLegend } from './colour-legend';
import { PreviewLayer } from './preview-layer';
import { fitClear, isCovered } from './sheet-cover';
import { SheetKeys } from './sheet-keys';
import { SheetLabelling } from './sheet-labelling';
import { OverviewMap } from './overview-map';
import type { PinchStep } from './pinch';
import { SheetPointer, type Target, targetOf } from './sheet-pointer';
import { STEPS } from './walk-keys';
import { ZoneFrame } from './zone-frame';

/** How near the edge the focused element may come before the view follows, px. */
const FOLLOW_MARGIN = 48;

/** The sheet of paper: frame, network, labels and legend, with what pointer and keys do on it. */
@Component({
  selector: 'app-drawing-sheet',
  imports: [
    ColourLegend,
    ComparisonLayer,
    GaugeMark,
    GraphCanvas,
    LabelLayer,
    NodeMark,
    OverviewMap,
    PipeMark,
    PlanLayer,
    PlanOverlay,
    PreviewLayer,
    SheetMenu,
    ZoneFrame,
  ],
  providers: [SheetLabelling, SheetPointer],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[style.--symbol-scale]': 'symbolScale()', '[class]': 'state.mode().kind' },
  templateUrl: './drawing-sheet.html',
  styleUrl: './drawing-sheet.scss',
})
export class DrawingSheet {
  protected readonly store = inject(NetworkStore);
  protected readonly state = inject(DrawingState);
  protected readonly scene = inject(DrawingScene);
  protected readonly pointer = inject(SheetPointer);
  protected readonly labelling = inject(SheetLabelling);
  protected readonly comparison = inject(DrawingComparison);
  private readonly keys = inject(SheetKeys);
  private readonly others = inject(Company);
  private readonly comments = inject(CommentStore);

  private readonly canvas = viewChild.required(GraphCanvas);
  private readonly menu = viewChild.required(SheetMenu);
  private readonly surface = viewChild.required<ElementRef<HTMLElement>>('surface');

  protected readonly viewport = computed(() => this.canvas().viewport());
  protected readonly symbolScale = computed(() => symbolScale(this.viewport().zoom));
  /** Gauges come last, so that they lie over what they tap. */
  protected readonly canvasNodes = computed(() => [
    ...this.scene.settled().nodes.values(),
    ...[...this.scene.gauges().values()].map(({ id, tap }) => ({ id, at: tap })),
  ]);
  protected readonly canvasLinks = computed(() =>
    [...this.scene.settled().pipes.values()].map(({ id, pipe, points }) => ({
      id,
      from: pipe.from,
      to: pipe.to,
      points,
    })),
  );
  protected readonly keep = computed(() => {
    const focused = this.state.focusId();
    return new Set([...this.state.selection(), ...(focused === null ? [] : [focused])]);
  });
  protected readonly drawingName = computed(
    () =>
      `Drawing of ${this.store.document()?.name ?? 'the network'}. Arrows go from element to element, question mark lists the keys.`,
  );
  protected readonly wayOf = computed(() => {
    const chosen = this.state.chosenId();
    const node = chosen === null ? undefined : this.scene.settled().nodes.get(chosen)?.node;
    return node?.kind === 'trap' ? (node.tag ?? node.id) : null;
  });
  private readonly bounds = computed(() => boundsOf(this.scene.settled()));
  /** What the small map shows; null where none is needed. */
  protected readonly overview = computed(() => (needsOverview(this.bounds(), this.viewport()) ? this.bounds() : null));
  protected readonly stale = computed(() => this.store.solveState().kind !== 'solved');

  private readonly size = computed(() => ({ width: this.viewport().width, height: this.viewport().height }), {
    equal: (a, b) => a.width === b.width && a.height === b.height,
  });
  /** The person has moved the view. */
  private looked = false;
  private readonly gestures = {
    viewport: () => this.viewport(),
    holdStill: (still: boolean) => {
      this.canvas().holdStill(still);
    },
    pinch: ({ from, to, factor }: PinchStep) => {
      this.canvas().zoomAbout(from, factor, to);
    },
    openMenu: (at: Position, target: Target) => {
      this.menu().open(at, target, toSheet(at, this.viewport()));
    },
    corner: () => {
      const { left, top } = this.surface().nativeElement.getBoundingClientRect();
      return { x: left, y: top };
    },
  };

  constructor() {
    this.labelling.follow(this.viewport);
    effect(() => {
      this.state.zoom.set(this.viewport().zoom);
    });
    effect(() => {
      this.others.choose([...this.state.selection()].filter((id) => gaugeIdOf(id) === undefined));
    });
    inject(DestroyRef).onDestroy(() => this.others.choose(null));
    effect(() => {
      // until the person looks for themselves everything is shown, however large the sheet becomes while the page fills
      this.size();
      this.store.network();
      if (this.canvas().ready() && !this.looked)
        untracked(() => {
          this.fit();
        });
    });
    let before: object | null = null;
    let whole = false;
    effect(() => {
      const [size, bounds, view] = [this.size(), this.bounds(), this.viewport()];
      const [resized, wasWhole] = [before !== null && size !== before, whole];
      before = size;
      whole = !needsOverview(bounds, view);
      // a strip or the inspector opened beside it: what was there to see as a whole still is, and what is selected stays in sight
      if (resized && this.looked)
        untracked(() => {
          if (wasWhole && !whole) this.fit();
          else this.bringIntoSight(this.state.chosenId());
        });
    });
    effect(() => {
      const asked = this.state.zoomAsked();
      if (asked === null) return;
      untracked(() => {
        if (asked.factor === null) this.fit();
        else this.zoomBy(asked.factor);
      });
    });
    afterRenderEffect(() => {
      if (this.state.focusAsked() > 0)
        untracked(() => {
          this.followFocus();
        });
    });
  }

  zoomBy(factor: number): void {
    this.looked = true;
    const { width, height } = this.viewport();
    this.canvas().zoomAbout({ x: width / 2, y: height / 2 }, factor);
    this.state.say(`${String(Math.round(this.viewport().zoom * 100))} per cent`);
  }

  fit(): void {
    const { nodes, pipes } = this.scene.settled();
    const points = [...[...nodes.values()].map(({ at }) => at), ...[...pipes.values()].flatMap((pipe) => pipe.points)];
    this.canvas().show(fitClear(points, this.viewport()));
  }

  /** Looks a quarter of the window farther. */
  panBy(direction: Direction): void {
    this.looked = true;
    const view = this.viewport();
    const [x, y] = STEPS[direction];
    this.lookAt(toSheet({ x: view.width * (0.5 + 0.25 * x), y: view.height * (0.5 + 0.25 * y) }, view));
    this.state.say(`View moved ${direction}`);
  }

  /** The menu of the element with the keyboard, or of the sheet. */
  openMenu(): void {
    const id = this.scene.tabStop();
    const place = id === null ? undefined : placeOf(this.scene.walked(), id);
    const at = place === undefined ? { x: 40, y: 40 } : toScreen(place, this.viewport());
    this.menu().open(at, { id, bend: -1 }, null);
  }

  protected menuAsked(event: MouseEvent): void {
    event.preventDefault();
    // the menu key makes one of these too, after its own key has opened the menu
    if (event.button !== 2) return;
    const corner = this.gestures.corner();
    const at = { x: event.clientX - corner.x, y: event.clientY - corner.y };
    this.gestures.openMenu(at, targetOf(event));
  }

  protected lookAt(centre: Position): void {
    this.looked = true;
    this.canvas().show({ zoom: this.viewport().zoom, centre });
  }

  protected activeBend(id: string): number {
    const mode = this.state.mode();
    return mode.kind === 'moving' && mode.ids[0] === id && mode.grip?.kind === 'corner' ? mode.grip.index : -1;
  }

  /** What is read out: the element, what is otherwise than before, its open comments, and who else has it selected. */
  protected spoken({ id, name }: NodeView | PipeView | GaugeView): string {
    return [name, this.comparison.wordsFor(id), this.comments.wordsFor(id), this.others.wordsFor(id)]
      .filter((part) => part !== '')
      .join(', ');
  }

  /** With the mouse; by keyboard the element's own tab leads there. */
  protected openComments(id: string): void {
    this.state.select(id);
    this.state.focusOn(id);
    this.comments.ask({ kind: 'element', elementId: id });
  }

  protected shiftOf(view: NodeView): string {
    const from = this.scene.settled().nodes.get(view.id)?.at ?? view.at;
    return `translate(${view.at.x - from.x} ${view.at.y - from.y})`;
  }

  /** What it taps is being moved, or it along its pipe. */
  protected gaugeShift({ id, tap }: GaugeView): string {
    const from = this.scene.gauges().get(id)?.tap ?? tap;
    return `translate(${tap.x - from.x} ${tap.y - from.y})`;
  }

  protected focused(id: string): void {
    this.state.focusId.set(id);
    if (this.scene.settled().nodes.get(id)?.node.kind === 'trap') this.state.lastTrapId.set(id);
  }

  protected wheeled(): void {
    this.looked = true;
  }

  protected keyDown(event: KeyboardEvent): void {
    if (this.keys.handle(event, this)) {
      event.preventDefault();
      event.stopPropagation();
    }
  }

  protected down(event: PointerEvent): void {
    this.looked = true;
    this.pointer.down(event, this.gestures);
  }

  protected move(event: PointerEvent): void {
    this.pointer.move(event, this.gestures);
    const element = event.target instanceof Element ? event.target.closest<SVGElement>('[data-element]') : null;
    this.labelling.hovered.set(element?.dataset['element'] ?? null);
  }

  protected up(event: PointerEvent): void {
    this.pointer.up(event, this.gestures);
  }

  protected cancelled(event: PointerEvent): void {
    this.pointer.cancel(this.gestures, event);
  }

  private followFocus(): void {
    const id = this.state.focusId();
    if (id === null || !this.bringIntoSight(id)) this.canvas().focusDrawing();
    else this.canvas().focusElement(id);
  }

  /** Moves the view as little as it takes. False where there is no such element. */
  private bringIntoSight(id: string | null): boolean {
    const place = id === null ? undefined : placeOf(this.scene.walked(), id);
    if (place === undefined) return false;
    const centre = isCovered(place, this.viewport(), this.overview())
      ? place
      : centreToShow(place, this.viewport(), FOLLOW_MARGIN);
    if (centre !== null) this.canvas().show({ zoom: this.viewport().zoom, centre });
    return true;
  }
}

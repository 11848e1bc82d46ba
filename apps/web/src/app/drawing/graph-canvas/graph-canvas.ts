import { NgTemplateOutlet } from '@angular/common';
import type { TemplateRef } from '@angular/core';
import {
  afterNextRender,
  afterRenderEffect,
  ChangeDetectionStrategy,
  Component,
  computed,
  contentChild,
  ElementRef,
  inject,
  Injector,
  input,
  signal,
  untracked,
  viewChild,
} from '@angular/core';
import type { Position } from '@riseback/network';
import { type Edge, GraphComponent, LayoutService, type Node } from '@swimlane/ngx-graph';
import { clampZoom, toSheet, type View, type Viewport, ZOOM_RANGE } from '../model/viewport';
import { FixedLayout, type PlacedLink, type PlacedNode } from './fixed-layout';
import { GraphIds } from './graph-ids';
import { sameOnCanvas } from './same-on-canvas';

export interface CanvasNode {
  readonly id: string;
  readonly at: Position;
}
export interface CanvasLink {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  readonly points: readonly Position[];
}
interface MarkContext {
  readonly $implicit: string;
}

/** Up to this many elements everything is rendered; beyond, only what is near the window. */
const RENDER_ALL = 400;

/**
 * The one place that knows the graph library: hands it the elements near the window at fixed places, and gives zoom, pan and templates
 * in our own terms. Dragging, drawing of pipes, keys and names are the sheet's; the library's own drag stays off.
 */
@Component({
  selector: 'app-graph-canvas',
  imports: [GraphComponent, NgTemplateOutlet],
  providers: [LayoutService],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './graph-canvas.html',
  styleUrl: './graph-canvas.scss',
})
export class GraphCanvas {
  private readonly injector = inject(Injector);
  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly nodes = input.required<readonly CanvasNode[]>();
  readonly links = input.required<readonly CanvasLink[]>();
  /** Elements that stay rendered wherever the window is: focused and selected ones. */
  readonly keep = input<ReadonlySet<string>>(new Set());
  readonly label = input.required<string>();
  /** The drawing itself takes the tab stop while no element can. */
  readonly takesFocus = input(false);

  readonly nodeMark = contentChild.required<TemplateRef<MarkContext>>('nodeMark');
  readonly pipeMark = contentChild.required<TemplateRef<MarkContext>>('pipeMark');
  readonly underlay = contentChild<TemplateRef<unknown>>('underlay');
  private readonly graph = viewChild.required(GraphComponent);

  protected readonly layout = new FixedLayout();
  protected readonly zoomRange = ZOOM_RANGE;
  private readonly ids = new GraphIds();
  private readonly contexts = new Map<string, MarkContext>();
  private wanted: View | null = null;

  private readonly view = signal<Viewport>({ zoom: 1, panX: 0, panY: 0, width: 600, height: 400 }, { equal: sameView });
  /** What part of the sheet is on the screen. */
  readonly viewport = this.view.asReadonly();
  /** The canvas has its size and can be told where to look. */
  readonly ready = signal(false);

  /** The window and half of it again on each side, in steps of half a window, so that small pans render nothing anew. */
  private readonly nearby = computed(
    () => {
      const view = this.view();
      const { x, y } = toSheet({ x: 0, y: 0 }, view);
      const [stepX, stepY] = [view.width / view.zoom / 2, view.height / view.zoom / 2];
      const [left, top] = [Math.floor(x / stepX - 1) * stepX, Math.floor(y / stepY - 1) * stepY];
      return { left, top, right: left + 4 * stepX, bottom: top + 4 * stepY };
    },
    { equal: (a, b) => a.left === b.left && a.top === b.top && a.right === b.right && a.bottom === b.bottom },
  );
  private readonly shown = computed(
    () => {
      const nodes = this.nodes();
      const links = this.links();
      if (nodes.length + links.length <= RENDER_ALL) return { nodes, links };
      const { left, top, right, bottom } = this.nearby();
      const keep = this.keep();
      const within = ({ x, y }: Position) => x >= left && x <= right && y >= top && y <= bottom;
      const near = links.filter(
        ({ id, points }) => keep.has(id) || points.some(within) || crosses(points, { left, top, right, bottom }),
      );
      const ends = new Set(near.flatMap(({ from, to }) => [from, to]));
      return { nodes: nodes.filter(({ id, at }) => keep.has(id) || ends.has(id) || within(at)), links: near };
    },
    // most edits and every result leave all places as they were, and the library would lay everything out anew
    { equal: sameOnCanvas },
  );
  /** The library writes into what it is given, so it always gets fresh objects. */
  protected readonly graphNodes = computed((): Node[] =>
    this.shown().nodes.map(({ id, at }) => ({
      id: this.ids.of(id, 'n'),
      position: { ...at },
      dimension: { width: 1, height: 1 },
      data: { elementId: id, x: at.x, y: at.y } satisfies PlacedNode,
    })),
  );
  protected readonly graphLinks = computed((): Edge[] =>
    this.shown().links.map(({ id, from, to, points }) => ({
      id: this.ids.of(id, 'p'),
      source: this.ids.of(from, 'n'),
      target: this.ids.of(to, 'n'),
      data: { elementId: id, points } satisfies PlacedLink,
    })),
  );

  constructor() {
    afterNextRender(() => {
      settleTransition(this.graph());
      paintExactly(this.graph());
    });
    // after rendering: only then has the library the new lists
    afterRenderEffect(() => {
      this.graphNodes();
      this.graphLinks();
      untracked(() => {
        this.relayout();
      });
    });
    afterRenderEffect(() => {
      const svg = this.host.nativeElement.querySelector('svg');
      svg?.setAttribute('role', 'application');
      svg?.setAttribute('aria-label', this.label());
      if (this.takesFocus()) svg?.setAttribute('tabindex', '0');
      else svg?.removeAttribute('tabindex');
    });
  }

  /** Looks at a place at a zoom; before the canvas has its size, as soon as it has. */
  show(view: View): void {
    if (!this.ready()) {
      this.wanted = view;
      return;
    }
    const graph = this.graph();
    graph.zoomTo(clampZoom(view.zoom), { layout: false });
    graph.panTo(view.centre.x, view.centre.y);
    // the library repaints programmed moves only when its zone or an event tells it to
    graph.basicUpdate();
    this.readView();
  }

  /** Zooms about a point of the canvas, which stays where it is, or comes to another. */
  zoomAbout(point: Position, factor: number, to: Position = point): void {
    const view = this.view();
    const zoom = clampZoom(view.zoom * factor);
    const fixed = toSheet(point, view);
    this.show({
      zoom,
      centre: { x: fixed.x + (view.width / 2 - to.x) / zoom, y: fixed.y + (view.height / 2 - to.y) / zoom },
    });
  }

  /** Stops the library's own panning while a drag means something else. */
  holdStill(still: boolean): void {
    this.graph().setViewportInteractions({ pan: !still });
  }

  focusDrawing(): void {
    this.host.nativeElement.querySelector('svg')?.focus();
  }

  /** Puts the keyboard on an element; a new one is waited for until the library has rendered it. */
  focusElement(elementId: string, triesLeft = 3): void {
    const mark = [...this.host.nativeElement.querySelectorAll<SVGElement>('[data-element]')].find(
      (candidate) => candidate.dataset['element'] === elementId,
    );
    if (mark !== undefined) mark.focus({ preventScroll: true });
    else if (triesLeft === 0) this.focusDrawing();
    else {
      afterNextRender(
        () => {
          this.focusElement(elementId, triesLeft - 1);
        },
        { injector: this.injector },
      );
      this.graph().basicUpdate();
    }
  }

  protected contextOf(data: unknown): MarkContext {
    const { elementId } = data as PlacedNode | PlacedLink;
    const known = this.contexts.get(elementId);
    if (known !== undefined) return known;
    const made = { $implicit: elementId };
    this.contexts.set(elementId, made);
    return made;
  }

  /** One colour group for all: the library would otherwise sort every node's label for a palette that is not used. */
  protected readonly oneGroup = (): string => '';

  protected readView(): void {
    const graph = this.graph();
    this.view.set({
      zoom: graph.zoomLevel,
      panX: graph.panOffsetX,
      panY: graph.panOffsetY,
      width: graph.width,
      height: graph.height,
    });
    if (this.ready() || !graph.initialized) return;
    this.ready.set(true);
    const { wanted } = this;
    this.wanted = null;
    if (wanted !== null) this.show(wanted);
  }

  /** The library ignores empty lists, and skips changes that follow a wheel turn within 0.7 s, unless it is told. */
  private relayout(): void {
    const graph = this.graph();
    if (graph.initialized) graph.update({ forceRelayout: true });
  }
}

/**
 * The library works its layout transition out from its inputs twice for each element whenever the drawing is checked, which was half of
 * what a move of the mouse cost while dragging. Here it is always the same: nothing glides to its place.
 */
function settleTransition(graph: GraphComponent): void {
  Object.defineProperty(graph, 'effectiveLayoutTransition', { value: graph.effectiveLayoutTransition });
}

/**
 * The library paints its matrix rounded to hundredths: a zoom of 0.5245 painted as 0.52 puts an element a thousand units out 4.5 px beside
 * where it is, and the first step of a zoom lets all of them jump.
 */
function paintExactly(graph: GraphComponent): void {
  const paint = graph.updateTransform.bind(graph);
  graph.updateTransform = () => {
    paint();
    const { a, b, c, d, e, f } = graph.transformationMatrix;
    graph.transform = `matrix(${[a, b, c, d, e, f].join(',')})`;
  };
}

function sameView(a: Viewport, b: Viewport): boolean {
  return a.zoom === b.zoom && a.panX === b.panX && a.panY === b.panY && a.width === b.width && a.height === b.height;
}

/** A long run may pass the window with none of its points inside. */
function crosses(
  points: readonly Position[],
  { left, top, right, bottom }: { left: number; top: number; right: number; bottom: number },
): boolean {
  return points.some((b, i) => {
    const a = points[i - 1];
    return (
      a !== undefined &&
      Math.max(a.x, b.x) >= left &&
      Math.min(a.x, b.x) <= right &&
      Math.max(a.y, b.y) >= top &&
      Math.min(a.y, b.y) <= bottom
    );
  });
}

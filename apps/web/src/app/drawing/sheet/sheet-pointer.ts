import { inject, Injectable, signal } from '@angular/core';
import type { Position } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { snapPoint } from '@riseback/figures';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { shiftNodes } from '../model/displacement';
import { NOTHING_DISPLACED } from '../model/drawn-network';
import { toSheet, type Viewport } from '../model/viewport';
import { GaugePlacing } from './gauge-placing';
import { NodePlacing } from './node-placing';
import { Pinch, type PinchStep } from './pinch';
import { PipeDrawing } from './pipe-drawing';
import { PipeGrabbing, type PipeHold } from './pipe-grabbing';

/** What was pointed at. */
export interface Target {
  readonly id: string | null;
  /** A bend of the pipe, or −1. */
  readonly bend: number;
}

/** What a gesture needs of the canvas. */
export interface PointerSurface {
  viewport(): Viewport;
  holdStill(still: boolean): void;
  pinch(step: PinchStep): void;
  /** The canvas's corner in the window. */
  corner(): Position;
  openMenu(at: Position, target: Target): void;
}

type Press = {
  readonly kind: 'press';
  readonly start: Position;
  readonly target: Target;
  readonly adding: boolean;
  readonly touch: boolean;
};
type Gesture =
  | Press
  | { readonly kind: 'drag'; readonly start: Position; readonly ids: readonly string[]; readonly grip: Position }
  | { readonly kind: 'reshape'; readonly start: Position; readonly hold: PipeHold }
  | { readonly kind: 'pipe'; readonly from: string }
  | { readonly kind: 'box'; readonly start: Position };

/** Pixels that a hand may tremble before a press becomes a drag; a finger is broader than a mouse's point. */
const TREMBLE = { mouse: 4, touch: 10 } as const;
const LONG_PRESS_MS = 500;

/** What the mouse and fingers do on the sheet: select, drag, draw pipes, bend them, box select, pinch, long press. Every one has a key or a form equal. */
@Injectable()
export class SheetPointer {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);
  private readonly pipes = inject(PipeDrawing);
  private readonly placing = inject(NodePlacing);
  private readonly gauges = inject(GaugePlacing);
  private readonly grabbing = inject(PipeGrabbing);

  private gesture: Gesture | null = null;
  private longPress: ReturnType<typeof setTimeout> | undefined;
  private pressedLong = false;
  private readonly fingers = new Pinch();
  private readonly boxCorners = signal<readonly [Position, Position] | null>(null);
  /** The selection box being drawn, in sheet coordinates. */
  readonly box = this.boxCorners.asReadonly();

  down(event: PointerEvent, surface: PointerSurface): void {
    const start = at(event, surface);
    const touch = event.pointerType === 'touch';
    if (touch) {
      this.fingers.down(event.pointerId, start);
      if (this.fingers.count > 1) {
        this.cancel(surface);
        surface.holdStill(true);
        return;
      }
    }
    if (event.button !== 0) return;
    const target = targetOf(event);
    const idle = this.state.mode().kind === 'idle';
    if (this.store.mayDraw() && target.id !== null && onHandle(event)) {
      surface.holdStill(true);
      this.pipes.start(target.id);
      this.gesture = { kind: 'pipe', from: target.id };
      hold(event);
      return;
    }
    if (target.id === null && event.shiftKey && idle) {
      surface.holdStill(true);
      this.gesture = { kind: 'box', start };
      hold(event);
      return;
    }
    // a finger on what is not selected pans, as it does beside it
    const pans = idle && (target.id === null || (touch && !this.state.selection().has(target.id)));
    surface.holdStill(!pans);
    this.gesture = { kind: 'press', start, target, adding: event.shiftKey || event.ctrlKey || event.metaKey, touch };
    if (touch && idle) this.awaitLongPress(start, target, surface);
  }

  move(event: PointerEvent, surface: PointerSurface): void {
    const point = at(event, surface);
    const pinched = event.pointerType === 'touch' ? this.fingers.move(event.pointerId, point) : null;
    if (pinched !== null) {
      surface.pinch(pinched);
      return;
    }
    const mode = this.state.mode();
    if (mode.kind === 'piping') this.state.mode.set({ ...mode, pointer: toSheet(point, surface.viewport()) });
    const { gesture } = this;
    switch (gesture?.kind) {
      case 'press':
        if (!far(gesture, point)) return;
        clearTimeout(this.longPress);
        this.startDrag(gesture, surface);
        if (this.gesture !== null) hold(event);
        return;
      case 'drag': {
        const { dx, dy } = this.snapped(gesture.start, point, gesture.grip, surface);
        this.state.displaced.set(shiftNodes(this.scene.settled(), gesture.ids, dx, dy));
        return;
      }
      case 'reshape':
        this.grabbing.drag(gesture.hold, moved(gesture.start, point, surface));
        return;
      case 'box':
        this.boxCorners.set([toSheet(gesture.start, surface.viewport()), toSheet(point, surface.viewport())]);
        return;
      case 'pipe':
      case undefined:
    }
  }

  up(event: PointerEvent, surface: PointerSurface): void {
    clearTimeout(this.longPress);
    this.fingers.up(event.pointerId);
    const { gesture } = this;
    this.gesture = null;
    surface.holdStill(false);
    const point = at(event, surface);
    switch (gesture?.kind) {
      case 'press':
        if (!far(gesture, point)) this.click(gesture, toSheet(point, surface.viewport()));
        return;
      case 'drag':
      case 'reshape':
        this.commands.settle();
        return;
      case 'pipe':
        this.endPipe(gesture.from, nodeUnder(event));
        return;
      case 'box':
        this.selectInBox();
        return;
      case undefined:
    }
  }

  /** The browser took the gesture over, or it became another. */
  cancel(surface: PointerSurface, event?: PointerEvent): void {
    clearTimeout(this.longPress);
    if (event !== undefined) this.fingers.up(event.pointerId);
    this.gesture = null;
    this.boxCorners.set(null);
    this.state.displaced.set(NOTHING_DISPLACED);
    surface.holdStill(false);
  }

  /** The click that browsers make of a finger's end would press what the menu has put under it. */
  touchEnd(event: TouchEvent): void {
    if (this.pressedLong && event.cancelable) event.preventDefault();
    this.pressedLong = false;
  }

  private awaitLongPress(start: Position, target: Target, surface: PointerSurface): void {
    clearTimeout(this.longPress);
    this.pressedLong = false;
    this.longPress = setTimeout(() => {
      this.pressedLong = true;
      this.cancel(surface);
      surface.openMenu(start, target);
    }, LONG_PRESS_MS);
  }

  private click({ target: { id }, adding }: Press, place: Position): void {
    const mode = this.state.mode();
    if (mode.kind === 'placing') {
      this.placing.at(mode.what, place);
      return;
    }
    if (mode.kind === 'tapping') {
      if (id !== null) this.gauges.on(id, place);
      else this.state.say('There is nothing to tap: click an element or a pipe, or press Escape');
      return;
    }
    if (mode.kind === 'piping') {
      this.pickPipeEnd(mode.from, id);
      return;
    }
    if (id === null) {
      if (!adding) this.state.select();
      return;
    }
    if (adding) this.state.toggle(id);
    else this.state.select(id);
    this.state.focusOn(id);
  }

  private pickPipeEnd(from: string | null, id: string | null): void {
    if (id === null || !this.scene.settled().nodes.has(id)) this.pipes.giveUp();
    else if (from === null) this.pipes.start(id);
    else if (id !== from) this.pipes.ask(from, id);
  }

  private startDrag({ start, target, touch }: Press, surface: PointerSurface): void {
    this.gesture = null;
    const { id, bend } = target;
    if (id === null || !this.store.mayDraw() || this.state.mode().kind !== 'idle') return;
    const selected = this.state.selection();
    if (touch && !selected.has(id)) return;
    const node = this.scene.settled().nodes.get(id);
    if (node !== undefined) {
      const ids = selected.has(id) ? [...selected] : [id];
      if (!selected.has(id)) this.state.select(id);
      this.gesture = { kind: 'drag', start, ids, grip: node.at };
      return;
    }
    const held = this.grabbing.take(id, bend, toSheet(start, surface.viewport()));
    if (held === null) return;
    if (!selected.has(id) || selected.size > 1) this.state.select(id);
    this.gesture = { kind: 'reshape', start, hold: held };
  }

  private endPipe(from: string, to: string | null): void {
    // let go on the handle itself: the end is clicked next
    if (to === from) return;
    if (to !== null && this.scene.settled().nodes.has(to)) this.pipes.ask(from, to);
    else this.pipes.giveUp();
  }

  private selectInBox(): void {
    const corners = this.boxCorners();
    this.boxCorners.set(null);
    if (corners === null) return;
    const [a, b] = corners;
    const within = ({ x, y }: Position) =>
      x >= Math.min(a.x, b.x) && x <= Math.max(a.x, b.x) && y >= Math.min(a.y, b.y) && y <= Math.max(a.y, b.y);
    const { nodes, pipes } = this.scene.settled();
    const inside = [
      ...[...nodes.values()].filter((node) => within(node.at)),
      ...[...pipes.values()].filter(({ points }) => points.every(within)),
    ].map(({ id }) => id);
    this.state.selectAll(inside);
  }

  /** The grabbed point lands on the grid; what goes along keeps its distance to it. */
  private snapped(start: Position, point: Position, grip: Position, surface: PointerSurface) {
    const by = moved(start, point, surface);
    const landed = snapPoint({ x: grip.x + by.x, y: grip.y + by.y });
    return { dx: landed.x - grip.x, dy: landed.y - grip.y };
  }
}

/** What an event points at on the sheet. */
export function targetOf(event: Event): Target {
  const target = event.target instanceof Element ? event.target : null;
  return {
    id: target?.closest<SVGElement>('[data-element]')?.dataset['element'] ?? null,
    bend: Number(target?.closest<SVGElement>('[data-bend]')?.dataset['bend'] ?? -1),
  };
}

function onHandle(event: PointerEvent): boolean {
  return event.target instanceof Element && event.target.closest('[data-handle]') !== null;
}

function at(event: PointerEvent, surface: PointerSurface): Position {
  const corner = surface.corner();
  return { x: event.clientX - corner.x, y: event.clientY - corner.y };
}

/** How far the pointer went, in sheet coordinates. */
function moved(start: Position, point: Position, surface: PointerSurface): Position {
  const { zoom } = surface.viewport();
  return { x: (point.x - start.x) / zoom, y: (point.y - start.y) / zoom };
}

/** A drag that leaves the canvas goes on until the button is let go. */
function hold(event: PointerEvent): void {
  if (event.currentTarget instanceof Element) event.currentTarget.setPointerCapture(event.pointerId);
}

function far({ start, touch }: Press, point: Position): boolean {
  return Math.hypot(start.x - point.x, start.y - point.y) > (touch ? TREMBLE.touch : TREMBLE.mouse);
}

function nodeUnder(event: PointerEvent): string | null {
  const element = document.elementFromPoint(event.clientX, event.clientY);
  return element?.closest<SVGElement>('[data-element]')?.dataset['element'] ?? null;
}

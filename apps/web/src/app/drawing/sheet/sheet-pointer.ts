import { inject, Injectable, signal } from '@angular/core';
import type { Position } from '@riseback/network';
import { NetworkStore } from '../../networks/network-store';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE } from '../drawing-state';
import { movableBends, shiftBend, shiftNodes } from '../model/displacement';
import { NOTHING_DISPLACED } from '../model/drawn-network';
import { snapPoint } from '../../shared/placement';
import { toSheet, type Viewport } from '../model/viewport';
import { NodePlacing } from './node-placing';
import { SheetKeys } from './sheet-keys';

/** What a gesture needs of the canvas. */
export interface PointerSurface {
  viewport(): Viewport;
  holdStill(still: boolean): void;
  zoomAbout(point: Position, factor: number): void;
  /** The canvas's corner in the window. */
  corner(): Position;
}

type Gesture =
  | {
      readonly kind: 'press';
      readonly start: Position;
      readonly id: string | null;
      readonly bend: number;
      readonly adding: boolean;
    }
  | { readonly kind: 'drag'; readonly start: Position; readonly ids: readonly string[]; readonly grip: Position }
  | {
      readonly kind: 'bend';
      readonly start: Position;
      readonly id: string;
      readonly bend: number;
      readonly grip: Position;
    }
  | { readonly kind: 'pipe'; readonly from: string }
  | { readonly kind: 'box'; readonly start: Position };

/** Pixels that a hand may tremble before a press becomes a drag. */
const TREMBLE = 4;

/** What the mouse and fingers do on the sheet: select, drag, draw pipes, box select, pinch. Every one has a key or a form equal. */
@Injectable()
export class SheetPointer {
  private readonly store = inject(NetworkStore);
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);
  private readonly keys = inject(SheetKeys);
  private readonly placing = inject(NodePlacing);

  private gesture: Gesture | null = null;
  private readonly fingers = new Map<number, Position>();
  private readonly boxCorners = signal<readonly [Position, Position] | null>(null);
  /** The selection box being drawn, in sheet coordinates. */
  readonly box = this.boxCorners.asReadonly();

  down(event: PointerEvent, surface: PointerSurface): void {
    if (event.pointerType === 'touch') {
      this.fingers.set(event.pointerId, at(event, surface));
      if (this.fingers.size === 2) {
        this.cancel(surface);
        surface.holdStill(true);
        return;
      }
    }
    if (event.button !== 0) return;
    const start = at(event, surface);
    const target = event.target instanceof Element ? event.target : null;
    const id = target?.closest<SVGElement>('[data-element]')?.dataset['element'] ?? null;
    const bend = Number(target?.closest<SVGElement>('[data-bend]')?.dataset['bend'] ?? -1);
    const may = this.store.mayDraw();
    if (may && id !== null && target?.closest('[data-handle]') !== null) {
      surface.holdStill(true);
      this.keys.startPipe(id);
      this.gesture = { kind: 'pipe', from: id };
      hold(event);
      return;
    }
    if (id !== null || this.state.mode().kind !== 'idle') surface.holdStill(true);
    if (id === null && event.shiftKey && this.state.mode().kind === 'idle') {
      surface.holdStill(true);
      this.gesture = { kind: 'box', start };
      hold(event);
      return;
    }
    this.gesture = { kind: 'press', start, id, bend, adding: event.shiftKey || event.ctrlKey || event.metaKey };
  }

  move(event: PointerEvent, surface: PointerSurface): void {
    const point = at(event, surface);
    if (this.pinch(event, point, surface)) return;
    const mode = this.state.mode();
    if (mode.kind === 'piping') this.state.mode.set({ ...mode, pointer: toSheet(point, surface.viewport()) });
    const { gesture } = this;
    switch (gesture?.kind) {
      case 'press':
        if (!far(gesture.start, point)) return;
        this.startDrag(gesture, surface);
        if (this.gesture !== null) hold(event);
        return;
      case 'drag': {
        const { dx, dy } = this.snapped(gesture.start, point, gesture.grip, surface);
        this.state.displaced.set(shiftNodes(this.scene.settled(), gesture.ids, dx, dy));
        return;
      }
      case 'bend': {
        const { dx, dy } = this.snapped(gesture.start, point, gesture.grip, surface);
        const pipe = this.scene.settled().pipes.get(gesture.id);
        if (pipe !== undefined) this.state.displaced.set(shiftBend(pipe, gesture.bend, dx, dy));
        return;
      }
      case 'box':
        this.boxCorners.set([toSheet(gesture.start, surface.viewport()), toSheet(point, surface.viewport())]);
        return;
      case 'pipe':
      case undefined:
    }
  }

  up(event: PointerEvent, surface: PointerSurface): void {
    this.fingers.delete(event.pointerId);
    const { gesture } = this;
    this.gesture = null;
    surface.holdStill(false);
    const point = at(event, surface);
    switch (gesture?.kind) {
      case 'press':
        if (!far(gesture.start, point)) this.click(gesture, toSheet(point, surface.viewport()));
        return;
      case 'drag':
      case 'bend':
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

  cancel(surface: PointerSurface): void {
    this.gesture = null;
    this.boxCorners.set(null);
    this.state.displaced.set(NOTHING_DISPLACED);
    surface.holdStill(false);
  }

  private click({ id, adding }: Extract<Gesture, { kind: 'press' }>, place: Position): void {
    const mode = this.state.mode();
    if (mode.kind === 'placing') {
      this.placing.at(mode.what, place);
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
    if (id === null || !this.scene.settled().nodes.has(id)) {
      this.state.mode.set(IDLE);
      this.state.say('No pipe drawn');
    } else if (from === null) this.keys.startPipe(id);
    else if (id !== from) this.keys.askPipe(from, id);
  }

  private startDrag({ start, id, bend }: Extract<Gesture, { kind: 'press' }>, surface: PointerSurface): void {
    const network = this.scene.settled();
    this.gesture = null;
    if (id === null || !this.store.mayDraw() || this.state.mode().kind !== 'idle') return;
    const node = network.nodes.get(id);
    if (node !== undefined) {
      const selected = this.state.selection();
      const ids = selected.has(id) ? [...selected] : [id];
      if (!selected.has(id)) this.state.select(id);
      this.gesture = { kind: 'drag', start, ids, grip: node.at };
      return;
    }
    const pipe = network.pipes.get(id);
    const grip = pipe === undefined ? undefined : movableBends(pipe)[bend];
    if (grip !== undefined) this.gesture = { kind: 'bend', start, id, bend, grip };
    else surface.holdStill(false);
  }

  private endPipe(from: string, to: string | null): void {
    if (to !== null && to !== from && this.scene.settled().nodes.has(to)) this.keys.askPipe(from, to);
    // let go on the handle itself: the end is clicked next
    else if (to !== from) {
      this.state.mode.set(IDLE);
      this.state.say('No pipe drawn');
    }
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
    this.state.select(...inside);
    this.state.say(`${String(inside.length)} elements selected`);
  }

  /** The grabbed point lands on the grid; what goes along keeps its distance to it. */
  private snapped(
    start: Position,
    point: Position,
    grip: Position,
    surface: PointerSurface,
  ): { dx: number; dy: number } {
    const { zoom } = surface.viewport();
    const landed = snapPoint({ x: grip.x + (point.x - start.x) / zoom, y: grip.y + (point.y - start.y) / zoom });
    return { dx: landed.x - grip.x, dy: landed.y - grip.y };
  }

  private pinch(event: PointerEvent, point: Position, surface: PointerSurface): boolean {
    if (!this.fingers.has(event.pointerId)) return false;
    const before = [...this.fingers.values()];
    this.fingers.set(event.pointerId, point);
    const now = [...this.fingers.values()];
    const [a, b] = before;
    const [c, d] = now;
    if (a === undefined || b === undefined || c === undefined || d === undefined) return false;
    const apart = Math.hypot(b.x - a.x, b.y - a.y);
    if (apart > 0)
      surface.zoomAbout({ x: (c.x + d.x) / 2, y: (c.y + d.y) / 2 }, Math.hypot(d.x - c.x, d.y - c.y) / apart);
    return true;
  }
}

function at(event: PointerEvent, surface: PointerSurface): Position {
  const corner = surface.corner();
  return { x: event.clientX - corner.x, y: event.clientY - corner.y };
}

/** A drag that leaves the canvas goes on until the button is let go. */
function hold(event: PointerEvent): void {
  if (event.currentTarget instanceof Element) event.currentTarget.setPointerCapture(event.pointerId);
}

function far(a: Position, b: Position): boolean {
  return Math.hypot(a.x - b.x, a.y - b.y) > TREMBLE;
}

function nodeUnder(event: PointerEvent): string | null {
  const element = document.elementFromPoint(event.clientX, event.clientY);
  return element?.closest<SVGElement>('[data-element]')?.dataset['element'] ?? null;
}

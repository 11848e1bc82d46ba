import { inject, Injectable } from '@angular/core';
import type { Position } from '@riseback/network';
import { distance, middle, pieces } from '../../shared/geometry';
import { GRID, snapPoint } from '@riseback/figures';
import { DrawingCommands } from '../drawing-commands';
import { DrawingScene } from '../drawing-scene';
import { DrawingState, IDLE, type Mode } from '../drawing-state';
import { gripsOf, shiftGrip, shiftNodes, withoutBend, withoutBends } from '../model/displacement';
import { type Displaced, type DrawnPipe, NOTHING_DISPLACED, shownBends } from '../model/drawn-network';
import type { PipeGrip } from '../model/pipe-shape';
import { ARROWS, STEPS } from './walk-keys';

type Moving = Extract<Mode, { kind: 'moving' }>;

/** Moving by keys, of elements and of a pipe's bends: arrows move, Enter sets down as one step of undo, Escape puts back. */
@Injectable()
export class ElementMoving {
  private readonly scene = inject(DrawingScene);
  private readonly state = inject(DrawingState);
  private readonly commands = inject(DrawingCommands);

  /** Moves the selection that an element belongs to, or the element alone; of a pipe alone its first bend. */
  start(here: string): void {
    const selected = this.state.selection();
    const ids = selected.has(here) ? [...selected] : [here];
    const pipe = ids.length === 1 ? this.scene.settled().pipes.get(here) : undefined;
    const [grip] = pipe === undefined ? [] : gripsOf(pipe);
    this.state.mode.set({ kind: 'moving', ids, grip: grip ?? null, dx: 0, dy: 0 });
    const what =
      grip === undefined
        ? `${ids.length === 1 ? this.scene.tagOf(here) : `${String(ids.length)} elements`}; Enter sets down, Escape puts back`
        : grip.kind === 'corner'
          ? `bend 1 of ${this.scene.tagOf(here)}; comma and full stop choose another, Delete takes it out, Enter sets it down`
          : `${this.scene.tagOf(here)} aside; Enter sets it down, Escape puts back`;
    this.state.say(`Moving ${what}`);
  }

  /** Two new bends in a pipe: what lies behind a point of it moves aside. @param at the point; without one, the middle of the longest piece */
  startBend(here: string, at: Position | null = null): void {
    const pipe = this.scene.settled().pipes.get(here);
    const place = pipe === undefined ? undefined : splitOf(pipe, at);
    if (place === undefined) {
      this.state.say('Go to a pipe first');
      return;
    }
    this.state.select(here);
    this.state.mode.set({ kind: 'moving', ids: [here], grip: place, dx: 0, dy: 0 });
    this.state.say(
      `New bend in ${this.scene.tagOf(here)}: arrows move the pipe behind it aside, Enter sets it down, Escape puts back`,
    );
  }

  handle(event: KeyboardEvent, mode: Moving): boolean {
    const direction = ARROWS[event.key];
    if (direction !== undefined) {
      const [x, y] = STEPS[direction];
      const step = GRID * (event.shiftKey ? 10 : 1);
      this.displace({ ...mode, dx: mode.dx + x * step, dy: mode.dy + y * step });
      this.state.say(`${direction} ${String(step / GRID)}`);
      return true;
    }
    switch (event.key) {
      case 'Enter':
        this.commands.settle();
        return true;
      case 'Escape':
        this.putBack();
        this.state.say('Put back');
        return true;
      case ',':
      case '.':
        this.otherBend(mode, event.key === ',' ? -1 : 1);
        return true;
      case 'Delete':
      case 'Backspace':
        if (mode.grip?.kind === 'corner') this.removeBend(mode.ids[0] ?? '', mode.grip.index);
        return true;
      default:
        return true;
    }
  }

  removeBend(id: string, bend: number): void {
    const network = this.scene.settled();
    const pipe = network.pipes.get(id);
    const displaced = pipe === undefined ? null : withoutBend(network, pipe, bend);
    if (displaced === null) {
      this.putBack();
      this.state.say(`${this.scene.tagOf(id)} cannot do without this bend`);
      return;
    }
    this.lay(displaced, `bend taken out of ${this.scene.tagOf(id)}`);
  }

  /** Takes all bends out: the pipe runs as a new one between its ends would. */
  straighten(id: string): void {
    const pipe = this.scene.settled().pipes.get(id);
    if (pipe === undefined) return;
    if ((pipe.pipe.bends ?? []).length === 0) this.state.say(`${this.scene.tagOf(id)} has no bends of its own`);
    else this.lay(withoutBends(pipe), `${this.scene.tagOf(id)} laid straight`);
  }

  private lay(displaced: Displaced, label: string): void {
    this.state.displaced.set(displaced);
    this.commands.settle(label);
  }

  private putBack(): void {
    this.state.displaced.set(NOTHING_DISPLACED);
    this.state.mode.set(IDLE);
  }

  private displace(mode: Moving): void {
    const network = this.scene.settled();
    const pipe = mode.grip === null ? undefined : network.pipes.get(mode.ids[0] ?? '');
    this.state.mode.set(mode);
    this.state.displaced.set(
      pipe === undefined || mode.grip === null
        ? shiftNodes(network, mode.ids, mode.dx, mode.dy)
        : shiftGrip(pipe, mode.grip, mode.dx, mode.dy),
    );
  }

  private otherBend(mode: Moving, step: number): void {
    const pipe = this.scene.settled().pipes.get(mode.ids[0] ?? '');
    if (mode.grip?.kind !== 'corner' || pipe === undefined) return;
    const count = shownBends(pipe).length;
    const index = (mode.grip.index + step + count) % count;
    this.displace({ ...mode, grip: { kind: 'corner', index }, dx: 0, dy: 0 });
    this.state.say(`Bend ${String(index + 1)} of ${String(count)}`);
  }
}

/** Where a pipe is bent: on the piece nearest to a point, or half-way along its longest. */
function splitOf({ points }: DrawnPipe, at: Position | null): PipeGrip | undefined {
  const runs = pieces(points).map((piece, index) => ({ piece, index }));
  const off = ([a, b]: readonly [Position, Position]) =>
    at === null
      ? -distance(a, b)
      : distance(at, {
          x: Math.min(Math.max(at.x, Math.min(a.x, b.x)), Math.max(a.x, b.x)),
          y: Math.min(Math.max(at.y, Math.min(a.y, b.y)), Math.max(a.y, b.y)),
        });
  const [nearest] = runs.sort((left, right) => off(left.piece) - off(right.piece));
  if (nearest === undefined) return undefined;
  const [a, b] = nearest.piece;
  const landed = snapPoint(at ?? middle(nearest.piece));
  const split = a.y === b.y ? { x: landed.x, y: a.y } : { x: a.x, y: landed.y };
  return { kind: 'piece', index: nearest.index, split };
}

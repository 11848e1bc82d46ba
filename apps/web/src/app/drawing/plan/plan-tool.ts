import { computed, inject, Injectable, signal } from '@angular/core';
import type { Position } from '@riseback/network';
import { distance } from '../../shared/geometry';
import { PlanStore } from './plan-store';

export type PlanMode =
  | { readonly kind: 'idle' }
  /** Two points of the plan are being shown; `cross` is where the keyboard is. */
  | { readonly kind: 'measuring'; readonly points: readonly Position[]; readonly cross: Position | null }
  /** The plan goes with the pointer or the arrows, until it is let go or put back. */
  | { readonly kind: 'moving'; readonly from: Position };

const IDLE: PlanMode = { kind: 'idle' };

/** What is being done to the plan on the sheet, where pointer and keys otherwise mean elements. In the network page's `providers`. */
@Injectable()
export class PlanTool {
  private readonly store = inject(PlanStore);
  readonly mode = signal<PlanMode>(IDLE);
  /** Between the two points that were shown, units of the drawing; null until there are two. */
  readonly measured = computed(() => {
    const mode = this.mode();
    const [from, to] = mode.kind === 'measuring' ? mode.points : [];
    return from === undefined || to === undefined ? null : { from, to, units: distance(from, to) };
  });

  startMeasuring(): void {
    this.mode.set({ kind: 'measuring', points: [], cross: null });
  }

  startMoving(): void {
    const plan = this.store.plan();
    if (plan !== null) this.mode.set({ kind: 'moving', from: { x: plan.x, y: plan.y } });
  }

  /** After two points, the next one begins anew. */
  show(point: Position): void {
    this.mode.update((mode) => {
      if (mode.kind !== 'measuring') return mode;
      return { ...mode, points: mode.points.length < 2 ? [...mode.points, point] : [point] };
    });
  }

  moveCross(cross: Position): void {
    this.mode.update((mode) => (mode.kind === 'measuring' ? { ...mode, cross } : mode));
  }

  moveBy(dx: number, dy: number): void {
    const plan = this.store.plan();
    if (plan !== null) this.store.preview({ x: plan.x + dx, y: plan.y + dy });
  }

  /** Leaves the plan where it is now. */
  done(): void {
    if (this.mode().kind === 'moving') this.store.place({});
    this.mode.set(IDLE);
  }

  /** Puts a moved plan back. */
  cancel(): void {
    const mode = this.mode();
    if (mode.kind === 'moving') this.store.preview(mode.from);
    this.mode.set(IDLE);
  }
}

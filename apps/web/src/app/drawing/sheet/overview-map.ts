import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { Position } from '@riseback/network';
import type { DrawnNetwork } from '../model/drawn-network';
import { linePath } from '@riseback/figures';
import { type Bounds, mapOf, windowOf } from '../model/overview';
import type { Viewport } from '../model/viewport';

/**
 * The whole network small, with a frame around what the window shows; pressing or dragging on it looks there. A picture for pointing at:
 * by keys the view goes with the focus, and Ctrl with an arrow moves it.
 */
@Component({
  selector: 'app-overview-map',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg
      focusable="false"
      preserveAspectRatio="xMidYMid meet"
      [attr.width]="map().width"
      [attr.height]="map().height"
      [attr.viewBox]="box()"
      (pointerdown)="take($event)"
      (pointermove)="drag($event)"
    >
      <path class="pipes" [attr.d]="pipes()" />
      <path class="nodes" [attr.d]="nodes()" />
      <rect
        class="frame"
        [attr.x]="frame().left"
        [attr.y]="frame().top"
        [attr.width]="frame().right - frame().left"
        [attr.height]="frame().bottom - frame().top"
      />
    </svg>
  `,
  styles: `
    :host {
      display: block;
      border: 1px solid var(--rb-ink-3);
      background: var(--rb-sheet);
    }
    svg {
      display: block;
      cursor: move;
      touch-action: none;
    }
    path,
    rect {
      fill: none;
      vector-effect: non-scaling-stroke;
      pointer-events: none;
    }
    .pipes {
      stroke: var(--rb-ink-3);
    }
    .nodes {
      stroke: var(--rb-ink);
      stroke-width: 3;
      stroke-linecap: round;
    }
    .frame {
      fill: var(--rb-copper-wash);
      fill-opacity: 0.35;
      stroke: var(--rb-copper);
      stroke-width: 1.5;
    }
  `,
})
export class OverviewMap {
  readonly network = input.required<DrawnNetwork>();
  readonly bounds = input.required<Bounds>();
  readonly viewport = input.required<Viewport>();
  /** The place that comes to the middle of the window. */
  readonly looked = output<Position>();

  protected readonly map = computed(() => mapOf(this.bounds()));
  protected readonly box = computed(() => {
    const { left, top, right, bottom } = this.map().shown;
    return [left, top, right - left, bottom - top].join(' ');
  });
  protected readonly pipes = computed(() =>
    [...this.network().pipes.values()].map(({ points }) => linePath(points)).join(''),
  );
  protected readonly nodes = computed(() =>
    [...this.network().nodes.values()].map(({ at: { x, y } }) => `M${String(x)} ${String(y)}h0.01`).join(''),
  );
  /** Never beyond the map's own edge, which would hide where it is. */
  protected readonly frame = computed(() => {
    const { shown } = this.map();
    const seen = windowOf(this.viewport());
    const within = (value: number, low: number, high: number) => Math.min(high, Math.max(low, value));
    return {
      left: within(seen.left, shown.left, shown.right),
      right: within(seen.right, shown.left, shown.right),
      top: within(seen.top, shown.top, shown.bottom),
      bottom: within(seen.bottom, shown.top, shown.bottom),
    };
  });

  protected take(event: PointerEvent): void {
    event.preventDefault();
    if (event.currentTarget instanceof Element) event.currentTarget.setPointerCapture(event.pointerId);
    this.look(event);
  }

  protected drag(event: PointerEvent): void {
    if (event.buttons !== 0) this.look(event);
  }

  private look({ currentTarget, clientX, clientY }: PointerEvent): void {
    if (!(currentTarget instanceof SVGSVGElement)) return;
    const onMap = currentTarget.getScreenCTM()?.inverse();
    if (onMap === undefined) return;
    const { x, y } = new DOMPoint(clientX, clientY).matrixTransform(onMap);
    this.looked.emit({ x, y });
  }
}

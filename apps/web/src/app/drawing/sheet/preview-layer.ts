import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { Position } from '@riseback/network';
import { rightAngled } from '../../shared/geometry';
import { DrawingScene } from '../drawing-scene';
import { DrawingState } from '../drawing-state';
import { leavingAxis } from '../model/drawn-network';
import { linePath } from '@riseback/figures';
import { toScreen, type Viewport } from '../model/viewport';
import { NodeSymbol } from '../symbols/node-symbol';

/** What is not there yet: the pipe being drawn, the new element being asked for, the box being drawn around elements. */
@Component({
  selector: 'app-preview-layer',
  imports: [NodeSymbol],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { 'aria-hidden': 'true' },
  template: `
    <svg width="100%" height="100%" focusable="false">
      @if (line(); as d) {
        <path class="line" [attr.d]="d" />
      }
      @if (ghost(); as ghost) {
        <g class="ghost" [attr.transform]="'translate(' + ghost.at.x + ' ' + ghost.at.y + ')'">
          <circle r="17" />
          <g appNodeSymbol [kind]="ghost.kind"></g>
        </g>
      }
      @if (boxShape(); as box) {
        <rect class="box" [attr.x]="box.x" [attr.y]="box.y" [attr.width]="box.width" [attr.height]="box.height" />
      }
    </svg>
  `,
  styles: `
    :host {
      position: absolute;
      inset: 0;
      pointer-events: none;
    }
    .line {
      fill: none;
      stroke: var(--rb-copper);
      stroke-width: 2;
      stroke-dasharray: 6 4;
    }
    .ghost circle {
      fill: var(--rb-copper-wash);
      stroke: var(--rb-copper);
      stroke-dasharray: 4 3;
    }
    .box {
      fill: var(--rb-copper-wash);
      fill-opacity: 0.4;
      stroke: var(--rb-copper);
    }
  `,
})
export class PreviewLayer {
  private readonly state = inject(DrawingState);
  private readonly scene = inject(DrawingScene);

  readonly viewport = input.required<Viewport>();
  /** Opposite corners of the selection box, in sheet coordinates. */
  readonly box = input.required<readonly [Position, Position] | null>();

  protected readonly line = computed(() => {
    const mode = this.state.mode();
    const draft = this.state.draft();
    if (draft?.kind === 'pipe') return this.lineBetween(draft.from, draft.to, null);
    return mode.kind === 'piping' && mode.from !== null ? this.lineBetween(mode.from, mode.to, mode.pointer) : '';
  });
  protected readonly ghost = computed(() => {
    const draft = this.state.draft();
    return draft?.kind === 'node' ? { kind: draft.what, at: toScreen(draft.at, this.viewport()) } : null;
  });
  protected readonly boxShape = computed(() => {
    const box = this.box();
    if (box === null) return null;
    const [a, b] = [toScreen(box[0], this.viewport()), toScreen(box[1], this.viewport())];
    return { x: Math.min(a.x, b.x), y: Math.min(a.y, b.y), width: Math.abs(a.x - b.x), height: Math.abs(a.y - b.y) };
  });

  /** As the pipe will run. */
  private lineBetween(from: string, to: string | null, pointer: Position | null): string {
    const { nodes } = this.scene.settled();
    const start = nodes.get(from);
    const end = (to === null ? undefined : nodes.get(to)?.at) ?? pointer ?? undefined;
    if (start === undefined || end === undefined) return '';
    const line = rightAngled([start.at, end], leavingAxis(start.node.kind));
    return linePath(line.map((point) => toScreen(point, this.viewport())));
  }
}

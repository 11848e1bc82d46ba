import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Position } from '@riseback/network';
import { type Crossing, linePath } from '@riseback/figures';
import { shownBends } from '../model/drawn-network';
import type { PipeView } from '../model/element-views';
import { cutLine } from '../../shared/geometry';

/** Room between a pipe and what frames it, drawing units. */
const FRAME = 12;
const CORNER = 8;
/** The lift staff stands this far beside its riser. */
const STAFF_OFFSET = 13;
/** A tick each 2 ft. */
const TICK_M = 0.6096;
const MOST_TICKS = 40;

/** A pipe on the sheet: wash of the result, core of ink, arrow, check valve, choked outlet, lift staff; dashed and bare while it is not solved. */
@Component({
  selector: '[appPipeMark]',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './pipe-mark.html',
  styleUrl: './pipe-mark.scss',
})
export class PipeMark {
  readonly view = input.required<PipeView>();
  readonly selected = input(false);
  /** On the way of the selected trap. */
  readonly onWay = input(false);
  /** Bends may be dragged. */
  readonly bendable = input(false);
  /** Where it passes over others. */
  readonly crossings = input<readonly Crossing[]>([]);
  /** The bend that the keyboard moves; −1 for none. */
  readonly activeBend = input(-1);

  protected readonly line = computed(() => linePath(this.view().drawn.points));
  protected readonly wash = computed(() =>
    this.view().wash.map(({ points, level }) => ({ path: linePath(points), level })),
  );
  protected readonly bends = computed(() => (this.bendable() ? shownBends(this.view().drawn) : []));
  /** Short of its ends, which lie under the symbols that it joins. */
  protected readonly frame = computed(() => frameOf(cutLine(this.view().drawn.points, 0.15, 0.85)));
  protected readonly brackets = computed(() => {
    const { x, y, width, height } = this.frame();
    const [r, b] = [x + width, y + height];
    const c = Math.min(CORNER, width / 3, height / 3);
    return `M${x} ${y + c}V${y}H${x + c}M${r - c} ${y}H${r}V${y + c}M${r} ${b - c}V${b}H${r - c}M${x + c} ${b}H${x}V${b - c}`;
  });
  protected readonly staff = computed(() => {
    const { lift } = this.view();
    if (lift === null) return null;
    const [a, b] = lift.piece;
    const [top, bottom] = [Math.min(a.y, b.y), Math.max(a.y, b.y)];
    const x = a.x + STAFF_OFFSET;
    const count = Math.min(MOST_TICKS, Math.floor(lift.riseM / TICK_M));
    const step = (bottom - top) / (lift.riseM / TICK_M);
    const ticks = Array.from({ length: count + 1 }, (_, i) => `M${x} ${bottom - i * step}h4`).join('');
    return `M${x} ${top}V${bottom}M${x} ${top}h6M${x} ${bottom}h6${count < MOST_TICKS ? ticks : ''}`;
  });

  protected turned({ x, y, angleDeg }: Position & { angleDeg: number }): string {
    return `translate(${x} ${y}) rotate(${angleDeg})`;
  }
}

function frameOf(points: readonly Position[]): { x: number; y: number; width: number; height: number } {
  const xs = points.map(({ x }) => x);
  const ys = points.map(({ y }) => y);
  const [left, top] = [Math.min(...xs) - FRAME, Math.min(...ys) - FRAME];
  return { x: left, y: top, width: Math.max(...xs) + FRAME - left, height: Math.max(...ys) + FRAME - top };
}

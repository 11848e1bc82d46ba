import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Concern, NodeView } from '../model/element-views';
import { NodeSymbol } from './node-symbol';

/** Half the width and height of the brackets and the focus ring, on the symbol's own grid. */
const FRAME: Readonly<Record<NodeView['node']['kind'], readonly [number, number]>> = {
  trap: [17, 17],
  pumpedInlet: [17, 17],
  junction: [12, 12],
  receiver: [38, 30],
  flashVessel: [19, 42],
};
const CORNER = 7;

/** A node on the sheet: its pressure ring, symbol, brackets when selected, ring when focused, and a handle to draw a pipe from. */
@Component({
  selector: '[appNodeMark]',
  imports: [NodeSymbol],
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './node-mark.html',
  styleUrl: './node-mark.scss',
})
export class NodeMark {
  readonly view = input.required<NodeView>();
  readonly selected = input(false);
  /** A pipe may be drawn from here. */
  readonly connectable = input(false);
  /** Shown at small zoom, where no value with its mark has room. */
  readonly concernMark = input<Concern | null>(null);

  protected readonly trapType = computed(() => {
    const { node } = this.view();
    return node.kind === 'trap' ? node.trapType : undefined;
  });
  protected readonly vented = computed(() => {
    const { node } = this.view();
    return node.kind === 'receiver' && node.vented === true;
  });
  protected readonly round = computed(() => ['trap', 'pumpedInlet'].includes(this.view().node.kind));
  protected readonly frame = computed(() => {
    const [x, y] = FRAME[this.view().node.kind];
    return { x, y };
  });
  protected readonly brackets = computed(() => {
    const { x, y } = this.frame();
    const c = CORNER;
    return (
      `M${-x} ${-y + c}V${-y}H${-x + c}M${x - c} ${-y}H${x}V${-y + c}` +
      `M${x} ${y - c}V${y}H${x - c}M${-x + c} ${y}H${-x}V${y - c}`
    );
  });
}

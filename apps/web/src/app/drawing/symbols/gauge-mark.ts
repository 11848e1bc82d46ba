import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { GAUGE_DIAL, GAUGE_STEM, gaugeSymbol } from '@riseback/figures';
import type { GaugeView } from '../model/gauge-views';

/** Half of the brackets and of the focus ring around the dial, on the symbol's own grid. */
const FRAME = GAUGE_DIAL + 5;
const CORNER = 5;

/** A gauge on the sheet: a dial on a stem from its tap, brackets when selected, ring when focused. */
@Component({
  selector: '[appGaugeMark]',
  changeDetection: ChangeDetectionStrategy.OnPush,
  template: `
    <svg:g class="scaled" [class.off]="view().gauge.retired">
      <svg:circle class="hit" [attr.cx]="dial().x" [attr.cy]="dial().y" r="14" />
      @for (part of parts(); track $index) {
        <svg:path [class]="part.look" [attr.d]="part.d" />
      }
    </svg:g>
    <svg:g class="scaled">
      @if (selected()) {
        <svg:path class="brackets" [attr.d]="brackets()" />
      }
      <svg:circle class="focus outer" [attr.cx]="dial().x" [attr.cy]="dial().y" [attr.r]="ring" />
      <svg:circle class="focus inner" [attr.cx]="dial().x" [attr.cy]="dial().y" [attr.r]="ring" />
    </svg:g>
  `,
  styleUrls: ['./node-mark.scss', './node-symbol.scss'],
})
export class GaugeMark {
  readonly view = input.required<GaugeView>();
  readonly selected = input(false);

  protected readonly ring = FRAME + 2;
  protected readonly parts = computed(() => gaugeSymbol(this.view().towards, this.view().stemStart));
  protected readonly dial = computed(() => {
    const { towards, stemStart } = this.view();
    return { x: towards.x * (stemStart + GAUGE_STEM), y: towards.y * (stemStart + GAUGE_STEM) };
  });
  protected readonly brackets = computed(() => {
    const { x, y } = this.dial();
    const [left, right, top, bottom] = [x - FRAME, x + FRAME, y - FRAME, y + FRAME];
    return (
      `M${left} ${top + CORNER}V${top}H${left + CORNER}M${right - CORNER} ${top}H${right}V${top + CORNER}` +
      `M${right} ${bottom - CORNER}V${bottom}H${right - CORNER}M${left + CORNER} ${bottom}H${left}V${bottom - CORNER}`
    );
  });
}

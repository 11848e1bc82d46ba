import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { DisplayUnits } from '@riseback/units';
import type { StallFacts } from './stall-facts';
import { STALL, stallFigure } from './stall-figure';

let chartCount = 0;

/** At what load a modulated exchanger stalls: its steam space over the load, the back pressure, and the numbers beside them. */
@Component({
  selector: 'app-stall-chart',
  changeDetection: ChangeDetectionStrategy.OnPush,
  templateUrl: './stall-chart.html',
  styleUrl: './stall-chart.scss',
})
export class StallChart {
  readonly facts = input.required<StallFacts>();
  readonly units = input.required<DisplayUnits>();

  protected readonly STALL = STALL;
  protected readonly hatch = `stall-hatch-${String(++chartCount)}`;
  protected readonly figure = computed(() => stallFigure(this.facts(), this.units()));
}
